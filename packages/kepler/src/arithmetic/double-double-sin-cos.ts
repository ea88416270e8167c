import { halfPi, halfPiThird } from "./constants.ts";
import {
  type DoubleDouble,
  ddDivide,
  ddMultiply,
  ddNegate,
  ddOf,
  ddScale,
  ddSubtract,
} from "./double-double.ts";
import { reciprocalFactorial } from "./reciprocal-factorial.ts";
import { twoProduct } from "./two-product.ts";

/** Sine and cosine of one angle in double-double. */
export interface DoubleDoubleSinCos {
  readonly sin: DoubleDouble;
  readonly cos: DoubleDouble;
}

/**
 * Sine and cosine of x (radians, |x| <= 1e6), error at most 2^-100 absolute: reduction by pi/2 in three words, then the
 * Taylor series to x^29 on |x| <= pi/4 (remainder below 2^-112).
 */
export function ddSinCos(x: DoubleDouble): DoubleDoubleSinCos {
  const q = Math.round(x.hi / halfPi.hi);
  const hi = ddSubtract(x, twoProduct(halfPi.hi, q));
  const y = ddSubtract(ddSubtract(hi, twoProduct(halfPi.lo, q)), ddOf(halfPiThird * q));
  const y2 = ddMultiply(y, y);
  let s = reciprocalFactorial(29);
  for (let n = 27; n >= 1; n -= 2) s = ddSubtract(reciprocalFactorial(n), ddMultiply(s, y2));
  let c = reciprocalFactorial(28);
  for (let n = 26; n >= 0; n -= 2) c = ddSubtract(reciprocalFactorial(n), ddMultiply(c, y2));
  s = ddMultiply(s, y);
  const quadrant = ((q % 4) + 4) % 4;
  if (quadrant === 0) return { sin: s, cos: c };
  if (quadrant === 1) return { sin: c, cos: ddNegate(s) };
  if (quadrant === 2) return { sin: ddNegate(s), cos: ddNegate(c) };
  return { sin: ddNegate(c), cos: s };
}

/**
 * Sine, cosine of degrees: the angle is reduced exactly, so multiples of 90 degrees give exact zeros and ones.
 * Error at most 2^-100 absolute for every finite argument.
 */
export function ddSinCosDegrees(degrees: number): DoubleDoubleSinCos {
  const reduced = degrees % 360;
  const quadrant = Math.round(reduced / 90);
  const rest = reduced - 90 * quadrant;
  const { sin, cos } = ddSinCos(ddDivide(ddScale(halfPi, rest), ddOf(90)));
  const turn = ((quadrant % 4) + 4) % 4;
  if (turn === 0) return { sin, cos };
  if (turn === 1) return { sin: cos, cos: ddNegate(sin) };
  if (turn === 2) return { sin: ddNegate(sin), cos: ddNegate(cos) };
  return { sin: ddNegate(cos), cos: sin };
}

/** x - sin x without cancellation for |x| <= 1 (relative 2^-98), by subtraction above. */
export function ddMinusSin(x: DoubleDouble): DoubleDouble {
  if (Math.abs(x.hi) > 1) return ddSubtract(x, ddSinCos(x).sin);
  const x2 = ddMultiply(x, x);
  let s = reciprocalFactorial(29);
  for (let n = 27; n >= 3; n -= 2) s = ddSubtract(reciprocalFactorial(n), ddMultiply(s, x2));
  return ddMultiply(ddMultiply(s, x2), x);
}
