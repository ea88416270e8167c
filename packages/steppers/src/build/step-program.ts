import { zero } from "../exact/rational.ts";
import { type Force, ProgramBuilder } from "../program/builder.ts";
import type { Dimension, StepProgram, Value } from "../program/program.ts";
import type { Summation } from "../stepper.ts";
import { compensations, RunningState } from "./summation.ts";

/** How a program is to be built: everything but the method. */
export interface Setting {
  readonly dimension: Dimension;
  readonly summation: Summation;
  readonly force: Force;
}

export type BuildStep = (setting: Setting) => StepProgram;

/**
 * A step that carries nothing, or the acceleration at its end, from one step to the next. `write` advances the state and returns the
 * carried acceleration (given the one carried in), or null.
 */
export function buildStep(
  setting: Setting,
  carries: boolean,
  write: (builder: ProgramBuilder, state: RunningState, carried: readonly Value[]) => readonly Value[] | null,
): StepProgram {
  const { dimension: d, summation, force } = setting;
  const extra = compensations(d, summation);
  const inputs = 2 * d + extra + (carries ? d : 0);

  const start = new ProgramBuilder(d, 2 * d, force);
  const position = start.vector(0);
  const initial = [
    ...position,
    ...start.vector(d),
    ...Array.from({ length: extra }, () => start.constant(zero)),
  ];
  if (carries) initial.push(...start.acceleration(position));

  const builder = new ProgramBuilder(d, inputs, force);
  const state = new RunningState(builder, summation);
  const carried = write(builder, state, carries ? builder.vector(2 * d + extra) : []);
  return {
    start: start.finish(initial),
    step: builder.finish([...state.outputs(), ...(carried ?? [])]),
  };
}
