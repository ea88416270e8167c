import type { Operation, Program, Value } from "../program/program.ts";
import type { LaneCode } from "./lane-code.ts";
import type { Operand, Pointer } from "./lane-layout.ts";

/** One quantity of a pair of lanes in memory. */
export interface Place {
  readonly pointer: Pointer;
  readonly offset: number;
}

/** Where a program's values stand while a pair of lanes is at work. */
export interface ProgramPlaces {
  /** The pair, counted in bytes from address 0: the pointer to all rows of `rowOf` and to `stepAt`. */
  readonly lane: Pointer;
  readonly rowOf: ReadonlyMap<Value, number>;
  readonly stepAt: number;
  input(index: number): Place;
  output(slot: number): Place;
}

/** Writes one stage of a program for one pair of lanes. */
export class StageWriter {
  readonly #code: LaneCode;
  readonly #program: Program;
  readonly #places: ProgramPlaces;
  readonly #made = new Map<Value, Operand>();
  readonly #slotsOf = new Map<Value, number[]>();

  constructor(code: LaneCode, program: Program, places: ProgramPlaces) {
    this.#code = code;
    this.#program = program;
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
      const row = this.#places.rowOf.get(id);
      if (row !== undefined) this.#code.store(this.#places.lane, row, value);
      else this.#storeOutput(id, value);
    }
  }

  /** Outputs that no stage makes: loop variables passed on, constants, and what depends on h alone. */
  storeUnmade(): void {
    for (const id of this.#slotsOf.keys()) {
      const { kind } = this.#program.operations[id]!;
      if (kind === "variable" || kind === "constant" || kind === "step" || this.#places.rowOf.has(id))
        this.#storeOutput(id, this.#operand(id));
    }
  }

  #storeOutput(id: Value, value: Operand): void {
    for (const slot of this.#slotsOf.get(id) ?? []) {
      const { pointer, offset } = this.#places.output(slot);
      this.#code.store(pointer, offset, value);
    }
  }

  #operand(id: Value): Operand {
    const made = this.#made.get(id);
    if (made !== undefined) return made;
    const operation = this.#program.operations[id]!;
    const code = this.#code;
    if (operation.kind === "constant") return code.constant(operation.value);
    if (operation.kind === "step") return code.row(this.#places.lane, this.#places.stepAt);
    if (operation.kind === "variable") {
      const { pointer, offset } = this.#places.input(operation.index);
      return code.row(pointer, offset);
    }
    const row = this.#places.rowOf.get(id);
    if (row !== undefined) return code.row(this.#places.lane, row);
    const { pointer, offset } = this.#places.output(this.#slotsOf.get(id)![0]!);
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
