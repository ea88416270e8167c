import { twoPi } from "../arithmetic/constants.ts";
import {
  type DoubleDouble,
  ddAdd,
  ddDivide,
  ddMultiply,
  ddNegate,
  ddOf,
  ddScale,
  ddSqrt,
  ddSubtract,
} from "../arithmetic/double-double.ts";
import { ddArctangent2 } from "../arithmetic/double-double-arctangent.ts";
import { twoProduct } from "../arithmetic/two-product.ts";
import { refuse, requireFinite } from "../errors.ts";
import type { PlanarState } from "./planar-state.ts";

/**
 * The exact bound orbit through a state of doubles, every element in double-double (about 30 digits), gravitational
 * parameter 1. Anomalies are those of the start, in (-pi, pi]; the direction of periapsis is a unit vector.
 *
 * A circular orbit (eccentricity zero to the last bit of double-double) has its periapsis on the +x axis by definition: its anomalies
 * are then the polar angle of the start, in the sense of the motion.
 */
export interface PlanarOrbit {
  readonly start: PlanarState;
  readonly energy: DoubleDouble;
  /** Positive for motion from +x toward +y. */
  readonly angularMomentum: DoubleDouble;
  readonly semiMajorAxis: DoubleDouble;
  readonly meanMotion: DoubleDouble;
  readonly period: DoubleDouble;
  readonly eccentricity: DoubleDouble;
  readonly eccentricityX: DoubleDouble;
  readonly eccentricityY: DoubleDouble;
  /** sqrt(1 - e^2), the ratio of the axes. */
  readonly axisRatio: DoubleDouble;
  readonly periapsisX: DoubleDouble;
  readonly periapsisY: DoubleDouble;
  readonly eccentricAnomaly: DoubleDouble;
  readonly meanAnomaly: DoubleDouble;
}

const one = ddOf(1);

function dot(ax: DoubleDouble, ay: DoubleDouble, bx: DoubleDouble, by: DoubleDouble): DoubleDouble {
  return ddAdd(ddMultiply(ax, bx), ddMultiply(ay, by));
}

/**
 * The exact orbit through a rounded start state (normalised units, gravitational parameter 1).
 * e cos E = 1 - r/a and e sin E = q.v/sqrt a give eccentricity and anomaly; the direction of periapsis is the direction of
 * the start turned back by its true anomaly, so that the orbit passes through the start however small e is.
 * @throws InvalidInputError where the state is not finite, at the centre, rectilinear or not bound
 */
export function orbitThrough(start: PlanarState): PlanarOrbit {
  requireFinite("orbitThrough.x", start.x);
  requireFinite("orbitThrough.y", start.y);
  requireFinite("orbitThrough.vx", start.vx);
  requireFinite("orbitThrough.vy", start.vy);
  const x = ddOf(start.x);
  const y = ddOf(start.y);
  const vx = ddOf(start.vx);
  const vy = ddOf(start.vy);
  const r = ddSqrt(dot(x, y, x, y));
  if (!(r.hi > 0)) refuse("orbitThrough", "radius", r.hi);
  const angularMomentum = ddSubtract(twoProduct(start.x, start.vy), twoProduct(start.y, start.vx));
  if (angularMomentum.hi === 0) refuse("orbitThrough", "rectilinear", 0);
  const inverseAxis = ddSubtract(ddDivide(ddOf(2), r), dot(vx, vy, vx, vy));
  if (!(inverseAxis.hi > 0)) refuse("orbitThrough", "bound", -0.5 * inverseAxis.hi);
  const semiMajorAxis = ddDivide(one, inverseAxis);
  const rootAxis = ddSqrt(semiMajorAxis);
  const meanMotion = ddDivide(inverseAxis, rootAxis);
  const eCos = ddSubtract(one, ddMultiply(r, inverseAxis));
  const eSin = ddDivide(dot(x, y, vx, vy), rootAxis);
  const eccentricity = ddSqrt(dot(eCos, eSin, eCos, eSin));
  const forward = angularMomentum.hi > 0;
  const size = forward ? angularMomentum : ddNegate(angularMomentum);
  const axisRatio = ddDivide(size, rootAxis);
  const circular = eccentricity.hi === 0;
  const eccentricAnomaly = circular ? ddArctangent2(forward ? y : ddNegate(y), x) : ddArctangent2(eSin, eCos);
  const meanAnomaly = ddSubtract(eccentricAnomaly, eSin);
  const periapsis = circular
    ? { x: one, y: ddOf(0) }
    : periapsisDirection(x, y, r, eCos, eSin, eccentricity, axisRatio, forward);
  return {
    start,
    energy: ddScale(inverseAxis, -0.5),
    angularMomentum,
    semiMajorAxis,
    meanMotion,
    period: ddDivide(twoPi, meanMotion),
    eccentricity,
    eccentricityX: ddMultiply(eccentricity, periapsis.x),
    eccentricityY: ddMultiply(eccentricity, periapsis.y),
    axisRatio,
    periapsisX: periapsis.x,
    periapsisY: periapsis.y,
    eccentricAnomaly,
    meanAnomaly,
  };
}

/** Direction of (x, y) turned back by the true anomaly: cos nu = (cos E - e) a/r, sin nu = sqrt(1 - e^2) sin E a/r. */
function periapsisDirection(
  x: DoubleDouble,
  y: DoubleDouble,
  r: DoubleDouble,
  eCos: DoubleDouble,
  eSin: DoubleDouble,
  e: DoubleDouble,
  axisRatio: DoubleDouble,
  forward: boolean,
): { readonly x: DoubleDouble; readonly y: DoubleDouble } {
  const along = ddSubtract(eCos, ddMultiply(e, e));
  const across = ddMultiply(axisRatio, forward ? eSin : ddNegate(eSin));
  const norm = ddMultiply(r, ddSqrt(dot(along, across, along, across)));
  return {
    x: ddDivide(ddAdd(ddMultiply(x, along), ddMultiply(y, across)), norm),
    y: ddDivide(ddSubtract(ddMultiply(y, along), ddMultiply(x, across)), norm),
  };
}
