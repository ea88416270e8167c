import { add, divide, multiply, one, type Rational, rational, subtract, sum, zero } from "./rational.ts";

/** A power series, lowest power first, cut after as many terms as are given. */
export type Series = readonly Rational[];

/** -ln(1 - t) / t = 1 + t/2 + t^2/3 + ... */
export const logarithm = (terms: number): Series =>
  Array.from({ length: terms }, (_, k) => rational(1n, BigInt(k + 1)));

export function product(a: Series, b: Series): Series {
  return a.map((_, n) => sum(a.slice(0, n + 1).map((x, k) => multiply(x, b[n - k]!))));
}

/** 1 / a, for a series whose first term is not zero. */
export function reciprocal(a: Series): Series {
  const result: Rational[] = [];
  for (let n = 0; n < a.length; n += 1) {
    const rest = sum(result.map((x, k) => multiply(x, a[n - k]!)));
    result.push(divide(subtract(n === 0 ? one : zero, rest), a[0]!));
  }
  return result;
}

/** Running sums: the series divided by 1 - t. */
export function cumulative(a: Series): Series {
  let total = zero;
  return a.map((x) => {
    total = add(total, x);
    return total;
  });
}

/** Weights of f_n, f_{n-1}, ... that equal sum_j series_j nabla^j f_n. */
export function ordinates(series: Series): readonly Rational[] {
  const weights = series.map(() => zero);
  series.forEach((coefficient, j) => {
    let binomial = 1n;
    for (let k = 0; k <= j; k += 1) {
      weights[k] = add(weights[k]!, multiply(coefficient, rational(k % 2 === 0 ? binomial : -binomial)));
      binomial = (binomial * BigInt(j - k)) / BigInt(k + 1);
    }
  });
  return weights;
}
