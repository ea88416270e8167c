import type { StepProgram } from "../../src/index.ts";
import { type Arc, anomalyAfter, arcs, exactly, exactPairs } from "./exact-arc.ts";
import { evaluateExactly, type Pairs, pairs } from "./interpret-double-double.ts";

/** State (and what else is carried) after `steps` steps over time 1 of a method's own program, in double-double arithmetic. */
export function runExactly(program: StepProgram, start: Pairs, steps: number, time = 1): Pairs {
  const h: [number, number] = [time / steps, 0];
  // time / steps is exact for the powers of two; for others its rounding error is the remainder of the division.
  if (h[0] * steps !== time || !Number.isInteger(Math.log2(steps))) h[1] = remainder(time, steps, h[0]);
  return runSteps(program, start, steps, h);
}

/** The same for a step given as a pair. */
export function runSteps(
  program: StepProgram,
  start: Pairs,
  steps: number,
  h: readonly [number, number],
): Pairs {
  let now = pairs(program.step.inputs);
  let next = pairs(program.step.inputs);
  evaluateExactly(program.start, h, start, now);
  for (let n = 0; n < steps; n += 1) {
    evaluateExactly(program.step, h, now, next);
    [now, next] = [next, now];
  }
  return now;
}

/** (time - steps q) / steps with the product exact: whole steps below 2^11 times a double of 53 bits, split in two. */
function remainder(time: number, steps: number, q: number): number {
  const high = Math.fround(q);
  return (time - steps * high - steps * (q - high)) / steps;
}

export function stateError(state: Pairs, exact: Pairs): number {
  let sum = 0;
  for (let k = 0; k < 4; k += 1) sum += (state.hi[k]! - exact.hi[k]! + (state.lo[k]! - exact.lo[k]!)) ** 2;
  return Math.sqrt(sum);
}

/**
 * Error of each arc's run in fictitious time: steps of equal s up to s = 1, compared with the exact state at the time reached, so that an
 * error of time counts as one of the state.
 */
function unevenError(program: StepProgram, { start, anomaly }: Arc, steps: number): number {
  const end = runExactly(program, start, steps);
  const [hi, lo] = program.step.time!;
  const time = exactly(end.hi[hi]!)
    .plus(exactly(end.lo[hi]!))
    .plus(exactly(end.hi[lo]!))
    .plus(exactly(end.lo[lo]!));
  return stateError(end, exactPairs("0.3", anomalyAfter("0.3", anomaly, time)));
}

const rms = (values: readonly number[]): number =>
  Math.sqrt(values.reduce((total, value) => total + value * value, 0) / values.length);

/** Slope of log error (root mean square over the arcs) between two step counts, the second twice the first. */
export function observedOrder(program: StepProgram, coarse: number): { order: number; error: number } {
  const errorOf = (arc: Arc, steps: number): number =>
    program.step.time === null
      ? stateError(runExactly(program, arc.start, steps), arc.end)
      : unevenError(program, arc, steps);
  const [first, second] = [coarse, 2 * coarse].map((steps) => rms(arcs.map((arc) => errorOf(arc, steps))));
  return { order: Math.log2(first! / second!), error: second! };
}
