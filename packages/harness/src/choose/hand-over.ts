import { stateAtTrueAnomalyDegrees } from "@perigauge/kepler";
import type { Stepper, Trajectory } from "@perigauge/steppers";
import type { ChoiceContext } from "./candidate.ts";
import type { HandOver, RankedStepper } from "./choice.ts";
import { type FleetPoint, orbitsOf } from "./fleet.ts";

/** The hand-over runs are compared over this long, or the whole duration where it is shorter. */
const DAYS = 7;
const MOST_STEPS = 1e6;

/**
 * What the engineer should see when the choice is repeated with the production code switched to a point mass: how far runs with step h and
 * h/2 part, and how far a run forward and back ends from its start. Both are run here, from the worst case of the binding limit. Only for a
 * fixed step in seconds.
 */
export function handOver(context: ChoiceContext, stepper: Stepper, choice: RankedStepper): HandOver | null {
  const place = choice.bindingLimit === null ? undefined : choice.errors[choice.bindingLimit];
  const point = context.measurer.readings
    .map(({ sample }) => sample.point)
    .find((candidate) => candidate.orbit === place?.orbit && candidate.eccentricity === place.eccentricity);
  if (place === undefined || point === undefined || choice.stepSeconds === null) return null;
  const seconds = Math.min(DAYS * 86400, context.fleet.durationSeconds, MOST_STEPS * choice.stepSeconds);
  const steps = Math.floor(seconds / choice.stepSeconds);
  const h = choice.stepSeconds * point.meanMotion;
  const start = startState(point, place.startAnomalyDeg);
  const full = stepper.begin({ state: start, step: h });
  const half = stepper.begin({ state: start, step: h / 2 });
  const row = new Float64Array(4);
  const other = new Float64Array(8);
  let largest = 0;
  for (let k = 0; k < steps; k++) {
    full.advance(1, row);
    half.advance(2, other);
    largest = Math.max(largest, distance(row, other.subarray(4)));
  }
  // Back by reversed velocities, which every stepper takes.
  const back = stepper.begin({ state: reversed(row), step: h });
  const end = last(back, steps);
  return {
    days: seconds / 86400,
    orbits: orbitsOf(point, seconds),
    orbit: point.orbit,
    eccentricity: point.eccentricity,
    startAnomalyDeg: place.startAnomalyDeg,
    stepSeconds: choice.stepSeconds,
    halfStepDifferenceKm: largest * point.semiMajorAxisKm,
    closureKm: distance(end, reversed(start)) * point.semiMajorAxisKm,
  };
}

function startState({ eccentricity }: FleetPoint, startAnomalyDeg: number): Float64Array {
  const { x, y, vx, vy } = stateAtTrueAnomalyDegrees(eccentricity, startAnomalyDeg);
  return Float64Array.of(x, y, vx, vy);
}

function reversed(state: Float64Array): Float64Array {
  return state.map((value, i) => (i < 2 ? value : -value));
}

function last(trajectory: Trajectory, steps: number): Float64Array {
  const rows = new Float64Array(4);
  for (let k = 0; k < steps; k++) trajectory.advance(1, rows);
  return rows;
}

function distance(a: Float64Array, b: Float64Array): number {
  const dx = (a[0] as number) - (b[0] as number);
  const dy = (a[1] as number) - (b[1] as number);
  return Math.sqrt(dx * dx + dy * dy);
}
