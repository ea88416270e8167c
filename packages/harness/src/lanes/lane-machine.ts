import {
  type AttemptKernel,
  attemptKernel,
  compileLanes,
  type KernelFunction,
  type LaneMemory,
  laneMemory,
  type PairStepper,
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
import { scoreCode } from "./score-code.ts";
import type { ScoreSetting } from "./score-stages.ts";
import { TableArena } from "./table-arena.ts";
import { trackCode } from "./track-code.ts";

/** A stepper's kernel in this thread's memory. */
export type LaneStepper =
  | { readonly kind: "steps"; readonly kernel: StepKernel; readonly program: StepProgram }
  | { readonly kind: "trials"; readonly kernel: AttemptKernel };

/** The memory of this thread's lanes and the kernels compiled over it, each once. */
export class LaneMachine {
  readonly memory: LaneMemory;
  readonly doubles: Float64Array;
  readonly integers: Int32Array;
  readonly tables: TableArena;
  /** Exact states at the next steps. */
  readonly track: KernelFunction;
  /** Exact states at the times in the stream. */
  readonly trackTimes: KernelFunction;
  private readonly steppers = new Map<string, LaneStepper | null>();
  private readonly scores = new Map<string, KernelFunction>();

  constructor() {
    this.memory = laneMemory(TABLES_AT + TABLES_BYTES);
    this.doubles = new Float64Array(this.memory.buffer);
    this.integers = new Int32Array(this.memory.buffer);
    this.tables = new TableArena(this.doubles);
    fillNodes(this.doubles);
    const code = compileLanes([trackCode("steps"), trackCode("stream")], this.memory);
    this.track = code.track as KernelFunction;
    this.trackTimes = code.trackTimes as KernelFunction;
  }

  knows(stepper: Stepper, summation: Summation): boolean {
    return this.steppers.has(keyOf(stepper, summation));
  }

  /** Null where the stepper does not run in lanes, or its step is too large for them. */
  stepper(stepper: Stepper, summation: Summation): LaneStepper | null {
    const key = keyOf(stepper, summation);
    let found = this.steppers.get(key);
    if (found === undefined) {
      found = this.compile(stepper, summation);
      this.steppers.set(key, found);
    }
    return found;
  }

  private compile(stepper: Stepper, summation: Summation): LaneStepper | null {
    let found: LaneStepper;
    if (isProgramStepper(stepper)) {
      const program = stepper.program({ dimension: 2, summation, force: pointMass });
      found = { kind: "steps", program, kernel: stepKernel(program.step, this.memory) };
    } else if (isPairStepper(stepper) && summation === "plain") {
      found = { kind: "trials", kernel: attemptKernel(stepper, this.memory) };
    } else return null;
    return found.kernel.workBytes <= WORK_BYTES ? found : null;
  }

  score(setting: ScoreSetting): KernelFunction {
    const { measures, passages, circular, uneven, streamBytes } = setting;
    const key = `${[...measures].sort().join(" ")} ${passages} ${circular} ${uneven} ${streamBytes}`;
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

export function isPairStepper(stepper: Stepper): stepper is PairStepper {
  return stepper.knob === "tolerance" && "pair" in stepper;
}

/** Whether cells of the stepper can share blocks of lanes. */
export function runsInLanes(stepper: Stepper): boolean {
  return isProgramStepper(stepper) || isPairStepper(stepper);
}
