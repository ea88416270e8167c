import type { Rational } from "../../src/exact/rational.ts";

/** A real number times 10^70, as a whole number: absolute error of each multiplication below 1e-70. */
export type Fixed = bigint;

const unit = 10n ** 70n;

export const fixed = ({ numerator, denominator }: Rational): Fixed => (numerator * unit) / denominator;
export const whole = (n: number): Fixed => BigInt(n) * unit;
export const times = (a: Fixed, b: Fixed): Fixed => (a * b) / unit;
export const over = (a: Fixed, divisor: number): Fixed => a / BigInt(divisor);
export const dot = (a: readonly Fixed[], b: readonly Fixed[]): Fixed =>
  a.reduce((total, x, i) => total + times(x, b[i]!), 0n);
export const size = (a: Fixed): number => Math.abs(Number(a)) / 1e70;
