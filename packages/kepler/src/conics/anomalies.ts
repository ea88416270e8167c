import {
  ddAdd,
  ddDivide,
  ddMultiply,
  ddNegate,
  ddOf,
  ddScale,
  ddSqrt,
  ddSubtract,
  ddToNumber,
} from "../arithmetic/double-double.ts";
import { ddArctangent2 } from "../arithmetic/double-double-arctangent.ts";
import { ddMinusSin, ddSinCos } from "../arithmetic/double-double-sin-cos.ts";
import { refuse, requireEllipse, requireFinite } from "../errors.ts";
import { arctangent2 } from "../functions/arctangent.ts";
import { reduceAngle } from "../functions/reduce-angle.ts";
import { stumpff } from "./stumpff.ts";

const one = ddOf(1);
const reduced: Float64Array = new Float64Array(2);

/** The angle without whole turns in [-pi, pi], in double-double, and the whole turns as a double. */
function withoutTurns(angle: number): { readonly rest: { readonly hi: number; readonly lo: number } } {
  reduceAngle(angle, 4, reduced);
  return { rest: { hi: reduced[0]!, lo: reduced[1]! } };
}

/**
 * Mean anomaly E - e sin E (radians) of an eccentric anomaly, rounded once: formed as (1 - e) E + e (E - sin E), without cancellation.
 * @throws InvalidInputError for an eccentricity outside [0, 1) or an anomaly that is not finite
 */
export function meanFromEccentricAnomaly(eccentricity: number, eccentricAnomaly: number): number {
  requireEllipse("meanFromEccentricAnomaly.eccentricity", eccentricity);
  requireFinite("meanFromEccentricAnomaly.eccentricAnomaly", eccentricAnomaly);
  const { rest } = withoutTurns(eccentricAnomaly);
  const e = ddOf(eccentricity);
  const lag = ddMinusSin(rest);
  const mean = ddAdd(ddMultiply(ddSubtract(one, e), rest), ddMultiply(e, lag));
  if (Math.abs(eccentricAnomaly) <= Math.PI) return ddToNumber(mean);
  return ddToNumber(ddAdd(ddOf(eccentricAnomaly), ddSubtract(mean, rest)));
}

/**
 * True anomaly (radians) of an eccentric anomaly, in the same revolution: tan(nu/2) = sqrt((1 + e)/(1 - e)) tan(E/2), in double-double,
 * rounded once.
 * @throws InvalidInputError for an eccentricity outside [0, 1) or an anomaly that is not finite
 */
export function trueFromEccentricAnomaly(eccentricity: number, eccentricAnomaly: number): number {
  requireEllipse("trueFromEccentricAnomaly.eccentricity", eccentricity);
  requireFinite("trueFromEccentricAnomaly.eccentricAnomaly", eccentricAnomaly);
  return stretchHalfAngle(eccentricAnomaly, eccentricity, -eccentricity);
}

/**
 * Eccentric anomaly (radians) of a true anomaly on an ellipse, in the same revolution; rounded once.
 * @throws InvalidInputError for an eccentricity outside [0, 1) or an anomaly that is not finite
 */
export function eccentricFromTrueAnomaly(eccentricity: number, trueAnomaly: number): number {
  requireEllipse("eccentricFromTrueAnomaly.eccentricity", eccentricity);
  requireFinite("eccentricFromTrueAnomaly.trueAnomaly", trueAnomaly);
  return stretchHalfAngle(trueAnomaly, -eccentricity, eccentricity);
}

/** 2 arctan(sqrt((1 + a)/(1 + b)) tan(angle/2)), in the revolution of the angle. */
function stretchHalfAngle(angle: number, a: number, b: number): number {
  const { rest } = withoutTurns(angle);
  const { sin, cos } = ddSinCos(ddScale(rest, 0.5));
  const up = ddMultiply(ddSqrt(ddAdd(one, ddOf(a))), sin);
  const along = ddMultiply(ddSqrt(ddAdd(one, ddOf(b))), cos);
  const result = ddScale(ddArctangent2(up, along), 2);
  if (Math.abs(angle) <= Math.PI) return ddToNumber(result);
  return ddToNumber(ddAdd(ddOf(angle), ddSubtract(result, rest)));
}

/** True anomaly 2 arctan B (radians) of a parabolic anomaly B = tan(nu/2), within 1.1 ulp. @throws InvalidInputError unless finite */
export function trueFromParabolicAnomaly(parabolicAnomaly: number): number {
  requireFinite("trueFromParabolicAnomaly.parabolicAnomaly", parabolicAnomaly);
  return 2 * arctangent2(parabolicAnomaly, 1);
}

/**
 * True anomaly (radians) of a hyperbolic anomaly H, |H| <= 690: tan(nu/2) = sqrt((e + 1)/(e - 1)) tanh(H/2), rounded once.
 * @throws InvalidInputError for an eccentricity not above 1 or an anomaly that is not finite
 */
export function trueFromHyperbolicAnomaly(eccentricity: number, hyperbolicAnomaly: number): number {
  if (!(eccentricity > 1 && eccentricity < Number.POSITIVE_INFINITY)) {
    refuse("trueFromHyperbolicAnomaly.eccentricity", "hyperbola", eccentricity);
  }
  requireFinite("trueFromHyperbolicAnomaly.hyperbolicAnomaly", hyperbolicAnomaly);
  const half = ddOf(0.5 * hyperbolicAnomaly);
  const c = stumpff(ddNegate(ddMultiply(half, half)));
  const e = ddOf(eccentricity);
  const up = ddMultiply(ddSqrt(ddAdd(e, one)), ddMultiply(half, ddDivide(c.c1, c.c0)));
  return ddToNumber(ddScale(ddArctangent2(up, ddSqrt(ddSubtract(e, one))), 2));
}
