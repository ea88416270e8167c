import { equal, isZero, one, type Rational, rational, toDoubleDouble } from "../exact/rational.ts";
import {
  type BinaryKind,
  type Dimension,
  isCall,
  type Operation,
  type Program,
  type Value,
} from "./program.ts";

/** Writes a force evaluation into a program. */
export interface Force {
  /** From a position (one value per dimension) to an acceleration. */
  acceleration(builder: ProgramBuilder, position: readonly Value[]): Value[];
  /** From position and velocity to the acceleration's time derivative. */
  jerk(builder: ProgramBuilder, position: readonly Value[], velocity: readonly Value[]): Value[];
}

const minusOne = rational(-1n);

/** Collects the operations of one program; equal operations on equal arguments are made once, unused ones are dropped at the end. */
export class ProgramBuilder {
  readonly dimension: Dimension;
  readonly #force: Force;
  readonly #inputs: number;
  readonly #operations: Operation[] = [];
  readonly #known = new Map<string, Value>();
  readonly #stageEnds: Value[] = [];

  readonly #backward: boolean;

  /** `backward`: the step that the program writes is minus the one it is run with. */
  constructor(dimension: Dimension, inputs: number, force: Force, backward = false) {
    this.#backward = backward;
    this.dimension = dimension;
    this.#inputs = inputs;
    this.#force = force;
  }

  get step(): Value {
    const step = this.#append({ kind: "step", args: [] }, "step");
    return this.#backward ? this.mul(this.constant(minusOne), step) : step;
  }

  variable(index: number): Value {
    return this.#append({ kind: "variable", index, args: [] }, `variable ${index}`);
  }

  /** The variables from `first` on, one per dimension. */
  vector(first: number): Value[] {
    return Array.from({ length: this.dimension }, (_, k) => this.variable(first + k));
  }

  constant(value: Rational): Value {
    const [hi, lo] = toDoubleDouble(value);
    return this.#append({ kind: "constant", value: hi, tail: lo, args: [] }, `constant ${hi} ${lo}`);
  }

  binary(kind: BinaryKind, left: Value, right: Value): Value {
    return this.#append({ kind, args: [left, right] }, `${kind} ${left} ${right}`);
  }
  add(left: Value, right: Value): Value {
    return this.binary("add", left, right);
  }
  sub(left: Value, right: Value): Value {
    return this.binary("sub", left, right);
  }
  mul(left: Value, right: Value): Value {
    return this.binary("mul", left, right);
  }
  div(left: Value, right: Value): Value {
    return this.binary("div", left, right);
  }
  max(left: Value, right: Value): Value {
    return this.binary("max", left, right);
  }
  sqrt(operand: Value): Value {
    return this.#append({ kind: "sqrt", args: [operand] }, `sqrt ${operand}`);
  }
  abs(operand: Value): Value {
    return this.#append({ kind: "abs", args: [operand] }, `abs ${operand}`);
  }
  select(condition: Value, yes: Value, no: Value): Value {
    return this.#append({ kind: "select", args: [condition, yes, no] }, `select ${condition} ${yes} ${no}`);
  }

  /** coefficient * value, without the multiplication where the coefficient is 1. */
  scale(coefficient: Rational, value: Value): Value {
    return equal(coefficient, one) ? value : this.mul(this.constant(coefficient), value);
  }

  /** Sum of coefficient * value from left to right, zero coefficients skipped; null where all are zero. */
  weightedSum(coefficients: readonly Rational[], values: readonly Value[]): Value | null {
    let total: Value | null = null;
    for (let i = 0; i < coefficients.length; i += 1) {
      const coefficient = coefficients[i]!;
      if (isZero(coefficient)) continue;
      const value = values[i]!;
      if (total === null) total = this.scale(coefficient, value);
      else if (equal(coefficient, minusOne)) total = this.sub(total, value);
      else total = this.add(total, this.scale(coefficient, value));
    }
    return total;
  }

  /** One force evaluation; ends a stage. */
  acceleration(position: readonly Value[]): Value[] {
    const result = this.#force.acceleration(this, position);
    this.#stageEnds.push(this.#operations.length - 1);
    return result;
  }

  /** One force evaluation that gives the jerk as well; ends a stage. */
  accelerationAndJerk(
    position: readonly Value[],
    velocity: readonly Value[],
  ): { readonly acceleration: Value[]; readonly jerk: Value[] } {
    const acceleration = this.#force.acceleration(this, position);
    const jerk = this.#force.jerk(this, position, velocity);
    this.#stageEnds.push(this.#operations.length - 1);
    return { acceleration, jerk };
  }

  /** A call of a force that the caller of the program supplies. Every call is made, even twice at one position. */
  call(kind: "acceleration" | "jerk", args: readonly Value[]): Value[] {
    const call = this.#operations.push({ kind, args }) - 1;
    return Array.from({ length: this.dimension }).map((_, index) =>
      this.#append({ kind: "component", index, args: [call] }, `component ${call} ${index}`),
    );
  }

  finish(outputs: readonly Value[], time: Program["time"] = null): Program {
    const used = new Set<Value>(outputs);
    for (let id = this.#operations.length - 1; id >= 0; id -= 1) {
      const operation = this.#operations[id]!;
      if (isCall(operation)) used.add(id);
      if (used.has(id)) for (const arg of operation.args) used.add(arg);
    }
    const renumbered = new Map<Value, Value>();
    const operations: Operation[] = [];
    const stageEnds: Value[] = [];
    this.#operations.forEach((operation, id) => {
      if (used.has(id)) {
        const args = operation.args.map((arg) => renumbered.get(arg)!);
        renumbered.set(id, operations.push({ ...operation, args } as Operation) - 1);
      }
      if (this.#stageEnds.includes(id)) stageEnds.push(operations.length - 1);
    });
    return {
      dimension: this.dimension,
      inputs: this.#inputs,
      operations,
      outputs: outputs.map((id) => renumbered.get(id)!),
      stageEnds,
      time,
    };
  }

  #append(operation: Operation, key: string): Value {
    const known = this.#known.get(key);
    if (known !== undefined) return known;
    const id = this.#operations.push(operation) - 1;
    this.#known.set(key, id);
    return id;
  }
}
