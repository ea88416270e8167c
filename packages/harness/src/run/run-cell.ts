import { orbitThrough, referenceTrack, stateAtTrueAnomalyDegrees } from "@perigauge/kepler";
import type { Stepper, Trajectory } from "@perigauge/steppers";
import { CHUNK_STEPS, makeChunk } from "../score/chunk.ts";
import { RunScorer, type ScoringPlan } from "../score/run-scorer.ts";
import type { Cell, Score } from "../score/score.ts";
import { endOfOrbits, stepsBy } from "./orbit-times.ts";
import { type ResolvedCell, resolveCell } from "./resolve-cell.ts";

/**
 * Runs one cell and scores it at every step. Pure: the same cell gives the same bits, whatever runs beside it.
 *
 * @throws InvalidInputError for a cell that cannot be run; a run that diverges is a score with `ended.status` "diverged".
 */
export function runCell(cell: Cell, stepper: Stepper, plan: ScoringPlan): Score {
  const resolved = resolveCell(cell, stepper);
  // The start is rounded to doubles; the orbit that is scored against is the exact one through it.
  const startState = stateAtTrueAnomalyDegrees(cell.eccentricity, cell.startAnomalyDeg);
  const start = Float64Array.of(startState.x, startState.y, startState.vx, startState.vy);
  const orbit = orbitThrough(startState);
  const track = referenceTrack(orbit);
  const chunk = makeChunk();
  const scorer = new RunScorer(resolved, orbit, start, plan);
  const trajectory = beginTrajectory(resolved, start);
  const horizonSteps = plan.horizons.map((orbits) =>
    stepper.uneven ? null : stepsBy(orbits, resolved.stepsPerOrbit as number),
  );

  let made = 0;
  const total = resolved.steps ?? Number.POSITIVE_INFINITY;
  while (made < total) {
    // A fixed-step chunk ends at a horizon; an uneven one is cut by its times in the scorer.
    let wanted = Math.min(CHUNK_STEPS, total - made);
    for (const at of horizonSteps) if (at !== null && at > made) wanted = Math.min(wanted, at - made);
    const count = trajectory.advance(wanted, chunk.rows, chunk.times);
    if (count === 0) break;
    chunk.firstStep = made + 1;
    chunk.count = count;
    if (stepper.uneven) track.statesAtTimes(chunk.times, count, chunk.exact);
    else track.statesAtSteps(made + 1, count, resolved.step as number, chunk.exact);
    made += count;
    if (!scorer.accept(chunk)) break;
  }
  return scorer.finish(trajectory);
}

function beginTrajectory({ cell, stepper, step }: ResolvedCell, state: Float64Array): Trajectory {
  if (stepper.knob === "step")
    return stepper.begin({ state, step: step as number, summation: cell.summation });
  return stepper.begin({
    state,
    step: 0,
    tolerance: cell.tolerance as number,
    endTime: endOfOrbits(cell.orbits),
    summation: cell.summation,
    ...(cell.maxStep === undefined ? {} : { maxStep: cell.maxStep }),
  });
}
