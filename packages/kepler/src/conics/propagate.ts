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
import { ddCombine, ddCross, ddDot, ddLength, ddVector } from "../arithmetic/double-double-vector.ts";
import { refuse, requireFinite, requireMotion, requirePositive } from "../errors.ts";
import type { Motion } from "../vector.ts";
import { stumpff } from "./stumpff.ts";

/** What fixes the radial motion: distance, its rate times the distance, beta = 2 GM/r - v^2, and GM. */
interface RadialStart {
  readonly r: DoubleDouble;
  readonly sigma: DoubleDouble;
  readonly beta: DoubleDouble;
  readonly parameter: DoubleDouble;
}

/** G1 .. G3 = s^k c_k(beta s^2), the time they stand for, the distance there and its derivative in s. */
interface UniversalStep {
  readonly g1: DoubleDouble;
  readonly g2: DoubleDouble;
  readonly g3: DoubleDouble;
  readonly time: DoubleDouble;
  readonly r: DoubleDouble;
  readonly slope: DoubleDouble;
}

function stepAt(s: DoubleDouble, start: RadialStart): UniversalStep {
  const { r, sigma, beta, parameter } = start;
  const s2 = ddMultiply(s, s);
  const c = stumpff(ddMultiply(beta, s2));
  const g1 = ddMultiply(s, c.c1);
  const g2 = ddMultiply(s2, c.c2);
  const g3 = ddMultiply(ddMultiply(s2, s), c.c3);
  const zeta = ddSubtract(parameter, ddMultiply(beta, r));
  return {
    g1,
    g2,
    g3,
    time: ddAdd(ddAdd(ddMultiply(r, g1), ddMultiply(sigma, g2)), ddMultiply(parameter, g3)),
    r: ddAdd(r, ddAdd(ddMultiply(sigma, g1), ddMultiply(zeta, g2))),
    slope: ddAdd(ddMultiply(sigma, c.c0), ddMultiply(zeta, g1)),
  };
}

/** Largest number of trial values of s; a handful in practice. */
const largestTrials = 200;

/**
 * s > 0 whose step takes the time t > 0: Laguerre's iteration (degree 5) kept inside a bracket, as time rises with s everywhere.
 * Source: Conway, Celest. Mech. 39 (1986) 199; Danby & Burkardt, Celest. Mech. 31 (1983) 95.
 */
function solveForTime(t: DoubleDouble, start: RadialStart): DoubleDouble {
  let low = 0;
  let high = Number.POSITIVE_INFINITY;
  let s = t.hi / start.r.hi;
  for (let trial = 0; trial < largestTrials; trial++) {
    const step = stepAt(ddOf(s), start);
    const f = ddSubtract(step.time, t).hi;
    let next = Number.NaN;
    if (f - f === 0) {
      if (f > 0) high = s;
      else low = s;
      const slope = step.r.hi;
      const root = Math.sqrt(Math.abs(16 * slope * slope - 20 * f * step.slope.hi));
      next = s - (5 * f) / (slope + root);
    } else {
      high = s;
    }
    if (Math.abs(next - s) <= 1e-10 * s) {
      s = next;
      break;
    }
    const inside = next > low && next < high;
    s = inside ? next : high < Number.POSITIVE_INFINITY ? 0.5 * (low + high) : 2 * s;
  }
  let exact = ddOf(s);
  for (let pass = 0; pass < 2; pass++) {
    const step = stepAt(exact, start);
    exact = ddSubtract(exact, ddDivide(ddSubtract(step.time, t), step.r));
  }
  return exact;
}

/** The time left after whole periods, within half a period of zero, where the motion is bound. */
function withoutWholePeriods(dt: number, beta: DoubleDouble, parameter: DoubleDouble): DoubleDouble {
  const time = ddOf(dt);
  if (!(beta.hi > 0)) return time;
  const period = ddDivide(ddMultiply(twoPi, parameter), ddMultiply(beta, ddSqrt(beta)));
  const count = Math.round(dt / period.hi);
  return Math.abs(count) < 2 ** 53 ? ddSubtract(time, ddScale(period, count)) : time;
}

/**
 * Position and velocity after the time dt, forward or backward, on the conic through a state: ellipse, parabola and hyperbola in
 * one formula of universal variables, smooth across e = 1. Two or three dimensions; units any that match, `gravitationalParameter`
 * in length^3/time^2 (1 in normalised units).
 *
 * Everything is in double-double, so the result is the exact motion of the given doubles rounded once: at most 1 ulp of the length
 * of the position and of the velocity for |dt| up to 1e8 periods (some tens of microseconds; a {@link ReferenceTrack} is the
 * fast way to many points of one bound orbit). Where the passage is so close that r falls below 1e-12 of the start, fewer digits
 * remain.
 *
 * Source: Stiefel & Scheifele, Linear and Regular Celestial Mechanics (1971), section 11; Danby, Fundamentals of Celestial Mechanics,
 * 2nd ed. (1988), section 6.9.
 * @throws InvalidInputError where the state is not finite, has not two or three components, is at the centre or rectilinear, or dt or
 *   the gravitational parameter is out of range
 */
export function propagate(state: Motion, dt: number, gravitationalParameter = 1): Motion {
  requireMotion("propagate.state", state);
  requireFinite("propagate.dt", dt);
  requirePositive("propagate.gravitationalParameter", gravitationalParameter);
  const position = ddVector(state.position);
  const velocity = ddVector(state.velocity);
  const parameter = ddOf(gravitationalParameter);
  const r = ddLength(position);
  if (!(r.hi > 0)) refuse("propagate.state.position", "radius", r.hi);
  if (ddLength(ddCross(position, velocity)).hi === 0) refuse("propagate.state", "rectilinear", 0);
  const beta = ddSubtract(ddDivide(ddScale(parameter, 2), r), ddDot(velocity, velocity));
  const time = withoutWholePeriods(dt, beta, parameter);
  if (time.hi === 0) return { position: [...state.position], velocity: [...state.velocity] };
  // Backward in time is forward with the velocity reversed.
  const backward = time.hi < 0;
  const start: RadialStart = {
    r,
    sigma: backward ? ddNegate(ddDot(position, velocity)) : ddDot(position, velocity),
    beta,
    parameter,
  };
  const duration = backward ? ddNegate(time) : time;
  const step = stepAt(solveForTime(duration, start), start);
  const fall = ddMultiply(parameter, step.g2);
  const f = ddSubtract(ddOf(1), ddDivide(fall, r));
  const forwardG = ddSubtract(duration, ddMultiply(parameter, step.g3));
  const g = backward ? ddNegate(forwardG) : forwardG;
  const forwardRate = ddDivide(ddMultiply(parameter, step.g1), ddMultiply(step.r, r));
  const fRate = backward ? forwardRate : ddNegate(forwardRate);
  const gRate = ddSubtract(ddOf(1), ddDivide(fall, step.r));
  return {
    position: ddCombine(f, position, g, velocity).map(ddToNumber),
    velocity: ddCombine(fRate, position, gRate, velocity).map(ddToNumber),
  };
}
