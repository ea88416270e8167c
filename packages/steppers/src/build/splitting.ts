import { parseRow } from "../exact/coefficients.ts";
import type { Rational } from "../exact/rational.ts";
import type { Splitting } from "../methods/method.ts";
import type { StepProgram, Value } from "../program/program.ts";
import { buildStep, type Setting } from "./step-program.ts";

export interface SplittingOperation {
  readonly kind: "drift" | "kick";
  readonly weight: Rational;
}

/** All operations of a splitting in order, the mirrored half included. */
export function operationsOf(method: Splitting): readonly SplittingOperation[] {
  const half = parseRow(method.weights);
  const weights = method.symmetric ? [...half, ...half.slice(0, -1).reverse()] : half;
  const other = method.first === "drift" ? "kick" : "drift";
  return weights.map((weight, i) => ({ kind: i % 2 === 0 ? method.first : other, weight }));
}

/**
 * One step. Where it begins and ends with a kick, the acceleration of the last one serves the first one of the next step (the position is
 * the same), so it is carried.
 */
export function buildSplitting(operations: readonly SplittingOperation[], setting: Setting): StepProgram {
  const carries = operations[0]!.kind === "kick" && operations.at(-1)!.kind === "kick";
  return buildStep(setting, carries, (b, state, carried) => {
    let acceleration: readonly Value[] = carried;
    operations.forEach(({ kind, weight }, i) => {
      const factor = b.scale(weight, b.step);
      if (kind === "drift") {
        for (let k = 0; k < b.dimension; k += 1) state.drift(k, b.mul(factor, state.velocity[k]!));
        return;
      }
      if (i > 0 || !carries) acceleration = b.acceleration([...state.position]);
      for (let k = 0; k < b.dimension; k += 1) state.kick(k, b.mul(factor, acceleration[k]!));
    });
    return carries ? acceleration : null;
  });
}
