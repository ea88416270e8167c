import { lower } from "./lower.ts";
import type { Program } from "./program.ts";

/** Force evaluations of one run through the program. */
export function countEvaluations(program: Program): number {
  return program.stageEnds.length;
}

/** Floating-point operations of one step; what depends on constants and h alone is computed once a run and not counted. */
export function countFlops(program: Program): number {
  const uncounted = new Set(["step", "variable", "constant", "acceleration", "jerk", "component"]);
  const inLoop = lower(program).segments.flat();
  return inLoop.filter((id) => !uncounted.has(program.operations[id]!.kind)).length;
}
