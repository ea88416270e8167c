import type { BuildStep, Setting } from "../build/step-program.ts";
import { invalid } from "../errors.ts";
import { compile } from "../program/compile.ts";
import { countEvaluations } from "../program/count.ts";
import { type Executable, type SuppliedForce, supply } from "../program/executable.ts";
import { pointMass, suppliedForce } from "../program/force.ts";
import { interpret } from "../program/interpret.ts";
import type { StepProgram } from "../program/program.ts";
import type { Start, Stepper, StepperInfo, Trajectory } from "../stepper.ts";
import { checkAdvance, dimensionOf, stepOf } from "./begin.ts";

/** What a method claims of itself. The rest of `StepperInfo` is counted from its program when first asked for. */
export type Claims = Pick<
  StepperInfo,
  "id" | "title" | "family" | "order" | "source" | "note" | "symplectic" | "timeReversible" | "explicit"
> & {
  readonly stages: () => number;
  readonly uneven?: boolean;
  /** False where a restart costs evaluations of its own to rebuild the past. */
  readonly selfStarting?: boolean;
  readonly needsJerk?: boolean;
};

/** A stepper of fixed h whose step is a straight-line program. Programs are built and compiled when first needed, once each. */
export interface ProgramStepper extends Stepper {
  /** The program behind the stepper, for proofs, other emitters and whoever wants to look. */
  program(setting: Setting): StepProgram;
}

const noTimes = new Float64Array(0);

interface Compiled {
  readonly step: Executable;
  readonly start: Executable;
  readonly startEvaluations: number;
  readonly stepEvaluations: number;
  readonly variables: number;
}

export function fixedStep(claims: Claims, build: BuildStep): ProgramStepper {
  const { stages, uneven = false, selfStarting = true, needsJerk = false, ...info } = claims;
  const compiled = new Map<string, Compiled>();
  let counted: readonly [start: number, step: number] | undefined;
  const counts = (): readonly [start: number, step: number] => {
    counted ??= countBoth(build({ dimension: 2, summation: "plain", force: pointMass }));
    return counted;
  };

  return {
    ...info,
    knob: "step",
    uneven,
    denseOutput: false,
    selfStarting,
    get stages() {
      return stages();
    },
    get evaluationsPerStep() {
      return counts()[1];
    },
    get startEvaluations() {
      return counts()[0];
    },
    program: build,
    begin(start: Start): Trajectory {
      const dimension = dimensionOf(start);
      const h = stepOf(start);
      const { acceleration, jerk, summation = "plain" } = start;
      if (needsJerk && acceleration !== undefined && jerk === undefined) throw invalid.jerk(info.id);
      const key = `${dimension} ${summation} ${acceleration !== undefined}`;
      let code = compiled.get(key);
      if (code === undefined) {
        code = compileStep(
          build({ dimension, summation, force: acceleration === undefined ? pointMass : suppliedForce }),
        );
        compiled.set(key, code);
      }
      return begin(code, start.state, h, supply(dimension, acceleration, jerk), uneven);
    },
  };
}

const countBoth = ({ start, step }: StepProgram): readonly [start: number, step: number] => [
  countEvaluations(start),
  countEvaluations(step),
];

function compileStep(program: StepProgram): Compiled {
  const [startEvaluations, stepEvaluations] = countBoth(program);
  // A start is run once a trajectory and can be very long: compiling it would cost more than it saves.
  return {
    step: compile(program.step),
    start: interpret(program.start),
    startEvaluations,
    stepEvaluations,
    variables: program.step.inputs,
  };
}

function begin(
  code: Compiled,
  state: Float64Array,
  h: number,
  force: SuppliedForce,
  uneven: boolean,
): Trajectory {
  const { step } = code;
  const variables = new Float64Array(code.variables);
  code.start.evaluate(h, state, variables, force);
  let evaluations = code.startEvaluations;
  return {
    advance(maxSteps, rows, times = noTimes): number {
      checkAdvance(maxSteps, state.length, rows, uneven, times);
      step.advance(maxSteps, h, variables, rows, times, force);
      evaluations += maxSteps * code.stepEvaluations;
      return maxSteps;
    },
    get evaluations() {
      return evaluations;
    },
    rejectedSteps: 0,
    smallestStep: Math.abs(h),
  };
}
