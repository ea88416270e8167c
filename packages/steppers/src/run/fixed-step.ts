import type { BuildStep, Setting } from "../build/step-program.ts";
import { compile } from "../program/compile.ts";
import { countEvaluations } from "../program/count.ts";
import { type Executable, makeScratch } from "../program/executable.ts";
import { pointMass, suppliedForce } from "../program/force.ts";
import type { StepProgram } from "../program/program.ts";
import type { Start, Stepper, StepperInfo, Summation, Trajectory } from "../stepper.ts";
import { checkAdvance, dimensionOf, stepOf } from "./begin.ts";

/** What a method claims of itself. The rest of `StepperInfo` is counted from its program when first asked for. */
export type Claims = Pick<
  StepperInfo,
  "id" | "title" | "family" | "order" | "source" | "note" | "symplectic" | "timeReversible" | "explicit"
> & {
  readonly stages: () => number;
  readonly uneven?: boolean;
};

/** A stepper of fixed h whose step is a straight-line program. Programs are built and compiled when first needed, once each. */
export interface ProgramStepper extends Stepper {
  /** The program behind the stepper, for proofs, other emitters and whoever wants to look. */
  program(setting: Setting): StepProgram;
}

const noForce = (): void => {};
const noTimes = new Float64Array(0);

export function fixedStep(claims: Claims, build: BuildStep): ProgramStepper {
  const { stages, uneven = false, ...info } = claims;
  const compiled = new Map<string, { step: Executable; start: Executable; program: StepProgram }>();

  const get = (dimension: 2 | 3, summation: Summation, supplied: boolean) => {
    const key = `${dimension} ${summation} ${supplied}`;
    let found = compiled.get(key);
    if (found === undefined) {
      const program = build({ dimension, summation, force: supplied ? suppliedForce : pointMass });
      found = { program, step: compile(program.step), start: compile(program.start) };
      compiled.set(key, found);
    }
    return found;
  };

  return {
    ...info,
    knob: "step",
    uneven,
    denseOutput: false,
    selfStarting: true,
    get stages() {
      return stages();
    },
    get evaluationsPerStep() {
      return countEvaluations(get(2, "plain", false).program.step);
    },
    get startEvaluations() {
      return countEvaluations(get(2, "plain", false).program.start);
    },
    program: build,
    begin(start: Start): Trajectory {
      const dimension = dimensionOf(start);
      const h = stepOf(start);
      const { acceleration, summation = "plain", state } = start;
      const { step, start: first, program } = get(dimension, summation, acceleration !== undefined);
      const force = acceleration ?? noForce;
      const scratch = makeScratch(dimension);
      const variables = new Float64Array(program.step.inputs);
      first.evaluate(h, state, variables, force, scratch);
      const perStep = countEvaluations(program.step);
      let evaluations = countEvaluations(program.start);
      return {
        advance(maxSteps, rows, times = noTimes): number {
          checkAdvance(maxSteps, 2 * dimension, rows, uneven, times);
          step.advance(maxSteps, h, variables, rows, times, force, scratch);
          evaluations += maxSteps * perStep;
          return maxSteps;
        },
        get evaluations() {
          return evaluations;
        },
        rejectedSteps: 0,
        smallestStep: Math.abs(h),
      };
    },
  };
}
