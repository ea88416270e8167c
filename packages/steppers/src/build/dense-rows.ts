import { parseRow } from "../exact/coefficients.ts";
import { add, multiply, one, type Rational, rational, subtract, sum, zero } from "../exact/rational.ts";
import type { DenseOutput, NestedDenseOutput } from "../methods/method.ts";

type Polynomial = readonly Rational[];

const plus = (p: Polynomial, q: Polynomial): Polynomial =>
  Array.from({ length: Math.max(p.length, q.length) }, (_, k) => add(p[k] ?? zero, q[k] ?? zero));
const timesX = (p: Polynomial): Polynomial => [zero, ...p];
const timesOneMinusX = (p: Polynomial): Polynomial =>
  plus(
    p,
    timesX(p).map((coefficient) => subtract(zero, coefficient)),
  );

/** Exact rows of b_i(theta) = sum over k of rows[i][k] theta^(k+1), whichever way the dense output is written. */
export function denseRows(
  dense: DenseOutput | NestedDenseOutput,
  b: readonly Rational[],
): readonly Polynomial[] {
  if ("rows" in dense) return dense.rows.map(parseRow);
  const stages = b.length + 1 + dense.stages.length;
  const unit = (i: number, j: number): Rational => (i === j ? one : zero);
  const nested = dense.nested.map(parseRow);
  return Array.from({ length: stages }, (_, i) => {
    const weight = b[i] ?? zero;
    const parts = [
      weight,
      subtract(unit(i, 0), weight),
      sum([
        multiply(rational(2n), weight),
        rational(-1n * unit(i, 0).numerator),
        rational(-1n * unit(i, b.length).numerator),
      ]),
      ...nested.map((row) => row[i]!),
    ];
    // Inside out: x(F0 + (1-x)(F1 + x(F2 + (1-x)(F3 + ...)))).
    let polynomial: Polynomial = [];
    for (let k = parts.length - 1; k >= 0; k -= 1) {
      const inner = plus([parts[k]!], polynomial);
      polynomial = k % 2 === 0 ? timesX(inner) : timesOneMinusX(inner);
    }
    return polynomial.slice(1);
  });
}
