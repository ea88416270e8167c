import {
  type DoubleDouble,
  ddAdd,
  ddDivide,
  ddMultiply,
  ddOf,
  ddSqrt,
  ddSubtract,
  ddToNumber,
} from "../arithmetic/double-double.ts";
import { type DoubleDoubleSinCos, ddSinCos, ddSinCosDegrees } from "../arithmetic/double-double-sin-cos.ts";
import { requireEllipse, requireFinite } from "../errors.ts";

/** Position and velocity in the plane of the orbit, normalised units (gravitational parameter 1). */
export interface PlanarState {
  readonly x: number;
  readonly y: number;
  readonly vx: number;
  readonly vy: number;
}

/**
 * State at periapsis on the +x axis, moving toward +y, semi-major axis 1: x = 1 - e, vy = sqrt((1 + e)/(1 - e)), each the
 * double nearest to the exact value.
 * @throws InvalidInputError for an eccentricity outside [0, 1)
 */
export function periapsisState(eccentricity: number): PlanarState {
  return stateAtTrueAnomalyDegrees(eccentricity, 0);
}

/**
 * State at a true anomaly in radians (|nu| <= 1e6), periapsis on the +x axis, semi-major axis 1, motion toward +y at periapsis; each
 * component is the double nearest to the exact value (but for ties within 2^-95).
 * @throws InvalidInputError for an eccentricity outside [0, 1) or an angle that is not finite
 */
export function stateAtTrueAnomaly(eccentricity: number, trueAnomaly: number): PlanarState {
  requireEllipse("stateAtTrueAnomaly.eccentricity", eccentricity);
  requireFinite("stateAtTrueAnomaly.trueAnomaly", trueAnomaly);
  return stateInDirection(eccentricity, ddSinCos(ddOf(trueAnomaly)));
}

/**
 * The same for degrees: 0, 90, 180, 270 have an exact sine and cosine, so that an apsis lies exactly on the axis.
 * @throws InvalidInputError for an eccentricity outside [0, 1) or an angle that is not finite
 */
export function stateAtTrueAnomalyDegrees(eccentricity: number, trueAnomalyDeg: number): PlanarState {
  requireEllipse("stateAtTrueAnomalyDegrees.eccentricity", eccentricity);
  requireFinite("stateAtTrueAnomalyDegrees.trueAnomalyDeg", trueAnomalyDeg);
  return stateInDirection(eccentricity, ddSinCosDegrees(trueAnomalyDeg));
}

/** r = p/(1 + e cos nu), v = (-sin nu, e + cos nu)/sqrt p with p = 1 - e^2. */
function stateInDirection(eccentricity: number, direction: DoubleDoubleSinCos): PlanarState {
  const e = ddOf(eccentricity);
  const { sin, cos } = direction;
  const one = ddOf(1);
  const parameter: DoubleDouble = ddMultiply(ddSubtract(one, e), ddAdd(one, e));
  const root = ddSqrt(parameter);
  const r = ddDivide(parameter, ddAdd(one, ddMultiply(e, cos)));
  return {
    x: ddToNumber(ddMultiply(r, cos)),
    y: ddToNumber(ddMultiply(r, sin)),
    vx: 0 - ddToNumber(ddDivide(sin, root)),
    vy: ddToNumber(ddDivide(ddAdd(e, cos), root)),
  };
}
