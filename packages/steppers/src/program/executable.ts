import type { Acceleration, Jerk } from "../stepper.ts";

/**
 * Runs a step program `steps` times. `variables` holds the loop variables and is left at the last step's; after each step the state
 * (2 x dimension numbers) goes to `rows` and, where the program has a time, hi and lo to `times`.
 */
export type Advance = (
  steps: number,
  step: number,
  variables: Float64Array,
  rows: Float64Array,
  times: Float64Array,
  force: SuppliedForce,
) => void;

/** Runs a program once, from `inputs` to `outputs`. */
export type Evaluate = (
  step: number,
  inputs: Float64Array,
  outputs: Float64Array,
  force: SuppliedForce,
) => void;

export interface Executable {
  readonly advance: Advance;
  readonly evaluate: Evaluate;
}

/**
 * What a program calls for accelerations that are not written into it, and where it puts the arguments and finds the result: arrays of one
 * run, so that runs do not share state.
 */
export interface SuppliedForce {
  readonly acceleration: Acceleration;
  readonly jerk: Jerk;
  readonly position: Float64Array;
  readonly velocity: Float64Array;
  readonly result: Float64Array;
}

const nothing = (): void => {};

/** The supplied side of a run; programs with the force written into them never call it. */
export function supply(
  dimension: number,
  acceleration: Acceleration = nothing,
  jerk: Jerk = nothing,
): SuppliedForce {
  return {
    acceleration,
    jerk,
    position: new Float64Array(dimension),
    velocity: new Float64Array(dimension),
    result: new Float64Array(dimension),
  };
}
