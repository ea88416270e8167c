import { reduceExactly } from "./exact-reduction.ts";

/**
 * pi/2 = w1 + w2 + w3 + w4 to 2^-151. The first three words have 33 bits, so that their multiples by integers up to 2^20 are exact
 * (the scheme of Cody & Waite, Software Manual for the Elementary Functions, 1980, chapter 8).
 */
const w1 = 1.5707963267341256;
const w2 = 6.077100506303966e-11;
const w3 = 2.0222662487111665e-21;
const w4 = 8.4784276603689e-32;
const twoOverPi = 0.6366197723675814;
/** Adding and subtracting 1.5 2^52 rounds to the nearest integer. */
const toNearest = 6755399441055744;
/** Largest multiple taken by words. */
const largestMultiple = 1048576;

/**
 * Remainder of a finite x (radians) after the nearest multiple of (pi/2) quarters, quarters a power of two: out[0] + out[1], |out[1]| <=
 * 2^-52 |out[0]|, error at most 2^-97 for |x| <= 1.6e6 quarters and 2^-160 above. Returns the multiple modulo 4, in 0 .. 3.
 */
export function reduceAngle(x: number, quarters: number, out: Float64Array): number {
  const q = x * (twoOverPi / quarters) + toNearest - toNearest;
  if (!(q >= -largestMultiple && q <= largestMultiple)) {
    const multiple = reduceExactly(Math.abs(x), quarters, out);
    if (x > 0) return multiple;
    out[0] = -out[0]!;
    out[1] = -out[1]!;
    return (4 - multiple) & 3;
  }
  const k = q * quarters;
  const a = x - k * w1;
  const p2 = k * w2;
  const b = a - p2;
  const bt = b - a;
  const bError = a - (b - bt) - (p2 + bt);
  const p3 = k * w3;
  const c = b - p3;
  const ct = c - b;
  const cError = b - (c - ct) - (p3 + ct);
  const lo = bError + (cError - k * w4);
  const hi = c + lo;
  out[0] = hi;
  out[1] = c - hi + lo;
  return q & 3;
}
