import type { Executable, SuppliedForce } from "./executable.ts";
import type { Operation, Program } from "./program.ts";

/** Runs a program one operation at a time: slow and obvious, the oracle for every emitter and the fallback where none may run. */
export function interpret(program: Program): Executable {
  const values = new Float64Array(program.operations.length);
  const width = 2 * program.dimension;
  return {
    evaluate(step, inputs, outputs, force): void {
      runOnce(program, values, step, inputs, force);
      program.outputs.forEach((id, k) => {
        outputs[k] = values[id]!;
      });
    },
    advance(steps, step, variables, rows, times, force): void {
      for (let n = 0; n < steps; n += 1) {
        runOnce(program, values, step, variables, force);
        program.outputs.forEach((id, k) => {
          variables[k] = values[id]!;
        });
        rows.set(variables.subarray(0, width), n * width);
        if (program.time !== null) {
          times[2 * n] = variables[program.time[0]]!;
          times[2 * n + 1] = variables[program.time[1]]!;
        }
      }
    },
  };
}

function runOnce(
  program: Program,
  values: Float64Array,
  step: number,
  inputs: Float64Array,
  force: SuppliedForce,
): void {
  const { position, velocity, result } = force;
  const d = program.dimension;
  // Results of calls, by the operation that called: a later call overwrites them.
  const results = new Map<number, Float64Array>();
  const { operations } = program;
  for (let id = 0; id < operations.length; id += 1) {
    const operation = operations[id]!;
    if (operation.kind === "acceleration" || operation.kind === "jerk") {
      operation.args.forEach((arg, k) => {
        if (k < d) position[k] = values[arg]!;
        else velocity[k - d] = values[arg]!;
      });
      if (operation.kind === "acceleration") force.acceleration(position, result);
      else force.jerk(position, velocity, result);
      results.set(id, result.slice());
    } else if (operation.kind === "component") {
      values[id] = results.get(operation.args[0])![operation.index]!;
    } else values[id] = apply(operation, values, step, inputs);
  }
}

function apply(operation: Operation, values: Float64Array, step: number, inputs: Float64Array): number {
  const { args } = operation;
  const a = values[args[0]!]!;
  const b = values[args[1]!]!;
  switch (operation.kind) {
    case "step":
      return step;
    case "variable":
      return inputs[operation.index]!;
    case "constant":
      return operation.value;
    case "add":
      return a + b;
    case "sub":
      return a - b;
    case "mul":
      return a * b;
    case "div":
      return a / b;
    case "max":
      // Compare and select, as every emitter does it: Math.max treats NaN and signed zeros otherwise.
      if (a > b) return a;
      return b;
    case "less-equal":
      return a <= b ? 1 : 0;
    case "select":
      return a !== 0 ? b : values[args[2]!]!;
    case "sqrt":
      return Math.sqrt(a);
    case "abs":
      return Math.abs(a);
    default:
      throw new TypeError(`${operation.kind} is a call`);
  }
}
