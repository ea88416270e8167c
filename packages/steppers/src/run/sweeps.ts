import { countEvaluations } from "../program/count.ts";
import type { Executable, SuppliedForce } from "../program/executable.ts";
import type { Program } from "../program/program.ts";

/** A fixed-point iteration still changing by more than this part of its size has not come down to rounding. */
const roundingLevel = 1e-12;
const mostSweeps = 100;

/**
 * Repeats `sweep` on the node accelerations in `inputs` (from index `nodesAt`) until they no longer change, or until the change stops
 * falling at rounding level: the rule of E. Hairer, R.I. McLachlan, A. Razakarivony, BIT 48 (2008) 231-243, which leaves no error of a
 * systematic sign. A step too large to converge ends after 100 sweeps with whatever came out. Returns the evaluations made.
 */
export function iterate(
  program: Program,
  sweep: Executable,
  h: number,
  inputs: Float64Array,
  outputs: Float64Array,
  nodesAt: number,
  force: SuppliedForce,
): number {
  const count = outputs.length - 2;
  const nodes = outputs.subarray(0, count);
  let previous = Number.POSITIVE_INFINITY;
  for (let n = 1; ; n += 1) {
    sweep.evaluate(h, inputs, outputs, force);
    inputs.set(nodes, nodesAt);
    const change = outputs[count]!;
    const settled = change >= previous && change <= roundingLevel * outputs[count + 1]!;
    if (change === 0 || settled || n === mostSweeps || !Number.isFinite(outputs[count + 1])) {
      return n * countEvaluations(program);
    }
    previous = change;
  }
}
