import { twoPi } from "../arithmetic/constants.ts";
import { ddDivide, ddMultiply, ddOf, ddSqrt, ddSubtract, ddToNumber } from "../arithmetic/double-double.ts";
import { requireEllipse } from "../errors.ts";
import type { PlanarState } from "../planar/planar-state.ts";

/**
 * Units in which the gravitational parameter and the distance of periapsis are 1, a common practice for start values: the start
 * is (1, 0) with speed sqrt(1 + e). All in terms of normalised units (gravitational parameter 1, semi-major axis 1).
 */
export interface PeriapsisConvention {
  readonly eccentricity: number;
  /** Semi-major axis, 1/(1 - e). */
  readonly semiMajorAxis: number;
  /** Period, 2 pi/(1 - e)^(3/2). */
  readonly period: number;
  /** Speed at periapsis, sqrt(1 + e). */
  readonly periapsisSpeed: number;
  /** A normalised time times this is the time in this convention: (1 - e)^(-3/2). */
  readonly timeScale: number;
  /** A normalised speed times this is the speed in this convention: sqrt(1 - e). */
  readonly speedScale: number;
}

/**
 * The convention with periapsis distance 1 for an eccentricity; every number rounded once.
 * @throws InvalidInputError for an eccentricity outside [0, 1)
 */
export function periapsisConvention(eccentricity: number): PeriapsisConvention {
  requireEllipse("periapsisConvention.eccentricity", eccentricity);
  const complement = ddSubtract(ddOf(1), ddOf(eccentricity));
  const root = ddSqrt(complement);
  const cube = ddMultiply(complement, root);
  return {
    eccentricity,
    semiMajorAxis: ddToNumber(ddDivide(ddOf(1), complement)),
    period: ddToNumber(ddDivide(twoPi, cube)),
    periapsisSpeed: Math.sqrt(1 + eccentricity),
    timeScale: ddToNumber(ddDivide(ddOf(1), cube)),
    speedScale: ddToNumber(root),
  };
}

/** A normalised state in units of the convention; each component within 1 ulp. */
export function toPeriapsisUnits(state: PlanarState, convention: PeriapsisConvention): PlanarState {
  const { eccentricity, speedScale } = convention;
  const length = 1 - eccentricity;
  return {
    x: state.x / length,
    y: state.y / length,
    vx: state.vx * speedScale,
    vy: state.vy * speedScale,
  };
}

/** A state of the convention in normalised units: the inverse of {@link toPeriapsisUnits} to 1 ulp. */
export function fromPeriapsisUnits(state: PlanarState, convention: PeriapsisConvention): PlanarState {
  const { eccentricity, speedScale } = convention;
  const length = 1 - eccentricity;
  return {
    x: state.x * length,
    y: state.y * length,
    vx: state.vx / speedScale,
    vy: state.vy / speedScale,
  };
}
