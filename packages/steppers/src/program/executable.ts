import type { Acceleration } from "../stepper.ts";

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
  acceleration: Acceleration,
  scratch: Scratch,
) => void;

/** Runs a program once, from `inputs` to `outputs`. */
export type Evaluate = (
  step: number,
  inputs: Float64Array,
  outputs: Float64Array,
  acceleration: Acceleration,
  scratch: Scratch,
) => void;

/** Where a supplied force reads its position and writes its result: one pair per run, so that runs do not share state. */
export interface Scratch {
  readonly position: Float64Array;
  readonly result: Float64Array;
}

export function makeScratch(dimension: number): Scratch {
  return { position: new Float64Array(dimension), result: new Float64Array(dimension) };
}

export interface Executable {
  readonly advance: Advance;
  readonly evaluate: Evaluate;
}
