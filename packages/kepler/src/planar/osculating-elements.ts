import { twoPi } from "../arithmetic/constants.ts";
import { twoProduct } from "../arithmetic/two-product.ts";
import { arctangent2 } from "../functions/arctangent.ts";
import { invariantsInto, type PlanarVector } from "./invariants.ts";

/** Elements of the conic that a planar state would follow: normalised units, energies and momenta per mass. */
export interface OsculatingElements {
  readonly energy: number;
  readonly angularMomentum: number;
  readonly eccentricity: number;
  readonly eccentricityVector: PlanarVector;
  /** Negative for a hyperbola, infinite for a parabola. */
  readonly semiMajorAxis: number;
  /** Infinite where the state is not bound. */
  readonly period: number;
}

const scratch: Float64Array = new Float64Array(4);

/** Osculating elements of a planar state, gravitational parameter 1, to a few ulp (see `invariantsInto`). */
export function osculatingElements(x: number, y: number, vx: number, vy: number): OsculatingElements {
  invariantsInto(x, y, vx, vy, scratch);
  const energy = scratch[0]!;
  const ex = scratch[2]!;
  const ey = scratch[3]!;
  const semiMajorAxis = -0.5 / energy;
  return {
    energy,
    angularMomentum: scratch[1]!,
    eccentricity: Math.sqrt(ex * ex + ey * ey),
    eccentricityVector: { x: ex, y: ey },
    semiMajorAxis,
    period: energy < 0 ? twoPi.hi * semiMajorAxis * Math.sqrt(semiMajorAxis) : Number.POSITIVE_INFINITY,
  };
}

/**
 * Time since the nearest periapsis passage of the osculating orbit, in (-P/2, P/2], for a planar state with gravitational parameter 1:
 * M/n = (E - e sin E) a sqrt a with e sin E = q.v/sqrt a, e cos E = 1 - r/a. Error at most 2^-51 P for e >= 0.01, 2^-51 P/e
 * below, plus what the rounding of the state itself is worth; NaN where the state is not bound.
 */
export function timeSincePeriapsis(x: number, y: number, vx: number, vy: number): number {
  invariantsInto(x, y, vx, vy, scratch);
  const a = -0.5 / scratch[0]!;
  if (!(a > 0)) return Number.NaN;
  const root = Math.sqrt(a);
  const r = Math.sqrt(x * x + y * y);
  const p = twoProduct(x, vx);
  const q = twoProduct(y, vy);
  const eSin = (p.hi + q.hi + (p.lo + q.lo)) / root;
  return (arctangent2(eSin, (a - r) / a) - eSin) * a * root;
}
