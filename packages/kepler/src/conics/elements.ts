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
  ddToNumber,
} from "../arithmetic/double-double.ts";
import { ddArctangent2 } from "../arithmetic/double-double-arctangent.ts";
import { ddSinCos } from "../arithmetic/double-double-sin-cos.ts";
import {
  type DoubleDoubleVector,
  ddCombine,
  ddCross,
  ddDot,
  ddLength,
  ddVector,
} from "../arithmetic/double-double-vector.ts";
import { refuse, requireFinite, requireMotion, requireNonNegative, requirePositive } from "../errors.ts";
import type { Motion } from "../vector.ts";

/** Classical elements of any conic: lengths in the unit of the state, angles in radians. */
export interface ClassicalElements {
  /** p = h^2/GM; finite for every conic. */
  readonly semiLatusRectum: number;
  readonly eccentricity: number;
  /** In [0, pi]. */
  readonly inclination: number;
  /** Right ascension (longitude) of the ascending node, in [0, 2 pi). */
  readonly ascendingNode: number;
  /** From the node to periapsis in the sense of the motion, in [0, 2 pi). */
  readonly argumentOfPeriapsis: number;
  /** In [0, 2 pi) for an ellipse, in (-pi, pi] otherwise. */
  readonly trueAnomaly: number;
}

/** What follows from the same state besides the elements. */
export interface StateElements extends ClassicalElements {
  /** p/(1 - e^2): negative for a hyperbola, infinite for a parabola. */
  readonly semiMajorAxis: number;
  /** Energy per mass. */
  readonly energy: number;
  /** Angular momentum per mass, its length. */
  readonly angularMomentum: number;
  /** Laplace-Runge-Lenz vector over GM, toward periapsis, length e. */
  readonly eccentricityVector: readonly number[];
}

/** Below this e a conic counts as circular, and below this sine of the inclination as equatorial: 4 2^-52, the rounding of a state. */
const degenerate = 4 * 2 ** -52;

/** Angle from the unit vector `from` to `to` about the unit vector `axis`, in [0, 2 pi). */
function angleAbout(axis: DoubleDoubleVector, from: DoubleDoubleVector, to: DoubleDoubleVector): number {
  const angle = ddArctangent2(ddDot(ddCross(axis, from), to), ddDot(from, to));
  const turned = ddToNumber(angle.hi < 0 ? ddAdd(angle, twoPi) : angle);
  return turned < twoPi.hi ? turned : 0;
}

/**
 * Classical elements of a state in space (three components), gravitational parameter in matching units. All in double-double, so each
 * element is rounded once from that of the exact conic through the given doubles; where e or the inclination is small, the angles
 * measured from periapsis or node are as uncertain as the last bits of the state over e or sin i.
 *
 * Defined values: an equatorial orbit (sin i <= 4 2^-52) has its node on the +x axis (0); a circular one (e <= 4 2^-52) has its
 * periapsis at the node (argument 0), so that its true anomaly is the argument of latitude, or the longitude if equatorial too.
 * @throws InvalidInputError where the state is not finite, not in space, at the centre or rectilinear
 */
export function elementsFromState(state: Motion, gravitationalParameter = 1): StateElements {
  requireMotion("elementsFromState.state", state);
  if (state.position.length !== 3) refuse("elementsFromState.state", "space", state.position.length);
  requirePositive("elementsFromState.gravitationalParameter", gravitationalParameter);
  const parameter = ddOf(gravitationalParameter);
  const one = ddOf(1);
  const q = ddVector(state.position);
  const v = ddVector(state.velocity);
  const r = ddLength(q);
  if (!(r.hi > 0)) refuse("elementsFromState.state.position", "radius", r.hi);
  const momentum = ddCross(q, v);
  const h = ddLength(momentum);
  if (h.hi === 0) refuse("elementsFromState.state", "rectilinear", 0);
  const axis = momentum.map((component) => ddDivide(component, h));
  const direction = q.map((component) => ddDivide(component, r));
  const vector = ddCombine(ddDivide(one, parameter), ddCross(v, momentum), ddOf(-1), direction);
  const e = ddLength(vector);
  const beta = ddSubtract(ddDivide(ddScale(parameter, 2), r), ddDot(v, v));
  const tilt = ddSqrt(ddAdd(ddMultiply(axis[0]!, axis[0]!), ddMultiply(axis[1]!, axis[1]!)));
  const equatorial = tilt.hi <= degenerate;
  const node: DoubleDoubleVector = equatorial
    ? [one, ddOf(0), ddOf(0)]
    : [ddDivide(ddNegate(axis[1]!), tilt), ddDivide(axis[0]!, tilt), ddOf(0)];
  const circular = e.hi <= degenerate;
  const periapsis = circular ? node : vector.map((component) => ddDivide(component, e));
  const ahead = angleAbout(axis, periapsis, direction);
  const open = beta.hi <= 0;
  return {
    semiLatusRectum: ddToNumber(ddDivide(ddMultiply(h, h), parameter)),
    eccentricity: ddToNumber(e),
    inclination: ddToNumber(ddArctangent2(tilt, axis[2]!)),
    ascendingNode: equatorial ? 0 : angleAbout([ddOf(0), ddOf(0), one], [one, ddOf(0), ddOf(0)], node),
    argumentOfPeriapsis: circular ? 0 : angleAbout(axis, node, periapsis),
    trueAnomaly: open && ahead > Math.PI ? ahead - twoPi.hi : ahead,
    semiMajorAxis: beta.hi === 0 ? Number.POSITIVE_INFINITY : ddToNumber(ddDivide(parameter, beta)),
    energy: -0.5 * ddToNumber(beta),
    angularMomentum: ddToNumber(h),
    eccentricityVector: vector.map(ddToNumber),
  };
}

/**
 * State in space of classical elements, rounded once from double-double.
 * r = p/(1 + e cos nu), v = sqrt(GM/p) (-sin nu, e + cos nu) in the plane of the orbit, turned by argument, inclination and node.
 * @throws InvalidInputError for elements that are not finite, p <= 0, e < 0, or a true anomaly beyond the asymptote
 */
export function stateFromElements(elements: ClassicalElements, gravitationalParameter = 1): Motion {
  requirePositive("stateFromElements.gravitationalParameter", gravitationalParameter);
  requirePositive("stateFromElements.semiLatusRectum", elements.semiLatusRectum);
  requireNonNegative("stateFromElements.eccentricity", elements.eccentricity);
  requireFinite("stateFromElements.inclination", elements.inclination);
  requireFinite("stateFromElements.ascendingNode", elements.ascendingNode);
  requireFinite("stateFromElements.argumentOfPeriapsis", elements.argumentOfPeriapsis);
  requireFinite("stateFromElements.trueAnomaly", elements.trueAnomaly);
  const parameter = ddOf(elements.semiLatusRectum);
  const e = ddOf(elements.eccentricity);
  const anomaly = ddSinCos(ddOf(elements.trueAnomaly));
  const divisor = ddAdd(ddOf(1), ddMultiply(e, anomaly.cos));
  if (!(divisor.hi > 0)) refuse("stateFromElements.trueAnomaly", "asymptote", elements.trueAnomaly);
  const r = ddDivide(parameter, divisor);
  const speed = ddSqrt(ddDivide(ddOf(gravitationalParameter), parameter));
  const { toPeriapsis, ahead } = planeAxes(elements);
  const position = ddCombine(ddMultiply(r, anomaly.cos), toPeriapsis, ddMultiply(r, anomaly.sin), ahead);
  const velocity = ddCombine(
    ddNegate(ddMultiply(speed, anomaly.sin)),
    toPeriapsis,
    ddMultiply(speed, ddAdd(e, anomaly.cos)),
    ahead,
  );
  return { position: position.map(ddToNumber), velocity: velocity.map(ddToNumber) };
}

/** Unit vectors toward periapsis and a quarter turn ahead of it. */
function planeAxes(elements: ClassicalElements): {
  readonly toPeriapsis: DoubleDoubleVector;
  readonly ahead: DoubleDoubleVector;
} {
  const node = ddSinCos(ddOf(elements.ascendingNode));
  const tilt = ddSinCos(ddOf(elements.inclination));
  const turn = ddSinCos(ddOf(elements.argumentOfPeriapsis));
  const zero: DoubleDouble = ddOf(0);
  const toNode = [node.cos, node.sin, zero];
  const up = [ddNegate(ddMultiply(node.sin, tilt.cos)), ddMultiply(node.cos, tilt.cos), tilt.sin];
  return {
    toPeriapsis: ddCombine(turn.cos, toNode, turn.sin, up),
    ahead: ddCombine(ddNegate(turn.sin), toNode, turn.cos, up),
  };
}
