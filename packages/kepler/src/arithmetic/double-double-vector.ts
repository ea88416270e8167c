import { type DoubleDouble, ddAdd, ddMultiply, ddOf, ddSqrt, ddSubtract } from "./double-double.ts";

/** A vector of two or three double-doubles. */
export type DoubleDoubleVector = readonly DoubleDouble[];

/** A vector of doubles in double-double. */
export function ddVector(a: readonly number[]): DoubleDoubleVector {
  return a.map(ddOf);
}

/** Scalar product, absolute error at most 2^-100 |a| |b|. */
export function ddDot(a: DoubleDoubleVector, b: DoubleDoubleVector): DoubleDouble {
  let sum = ddOf(0);
  for (let k = 0; k < a.length; k++) sum = ddAdd(sum, ddMultiply(a[k]!, b[k]!));
  return sum;
}

/** Length, relative error at most 2^-100. */
export function ddLength(a: DoubleDoubleVector): DoubleDouble {
  return ddSqrt(ddDot(a, a));
}

/** f a + g b. */
export function ddCombine(
  f: DoubleDouble,
  a: DoubleDoubleVector,
  g: DoubleDouble,
  b: DoubleDoubleVector,
): DoubleDoubleVector {
  return a.map((value, k) => ddAdd(ddMultiply(f, value), ddMultiply(g, b[k]!)));
}

/** Vector product of two vectors; a plane vector has the third component 0. */
export function ddCross(a: DoubleDoubleVector, b: DoubleDoubleVector): DoubleDoubleVector {
  const zero = ddOf(0);
  const [a0 = zero, a1 = zero, a2 = zero] = a;
  const [b0 = zero, b1 = zero, b2 = zero] = b;
  return [
    ddSubtract(ddMultiply(a1, b2), ddMultiply(a2, b1)),
    ddSubtract(ddMultiply(a2, b0), ddMultiply(a0, b2)),
    ddSubtract(ddMultiply(a0, b1), ddMultiply(a1, b0)),
  ];
}
