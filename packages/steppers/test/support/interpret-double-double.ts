import { type Program, pointMass } from "../../src/index.ts";
import { Accumulator } from "./double-double.ts";

/** Values as unevaluated sums, by index: hi and lo. */
export interface Pairs {
  readonly hi: Float64Array;
  readonly lo: Float64Array;
}

export const pairs = (length: number): Pairs => ({
  hi: new Float64Array(length),
  lo: new Float64Array(length),
});

/** The force that these proofs use; a supplied force has no second half. */
export const force = pointMass;

const accumulator = new Accumulator();

/** Runs a program once in double-double arithmetic; constants are taken with their tails, so to 32 digits. */
export function evaluateExactly(
  program: Program,
  step: readonly [number, number],
  inputs: Pairs,
  outputs: Pairs,
): void {
  const { hi, lo } = workspace(program);
  program.operations.forEach((operation, id) => {
    const { args } = operation;
    const [a, b] = [args[0] ?? 0, args[1] ?? 0];
    switch (operation.kind) {
      case "step":
        accumulator.set(step[0], step[1]);
        break;
      case "variable":
        accumulator.set(inputs.hi[operation.index]!, inputs.lo[operation.index]!);
        break;
      case "constant":
        accumulator.set(operation.value, operation.tail);
        break;
      case "add":
        accumulator.add(hi[a]!, lo[a]!, hi[b]!, lo[b]!);
        break;
      case "sub":
        accumulator.add(hi[a]!, lo[a]!, -hi[b]!, -lo[b]!);
        break;
      case "mul":
        accumulator.mul(hi[a]!, lo[a]!, hi[b]!, lo[b]!);
        break;
      case "div":
        accumulator.div(hi[a]!, lo[a]!, hi[b]!, lo[b]!);
        break;
      case "sqrt":
        accumulator.sqrt(hi[a]!, lo[a]!);
        break;
      case "abs": {
        const sign = hi[a]! < 0 ? -1 : 1;
        accumulator.set(sign * hi[a]!, sign * lo[a]!);
        break;
      }
      case "max": {
        const greater = hi[a]! > hi[b]! || (hi[a] === hi[b] && lo[a]! > lo[b]!) ? a : b;
        accumulator.set(hi[greater]!, lo[greater]!);
        break;
      }
      default:
        throw new Error(`no double-double form of ${operation.kind}`);
    }
    hi[id] = accumulator.hi;
    lo[id] = accumulator.lo;
  });
  program.outputs.forEach((id, k) => {
    outputs.hi[k] = hi[id]!;
    outputs.lo[k] = lo[id]!;
  });
}

const workspaces = new WeakMap<Program, Pairs>();

function workspace(program: Program): Pairs {
  let found = workspaces.get(program);
  if (found === undefined) {
    found = pairs(program.operations.length);
    workspaces.set(program, found);
  }
  return found;
}
