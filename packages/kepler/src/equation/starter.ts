const bits: Float64Array = new Float64Array(1);
const words: Uint32Array = new Uint32Array(bits.buffer);

/**
 * Cube root of a normal x > 0 to a relative 2e-5: a third of the exponent from the bits (little-endian, as every engine is), then one
 * step of Halley's iteration.
 */
export function roughCubeRoot(x: number): number {
  bits[0] = x;
  words[1] = words[1]! * (1 / 3) + 715094163;
  words[0] = 0;
  const y = bits[0]!;
  const y3 = y * y * y;
  return y * ((y3 + 2 * x) / (2 * y3 + x));
}

/** 3 pi^2/(pi^2 - 6) and 1.6 pi/(pi^2 - 6). */
const alphaApoapsis = (3 * Math.PI * Math.PI) / (Math.PI * Math.PI - 6);
const alphaSlope = (1.6 * Math.PI) / (Math.PI * Math.PI - 6);

const single: Float32Array = new Float32Array(1);
const pattern: Int32Array = new Int32Array(single.buffer);

/**
 * Eccentric anomaly (radians) of M in [0, pi] to a relative 5e-4: the root of the cubic that Markley's rational form of the sine leads
 * to. Departures from the source: 1/(1 + e) in alpha is a parabola within 0.006 of it, and the cube root is a third of the exponent
 * of a single (its argument lies between 1e-24 and 1e4) and one step of Halley's iteration, 3e-5.
 * Source: Markley, Celest. Mech. Dyn. Astron. 63 (1995) 101, equations (5), (9), (10), (14), (15), (20).
 */
export function startAnomaly(e: number, complement: number, m: number): number {
  const alpha = alphaApoapsis + alphaSlope * (Math.PI - m) * (0.994 + e * (-0.838 + e * 0.344));
  const d = 3 * complement + alpha * e;
  const c = alpha * d * complement;
  const m2 = m * m;
  const q = 2 * c - m2;
  const r = m * (3 * alpha * d * (d - complement) + m2);
  const x = r + Math.sqrt(q * q * q + r * r);
  single[0] = x;
  pattern[0] = ((pattern[0]! / 3) | 0) + 709921077;
  const y = single[0]!;
  const y3 = y * y * y;
  const top = y3 + 2 * x;
  const bottom = 2 * y3 + x;
  // w = root^2 with root = y top/bottom; both sides of the quotient are multiplied by powers of bottom to save divisions.
  const b2 = bottom * bottom;
  const w = y * y * top * top;
  const qb = q * b2;
  const divisor = w * w + w * qb + qb * qb;
  return (2 * r * w * b2 + m * divisor) / (d * divisor);
}

/**
 * Root of (1 - e) E + e E^3/6 = M for M > 0, relative error below 1e-4, without cancellation or overflow for M from 5e-324: by Cardano's
 * formula where the cubic term matters, by the linear term with a correction where it does not.
 */
export function anomalyOfCubic(e: number, complement: number, m: number): number {
  const linear = m / complement;
  const share = (e * linear * linear) / complement;
  if (share < 0.01) return linear * (1 - share / 6);
  const p = (2 * complement) / e;
  const q = (3 * m) / e;
  const w = roughCubeRoot(q + Math.sqrt(q * q + p * p * p));
  const w2 = w * w;
  return (2 * q) / (w2 + p + (p * p) / w2);
}
