import type { ProgramBuilder } from "../program/builder.ts";
import type { Value } from "../program/program.ts";
import type { Summation } from "../stepper.ts";

/**
 * The state while a step is being written. Every change goes through `kick` and `drift`, which either add (plain) or carry the rounding
 * error of each addition to the next one (compensated: W. Kahan, CACM 8 (1965) 40; O. Møller, BIT 5 (1965) 37-50). Compensated, a
 * component that only grows by such increments is off by at most 2^-52 |state| at any time, plus the rounding of the increments
 * themselves: increments of relative size h are rounded h times finer than the state.
 */
export class RunningState {
  readonly position: Value[];
  readonly velocity: Value[];
  readonly #builder: ProgramBuilder;
  readonly #errors: Value[] | null;

  constructor(builder: ProgramBuilder, summation: Summation) {
    const d = builder.dimension;
    this.#builder = builder;
    this.position = builder.vector(0);
    this.velocity = builder.vector(d);
    // Compensations are the loop variables right after the state.
    this.#errors = summation === "plain" ? null : [...builder.vector(2 * d), ...builder.vector(3 * d)];
  }

  /** q[k] += increment. */
  drift(k: number, increment: Value): void {
    this.position[k] = this.#sum(this.position[k]!, increment, k);
  }

  /** v[k] += increment. */
  kick(k: number, increment: Value): void {
    this.velocity[k] = this.#sum(this.velocity[k]!, increment, this.#builder.dimension + k);
  }

  /** State, then compensations: the first loop variables' next values. */
  outputs(): Value[] {
    return [...this.position, ...this.velocity, ...(this.#errors ?? [])];
  }

  #sum(value: Value, increment: Value, slot: number): Value {
    const b = this.#builder;
    if (this.#errors === null) return b.add(value, increment);
    const corrected = b.sub(increment, this.#errors[slot]!);
    const total = b.add(value, corrected);
    this.#errors[slot] = b.sub(b.sub(total, value), corrected);
    return total;
  }
}

/** Loop variables that the summation adds to the state. */
export function compensations(dimension: number, summation: Summation): number {
  return summation === "plain" ? 0 : 2 * dimension;
}
