import { invalid } from "../errors.ts";

/** An exact fraction in lowest terms; the denominator is positive. Coefficients live here until a program rounds them, once. */
export interface Rational {
  readonly numerator: bigint;
  readonly denominator: bigint;
}

const magnitude = (n: bigint): bigint => (n < 0n ? -n : n);

function greatestCommonDivisor(a: bigint, b: bigint): bigint {
  let [x, y] = [magnitude(a), magnitude(b)];
  while (y !== 0n) [x, y] = [y, x % y];
  return x;
}

/** numerator / denominator. @throws InvalidInputError where the denominator is zero. */
export function rational(numerator: bigint, denominator: bigint = 1n): Rational {
  if (denominator === 0n) throw invalid.division(`${numerator}/0`);
  const divisor = greatestCommonDivisor(numerator, denominator) * (denominator < 0n ? -1n : 1n);
  return { numerator: numerator / divisor, denominator: denominator / divisor };
}

export const zero: Rational = rational(0n);
export const one: Rational = rational(1n);

export const add = (a: Rational, b: Rational): Rational =>
  rational(a.numerator * b.denominator + b.numerator * a.denominator, a.denominator * b.denominator);
export const subtract = (a: Rational, b: Rational): Rational =>
  rational(a.numerator * b.denominator - b.numerator * a.denominator, a.denominator * b.denominator);
export const multiply = (a: Rational, b: Rational): Rational =>
  rational(a.numerator * b.numerator, a.denominator * b.denominator);
export const divide = (a: Rational, b: Rational): Rational =>
  rational(a.numerator * b.denominator, a.denominator * b.numerator);
export const equal = (a: Rational, b: Rational): boolean =>
  a.numerator === b.numerator && a.denominator === b.denominator;
export const isZero = (a: Rational): boolean => a.numerator === 0n;
export const sum = (terms: readonly Rational[]): Rational => terms.reduce(add, zero);

/** The exact value of a finite double. */
export function fromDouble(value: number): Rational {
  let scaled = value;
  let denominator = 1n;
  while (!Number.isInteger(scaled)) {
    scaled *= 2;
    denominator *= 2n;
  }
  return rational(BigInt(scaled), denominator);
}

const bitLength = (n: bigint): number => n.toString(2).length;

/** The double nearest to `a`, ties to even; exact rounding for every value of normal magnitude. */
export function toDouble(a: Rational): number {
  if (a.numerator === 0n) return 0;
  const n = magnitude(a.numerator);
  // 66 bits of quotient and one sticky bit are more than rounding to 53 bits can need.
  const shift = 66 - bitLength(n) + bitLength(a.denominator);
  const top = shift > 0 ? n << BigInt(shift) : n;
  const bottom = shift < 0 ? a.denominator << BigInt(-shift) : a.denominator;
  const quotient = (top / bottom) | (top % bottom === 0n ? 0n : 1n);
  const power = Number(1n << BigInt(Math.abs(shift)));
  const rounded = shift > 0 ? Number(quotient) / power : Number(quotient) * power;
  return a.numerator < 0n ? -rounded : rounded;
}

/** `a` as an unevaluated sum of two doubles; relative error below 2^-105. */
export function toDoubleDouble(a: Rational): readonly [hi: number, lo: number] {
  let pair = pairs.get(a);
  if (pair === undefined) {
    const hi = toDouble(a);
    pair = [hi, toDouble(subtract(a, fromDouble(hi)))];
    pairs.set(a, pair);
  }
  return pair;
}

/** A coefficient is rounded once however many programs use it. */
const pairs = new WeakMap<Rational, readonly [hi: number, lo: number]>();
