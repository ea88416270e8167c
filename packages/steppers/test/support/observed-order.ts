import type { StepProgram } from "../../src/index.ts";
import { type Arc, arcs } from "./exact-arc.ts";
import { evaluateExactly, type Pairs, pairs } from "./interpret-double-double.ts";

/** State (and what else is carried) after `steps` steps over time 1 of a method's own program, in double-double arithmetic. */
export function runExactly(program: StepProgram, start: Pairs, steps: number, time = 1): Pairs {
  const h: [number, number] = [time / steps, 0];
  // time / steps is exact for the powers of two; for others its rounding error is the remainder of the division.
  if (h[0] * steps !== time || !Number.isInteger(Math.log2(steps))) h[1] = remainder(time, steps, h[0]);
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

/** Root mean square over the arcs of the state error at their ends. */
export function arcError(run: (arc: Arc) => Pairs): number {
  const squares = arcs.map((arc) => stateError(run(arc), arc.end) ** 2);
  return Math.sqrt(squares.reduce((total, square) => total + square) / arcs.length);
}

/** Slope of log error between two step counts, the second twice the first. */
export function observedOrder(program: StepProgram, coarse: number): { order: number; error: number } {
  const [first, second] = [coarse, 2 * coarse].map((steps) =>
    arcError((arc) => runExactly(program, arc.start, steps)),
  );
  return { order: Math.log2(first! / second!), error: second! };
}
