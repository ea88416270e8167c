import {
  type DoubleDouble,
  ddAdd,
  ddArctangent2,
  ddDivide,
  ddMultiply,
  ddOf,
  ddScale,
  ddSinCos,
  ddSinCosDegrees,
  ddSolveKepler,
  ddSqrt,
  ddSubtract,
  ddToNumber,
  orbitThrough,
  stateAtTrueAnomalyDegrees,
  twoPi,
  twoProduct,
} from "@perigauge/kepler";
import { mustBe } from "../errors.ts";

/**
 * The exact orbit at one time; normalised units, radians, each number within an ulp. Anomalies lie in (-pi, pi], so that they keep all
 * their digits after any number of orbits.
 */
export interface ExactState {
  readonly t: number;
  readonly x: number;
  readonly y: number;
  readonly vx: number;
  readonly vy: number;
  readonly meanAnomaly: number;
  readonly eccentricAnomaly: number;
  readonly trueAnomaly: number;
}

/**
 * Which exact orbit: that of the elements themselves (semi-major axis exactly 1, period exactly 2 pi), or the one through the start
 * rounded to doubles, which scoring uses. They part by the rounding of the start: up to 1e-8 rad after 1e6 orbits.
 */
export type ExactOrbitKind = "of elements" | "through rounded start";

/** An orbit with periapsis on the axis (px, py); everything in double-double. */
interface ExactOrbit {
  readonly eccentricity: DoubleDouble;
  readonly semiMajorAxis: DoubleDouble;
  readonly meanMotion: DoubleDouble;
  readonly startMeanAnomaly: DoubleDouble;
  readonly px: DoubleDouble;
  readonly py: DoubleDouble;
}

/** States at t = k h, k h held exactly, with h the double nearest 2 pi / N. @throws InvalidInputError for a step number that is not whole. */
export function exactAtSteps(
  eccentricity: number,
  startAnomalyDeg: number,
  stepsPerOrbit: number,
  steps: readonly number[],
  kind: ExactOrbitKind,
): ExactState[] {
  const h = (2 * Math.PI) / stepsPerOrbit;
  const orbit = exactOrbit(eccentricity, startAnomalyDeg, kind);
  return steps.map((k) => {
    if (!Number.isSafeInteger(k)) throw mustBe("--at-step", "a whole number", k);
    return exactState(orbit, twoProduct(k, h));
  });
}

/** States at so many nominal periods of 2 pi after the start. */
export function exactAtPeriods(
  eccentricity: number,
  startAnomalyDeg: number,
  periods: readonly number[],
  kind: ExactOrbitKind,
): ExactState[] {
  const orbit = exactOrbit(eccentricity, startAnomalyDeg, kind);
  return periods.map((t) => {
    if (!(Math.abs(t) <= MOST_PERIODS)) throw mustBe("--periods", `at most ${MOST_PERIODS} in size`, t);
    return exactState(orbit, ddScale(twoPi, t));
  });
}

/** Beyond this many periods double-double no longer holds the anomaly to an ulp. */
const MOST_PERIODS = 1e12;
const one = ddOf(1);

function exactOrbit(eccentricity: number, startAnomalyDeg: number, kind: ExactOrbitKind): ExactOrbit {
  if (kind === "through rounded start") {
    const orbit = orbitThrough(stateAtTrueAnomalyDegrees(eccentricity, startAnomalyDeg));
    return { ...orbit, startMeanAnomaly: orbit.meanAnomaly, px: orbit.periapsisX, py: orbit.periapsisY };
  }
  const e = ddOf(eccentricity);
  const { sin, cos } = ddSinCosDegrees(startAnomalyDeg);
  // sin E and cos E from the true anomaly, both times 1 + e cos nu.
  const eccentricAnomaly = ddArctangent2(ddMultiply(axisRatio(e), sin), ddAdd(e, cos));
  const startMeanAnomaly = ddSubtract(eccentricAnomaly, ddMultiply(e, ddSinCos(eccentricAnomaly).sin));
  return { eccentricity: e, semiMajorAxis: one, meanMotion: one, startMeanAnomaly, px: one, py: ddOf(0) };
}

/** sqrt(1 - e^2) without cancellation. */
function axisRatio(e: DoubleDouble): DoubleDouble {
  return ddSqrt(ddMultiply(ddSubtract(one, e), ddAdd(one, e)));
}

/** State and anomalies at time t: the mean anomaly is reduced by 2 pi in double-double, Kepler's equation solved in the same. */
function exactState(orbit: ExactOrbit, time: DoubleDouble): ExactState {
  const { eccentricity: e, semiMajorAxis: a, meanMotion, startMeanAnomaly, px, py } = orbit;
  const mean = ddAdd(startMeanAnomaly, ddMultiply(meanMotion, time));
  const reduced = ddSubtract(mean, ddScale(twoPi, Math.ceil(mean.hi / twoPi.hi - 0.5)));
  const eccentricAnomaly = ddSolveKepler(e, reduced);
  const { sin, cos } = ddSinCos(eccentricAnomaly);
  const ratio = axisRatio(e);
  // Along the axis of periapsis and across it.
  const along = ddMultiply(a, ddSubtract(cos, e));
  const across = ddMultiply(a, ddMultiply(ratio, sin));
  const rate = ddDivide(ddMultiply(a, meanMotion), ddSubtract(one, ddMultiply(e, cos)));
  const alongRate = ddMultiply(rate, ddScale(sin, -1));
  const acrossRate = ddMultiply(rate, ddMultiply(ratio, cos));
  const turn = (u: DoubleDouble, w: DoubleDouble): [x: number, y: number] => [
    ddToNumber(ddSubtract(ddMultiply(u, px), ddMultiply(w, py))),
    ddToNumber(ddAdd(ddMultiply(u, py), ddMultiply(w, px))),
  ];
  const [x, y] = turn(along, across);
  const [vx, vy] = turn(alongRate, acrossRate);
  return {
    t: ddToNumber(time),
    x,
    y,
    vx,
    vy,
    meanAnomaly: ddToNumber(reduced),
    eccentricAnomaly: ddToNumber(eccentricAnomaly),
    trueAnomaly: ddToNumber(ddArctangent2(across, along)),
  };
}
