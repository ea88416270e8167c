import type { Candidate, ChoiceContext } from "./candidate.ts";
import type { Screened } from "./screen.ts";

/**
 * Work that two cores do in a minute, nominally. The budget counts work and not time, so that the same scenario gives the same result on a
 * slow machine and on a busy one. Measured on two cores: 1.2e8 to 2.7e8 a second from implicit steppers to explicit ones in lanes.
 */
export const WORK_PER_MINUTE = 1e10;
/** Scoring a step costs about as much as so many force evaluations. */
const SCORING_WORK = 4;
/** Sum over the band of its factors, with the cells at whole and nearly whole steps beside it, in runs at the recommended step. */
const BAND_RUNS = 17;
/** Runs of the search ladder with the worst three samples, from twice as fine down. */
const LADDER_RUNS = 110;
/** Evaluations of one variable step: the usual pairs take six or seven. */
const USUAL_EVALUATIONS = 6;

export function workOf(steps: number, evaluations: number): number {
  return evaluations + SCORING_WORK * steps;
}

/** Work that a search and a verification in full of this candidate will take, near enough. */
export function workInFull(
  { fleet }: ChoiceContext,
  { knob, samples }: Candidate,
  estimate: Screened,
): number {
  const orbits = fleet.durationSeconds / fleet.shortestPeriodSeconds;
  const { evaluationsPerOrbit, fineness } = estimate;
  const stepsPerOrbit = knob.kind === "step" ? fineness : evaluationsPerOrbit / USUAL_EVALUATIONS;
  return orbits * workOf(stepsPerOrbit, evaluationsPerOrbit) * (samples.length * BAND_RUNS + LADDER_RUNS);
}
