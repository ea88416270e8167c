import { zero } from "../exact/rational.ts";
import type { ProgramBuilder } from "../program/builder.ts";
import type { Value } from "../program/program.ts";

/**
 * The time reached, while a step of uneven length is being written: an unevaluated sum hi + lo. Each addition keeps its rounding error
 * (D.E. Knuth's two-sum), so the sum is off by less than 2^-100 of it per step.
 */
export class RunningTime {
  #hi: Value;
  #lo: Value;
  readonly #builder: ProgramBuilder;

  /** `first`: the loop variable that holds hi; lo is the next. */
  constructor(builder: ProgramBuilder, first: number) {
    this.#builder = builder;
    this.#hi = builder.variable(first);
    this.#lo = builder.variable(first + 1);
  }

  add(increment: Value): void {
    const b = this.#builder;
    const sum = b.add(this.#hi, increment);
    const part = b.sub(sum, this.#hi);
    const error = b.add(b.sub(this.#hi, b.sub(sum, part)), b.sub(increment, part));
    this.#hi = sum;
    this.#lo = b.add(this.#lo, error);
  }

  outputs(): [Value, Value] {
    return [this.#hi, this.#lo];
  }
}

/** The first values of the two time variables. */
export function timeZero(builder: ProgramBuilder): [Value, Value] {
  return [builder.constant(zero), builder.constant(zero)];
}
