import type { Candidate, ChoiceContext } from "./candidate.ts";
import type { Screened } from "./screen.ts";

/**
 * Steps that two cores make and score in a minute, nominally. The budget counts steps and not time, so that the same scenario gives the
 * same result on a slow machine and on a busy one.
 */
export const STEPS_PER_MINUTE = 1.5e9;
/** Sum over the band of its factors, with the cells at whole and nearly whole steps beside it, in runs at the recommended step. */
const BAND_WORK = 17;
/** Runs of the search ladder with the worst three samples, from twice as fine down. */
const LADDER_WORK = 110;
/** Evaluations of one step where a variable-step stepper does not say: the usual pairs take six or seven. */
const USUAL_EVALUATIONS = 6;

/** Steps that a search and a verification in full of this candidate will take, near enough. */
export function stepsInFull(
  { fleet }: ChoiceContext,
  { stepper, samples }: Candidate,
  estimate: Screened,
): number {
  const orbits = fleet.durationSeconds / fleet.shortestPeriodSeconds;
  const perOrbit = estimate.evaluationsPerOrbit / (stepper.evaluationsPerStep ?? USUAL_EVALUATIONS);
  return orbits * perOrbit * (samples.length * BAND_WORK + LADDER_WORK);
}
