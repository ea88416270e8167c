import {
  compileLanes,
  type KernelFunction,
  type LaneMemory,
  laneMemory,
  type ProgramStepper,
  pointMass,
  type StepKernel,
  type StepProgram,
  type Stepper,
  stepKernel,
} from "@perigauge/steppers";
import type { Summation } from "../score/score.ts";
import { fillNodes } from "./angle-code.ts";
import { TABLES_AT, TABLES_BYTES, WORK_BYTES } from "./memory-map.ts";
import { type ScoreSetting, scoreCode } from "./score-code.ts";
import { TableArena } from "./table-arena.ts";
import { trackCode } from "./track-code.ts";

/** A stepper's programs and its kernel in this thread's memory. */
export interface LaneStepper {
  readonly program: StepProgram;
  readonly kernel: StepKernel;
}

/** The memory of this thread's lanes and the kernels compiled over it, each once. */
export class LaneMachine {
  readonly memory: LaneMemory;
  readonly doubles: Float64Array;
  readonly integers: Int32Array;
  readonly tables: TableArena;
  readonly track: KernelFunction;
  private readonly steppers = new Map<string, LaneStepper | null>();
  private readonly scores = new Map<string, KernelFunction>();

  constructor() {
    this.memory = laneMemory(TABLES_AT + TABLES_BYTES);
    this.doubles = new Float64Array(this.memory.buffer);
    this.integers = new Int32Array(this.memory.buffer);
    this.tables = new TableArena(this.doubles);
    fillNodes(this.doubles);
    this.track = compileLanes([trackCode()], this.memory).track as KernelFunction;
  }

  knows(stepper: Stepper, summation: Summation): boolean {
    return this.steppers.has(keyOf(stepper, summation));
  }

  /** Null where the stepper is no straight-line program, or too large a one. */
  stepper(stepper: Stepper, summation: Summation): LaneStepper | null {
    const key = keyOf(stepper, summation);
    let found = this.steppers.get(key);
    if (found === undefined) {
      found = isProgramStepper(stepper) ? this.compile(stepper, summation) : null;
      this.steppers.set(key, found);
    }
    return found;
  }

  private compile(stepper: ProgramStepper, summation: Summation): LaneStepper | null {
    const program = stepper.program({ dimension: 2, summation, force: pointMass });
    const kernel = stepKernel(program.step, this.memory);
    return kernel.workBytes <= WORK_BYTES ? { program, kernel } : null;
  }

  score(setting: ScoreSetting): KernelFunction {
    const { measures, passages, circular, streamBytes } = setting;
    const key = `${[...measures].sort().join(" ")} ${passages} ${circular} ${streamBytes}`;
    let found = this.scores.get(key);
    if (found === undefined) {
      found = compileLanes([scoreCode(setting)], this.memory).score as KernelFunction;
      this.scores.set(key, found);
    }
    return found;
  }
}

function keyOf(stepper: Stepper, summation: Summation): string {
  return `${stepper.id} ${summation}`;
}

export function isProgramStepper(stepper: Stepper): stepper is ProgramStepper {
  return stepper.knob === "step" && "program" in stepper;
}
