import type { Executable, SuppliedForce } from "./executable.ts";
import type { Program } from "./program.ts";

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
  program.operations.forEach((operation, id) => {
    const { args } = operation;
    const [a, b, c] = [values[args[0] ?? 0]!, values[args[1] ?? 0]!, values[args[2] ?? 0]!];
    switch (operation.kind) {
      case "step":
        values[id] = step;
        break;
      case "variable":
        values[id] = inputs[operation.index]!;
        break;
      case "constant":
        values[id] = operation.value;
        break;
      case "add":
        values[id] = a + b;
        break;
      case "sub":
        values[id] = a - b;
        break;
      case "mul":
        values[id] = a * b;
        break;
      case "div":
        values[id] = a / b;
        break;
      case "max":
        values[id] = Math.max(a, b);
        break;
      case "less-equal":
        values[id] = a <= b ? 1 : 0;
        break;
      case "select":
        values[id] = a !== 0 ? b : c;
        break;
      case "sqrt":
        values[id] = Math.sqrt(a);
        break;
      case "abs":
        values[id] = Math.abs(a);
        break;
      case "acceleration":
      case "jerk":
        args.forEach((arg, k) => {
          if (k < d) position[k] = values[arg]!;
          else velocity[k - d] = values[arg]!;
        });
        if (operation.kind === "acceleration") force.acceleration(position, result);
        else force.jerk(position, velocity, result);
        results.set(id, result.slice());
        break;
      case "component":
        values[id] = results.get(args[0]!)![operation.index]!;
        break;
    }
  });
}
