import { orbitThrough, stateAtTrueAnomalyDegrees } from "@perigauge/kepler";
import type { Stepper } from "@perigauge/steppers";
import type { OrbitTrack } from "../../report/evidence.ts";
import type { ChoiceRun } from "../choose-stepper.ts";
import { corners, type FleetPoint } from "../fleet.ts";
import { stepOf } from "./step-of.ts";

const EXACT_POINTS = 361;
const MOST_STEPS = 4000;

/** The most eccentric orbit of the fleet in the plane, one period from periapsis: exact, and step by step with the chosen stepper. */
export function orbitTrack({ choice, context }: ChoiceRun, steppers: readonly Stepper[]): OrbitTrack {
  const point = corners(context.fleet).reduce((a, b) => (b.eccentricity > a.eccentricity ? b : a));
  const winner = choice.ranking.find(({ stepper }) => stepper === choice.choice) ?? choice.current;
  const stepper = steppers.find(({ id }) => id === winner?.stepper);
  return {
    orbit: point.orbit,
    eccentricity: point.eccentricity,
    bodyRadiusKm: context.scenario.bodyRadiusKm ?? null,
    exact: exactPoints(point),
    numerical:
      stepper === undefined || winner == null
        ? []
        : numericalPoints(
            point,
            stepper,
            winner.tolerance,
            stepOf(winner, context.fleet.shortestPeriodSeconds, point),
            context.scenario.step?.maxSeconds,
          ),
    stepper: winner?.stepper ?? "",
  };
}

function exactPoints({ eccentricity, semiMajorAxisKm }: FleetPoint): OrbitTrack["exact"] {
  return Array.from({ length: EXACT_POINTS }, (_, i) => {
    const { x, y } = stateAtTrueAnomalyDegrees(eccentricity, i);
    return { xKm: x * semiMajorAxisKm, yKm: y * semiMajorAxisKm };
  });
}

function numericalPoints(
  { eccentricity, semiMajorAxisKm, meanMotion }: FleetPoint,
  stepper: Stepper,
  tolerance: number | null,
  step: number,
  maxSeconds: number | undefined,
): OrbitTrack["numerical"] {
  const { x, y, vx, vy } = stateAtTrueAnomalyDegrees(eccentricity, 0);
  const state = Float64Array.of(x, y, vx, vy);
  const period = orbitThrough({ x, y, vx, vy }).period;
  const trajectory =
    tolerance !== null
      ? stepper.begin({
          state,
          step: 0,
          tolerance,
          endTime: [period.hi, period.lo],
          ...(maxSeconds === undefined ? {} : { maxStep: maxSeconds * meanMotion }),
        })
      : stepper.begin({ state, step });
  const wanted = tolerance !== null ? MOST_STEPS : Math.min(MOST_STEPS, Math.floor(period.hi / step));
  const rows = new Float64Array(4 * wanted);
  const made = trajectory.advance(wanted, rows, new Float64Array(2 * wanted));
  return Array.from({ length: made }, (_, i) => ({
    xKm: (rows[4 * i] as number) * semiMajorAxisKm,
    yKm: (rows[4 * i + 1] as number) * semiMajorAxisKm,
    step: i + 1,
  }));
}
