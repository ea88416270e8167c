import { add, divide, multiply, one, type Rational, rational, subtract, zero } from "./rational.ts";

/** The Lagrange basis polynomials of distinct nodes: coefficients, lowest power first. */
export function lagrangeBasis(nodes: readonly Rational[]): readonly (readonly Rational[])[] {
  return nodes.map((node, i) => {
    let polynomial: Rational[] = [one];
    nodes.forEach((other, j) => {
      if (i === j) return;
      const scale = subtract(node, other);
      // Times (x - other) / scale.
      const shifted = [zero, ...polynomial];
      polynomial = shifted.map((x, k) => divide(subtract(x, multiply(other, polynomial[k] ?? zero)), scale));
    });
    return polynomial;
  });
}

export const evaluate = (polynomial: readonly Rational[], x: Rational): Rational =>
  polynomial.reduceRight((value, coefficient) => add(multiply(value, x), coefficient), zero);

/** Integral from 0. */
export const integral = (polynomial: readonly Rational[]): readonly Rational[] => [
  zero,
  ...polynomial.map((coefficient, k) => divide(coefficient, rational(BigInt(k + 1)))),
];
