import { twoPi } from "../arithmetic/constants.ts";
import { arctangent2 } from "../functions/arctangent.ts";
import { angularMomentum, eccentricityVector, type PlanarVector, specificEnergy } from "./invariants.ts";

/** Elements of the conic that a planar state would follow. Semi-major axis negative and period infinite when it is not bound. */
export interface OsculatingElements {
  readonly energy: number;
  readonly angularMomentum: number;
  readonly eccentricity: number;
  readonly eccentricityVector: PlanarVector;
  readonly semiMajorAxis: number;
  readonly period: number;
}

/** Osculating elements of a planar state, gravitational parameter 1. */
export function osculatingElements(x: number, y: number, vx: number, vy: number): OsculatingElements {
  const energy = specificEnergy(x, y, vx, vy);
  const vector = eccentricityVector(x, y, vx, vy);
  const semiMajorAxis = -0.5 / energy;
  return {
    energy,
    angularMomentum: angularMomentum(x, y, vx, vy),
    eccentricity: Math.sqrt(vector.x * vector.x + vector.y * vector.y),
    eccentricityVector: vector,
    semiMajorAxis,
    period: energy < 0 ? twoPi.hi * semiMajorAxis * Math.sqrt(semiMajorAxis) : Number.POSITIVE_INFINITY,
  };
}

/**
 * Time since the nearest periapsis passage of the osculating orbit, in (-P/2, P/2]: M/n with e sin E = q.v/sqrt a and
 * e cos E = 1 - r/a. NaN when the state is not bound.
 */
export function timeSincePeriapsis(x: number, y: number, vx: number, vy: number): number {
  const r = Math.sqrt(x * x + y * y);
  const a = 1 / (2 / r - (vx * vx + vy * vy));
  if (!(a > 0)) return Number.NaN;
  const root = Math.sqrt(a);
  const eSin = (x * vx + y * vy) / root;
  return (arctangent2(eSin, 1 - r / a) - eSin) * a * root;
}
