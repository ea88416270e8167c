import { lower } from "../program/lower.ts";
import type { Operation, Program, Value } from "../program/program.ts";
import { type FunctionCode, opcode, signed } from "./encoder.ts";
import { LaneCode, type Operand, PAIR_BYTES, type Pointer, ROW_BYTES } from "./lane-code.ts";
import { type StepRows, stepRows } from "./step-rows.ts";

/** Pointers to the pair of lanes at work: in the working rows, in the stream, in the two buffers of carried variables. */
interface Places {
  readonly lane: Pointer;
  readonly stream: Pointer;
  readonly from: Pointer;
  readonly to: Pointer;
}

/**
 * The function `advance(steps, stream, width)` of a step program, steps >= 1. Row 0 of the stream holds the streamed loop variables (the
 * state, then the time where steps are uneven); step n writes row n. `width` is 16 bytes times the pairs of lanes in use.
 *
 * Each stage is a loop over pairs of lanes; what a later stage needs crosses in memory, so that the size of the code does not depend on
 * the number of lanes and little is spilled. Carried variables are read from one buffer and written to another; the two change places at
 * every step, and the first holds the newest values at the end.
 */
export function stepCode(program: Program): FunctionCode {
  const rows = stepRows(program);
  const code = new LaneCode(3, 6);
  const [steps, stream, width] = [code.parameter(0), code.parameter(1), code.parameter(2)];
  const places = { lane: code.pointer(), stream: code.pointer(), from: code.pointer(), to: code.pointer() };
  const [carriedIn, carriedOut] = [code.pointer(), code.pointer()];
  const { segments, prologue } = lower(program);
  const carries = rows.carried.length > 0;

  const overLanes = (body: () => void): void => {
    code.set(places.lane, 0);
    code.set(places.stream, stream);
    code.set(places.from, carriedIn);
    code.set(places.to, carriedOut);
    code.repeat(places.lane, width, () => {
      body();
      for (const pointer of Object.values(places)) code.advance(pointer, PAIR_BYTES);
    });
  };

  code.set(carriedIn, rows.carriedAt[0]);
  code.set(carriedOut, rows.carriedAt[1]);
  overLanes(() => new StageWriter(code, program, rows, places).write(prologue));
  code.countDown(steps, () => {
    segments.forEach((segment, i) => {
      overLanes(() => {
        const writer = new StageWriter(code, program, rows, places);
        writer.write(segment);
        if (i === segments.length - 1) writer.storeUnmade();
      });
    });
    if (carries) {
      code.set(places.from, carriedIn);
      code.set(carriedIn, carriedOut);
      code.set(carriedOut, places.from);
    }
    code.advance(stream, rows.streamed.length * ROW_BYTES);
  });
  if (carries) {
    // After an odd number of steps the newest values stand in the second buffer.
    code.when([...carriedIn.push, ...opcode.i32Const, ...signed(rows.carriedAt[0]), ...opcode.i32Sub], () => {
      overLanes(() => {
        rows.carried.forEach((_, k) => {
          code.store(places.to, k * ROW_BYTES, code.row(places.from, k * ROW_BYTES));
        });
      });
    });
  }
  return code.finish("advance");
}

/** Writes one stage for one pair of lanes. */
class StageWriter {
  readonly #code: LaneCode;
  readonly #program: Program;
  readonly #rows: StepRows;
  readonly #places: Places;
  readonly #made = new Map<Value, Operand>();
  readonly #slotsOf = new Map<Value, number[]>();

  constructor(code: LaneCode, program: Program, rows: StepRows, places: Places) {
    this.#code = code;
    this.#program = program;
    this.#rows = rows;
    this.#places = places;
    program.outputs.forEach((id, slot) => {
      const slots = this.#slotsOf.get(id) ?? [];
      slots.push(slot);
      this.#slotsOf.set(id, slots);
    });
  }

  write(values: readonly Value[]): void {
    for (const id of values) {
      const operation = this.#program.operations[id]!;
      if (operation.kind === "variable") continue;
      const value = this.#apply(operation);
      this.#made.set(id, value);
      const row = this.#rows.rowOf.get(id);
      if (row !== undefined) this.#code.store(this.#places.lane, row, value);
      else this.#storeOutput(id, value);
    }
  }

  /** Outputs that no stage makes: loop variables passed on, constants, and what depends on h alone. */
  storeUnmade(): void {
    for (const id of this.#slotsOf.keys()) {
      const { kind } = this.#program.operations[id]!;
      if (kind === "variable" || kind === "constant" || kind === "step" || this.#rows.rowOf.has(id))
        this.#storeOutput(id, this.#operand(id));
    }
  }

  #storeOutput(id: Value, value: Operand): void {
    for (const slot of this.#slotsOf.get(id) ?? []) {
      const { pointer, offset } = this.#place(slot, "next");
      this.#code.store(pointer, offset, value);
    }
  }

  /** Where loop variable `index` stands, as it is now or after the step. */
  #place(index: number, when: "now" | "next"): { pointer: Pointer; offset: number } {
    const { streamed, carried } = this.#rows;
    const { stream, from, to } = this.#places;
    const place = streamed.indexOf(index);
    if (place >= 0) {
      return { pointer: stream, offset: (place + (when === "next" ? streamed.length : 0)) * ROW_BYTES };
    }
    return { pointer: when === "next" ? to : from, offset: carried.indexOf(index) * ROW_BYTES };
  }

  #operand(id: Value): Operand {
    const made = this.#made.get(id);
    if (made !== undefined) return made;
    const operation = this.#program.operations[id]!;
    const code = this.#code;
    if (operation.kind === "constant") return code.constant(operation.value);
    if (operation.kind === "step") return code.row(this.#places.lane, this.#rows.stepAt);
    if (operation.kind === "variable") {
      const { pointer, offset } = this.#place(operation.index, "now");
      return code.row(pointer, offset);
    }
    const row = this.#rows.rowOf.get(id);
    if (row !== undefined) return code.row(this.#places.lane, row);
    const { pointer, offset } = this.#place(this.#slotsOf.get(id)![0]!, "next");
    return code.row(pointer, offset);
  }

  #apply(operation: Operation): Operand {
    const code = this.#code;
    const [a, b, c] = operation.args.map((arg) => this.#operand(arg)) as [Operand, Operand, Operand];
    switch (operation.kind) {
      case "add":
        return code.add(a, b);
      case "sub":
        return code.sub(a, b);
      case "mul":
        return code.mul(a, b);
      case "div":
        return code.div(a, b);
      case "max":
        return code.larger(a, b);
      case "less-equal":
        return code.and(code.lessEqual(a, b), code.constant(1));
      case "select":
        return code.select(code.notEqual(a, code.constant(0)), b, c);
      case "sqrt":
        return code.sqrt(a);
      case "abs":
        return code.abs(a);
      default:
        throw new Error(`lanes: a step with ${operation.kind} has no vector form`);
    }
  }
}
