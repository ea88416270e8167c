import { type StepWords, stepWords } from "@perigauge/kepler";
import { countEvaluations, interpret, type StepKernel, type StepProgram, supply } from "@perigauge/steppers";
import { stepsBy } from "../run/orbit-times.ts";
import type { ResolvedCell } from "../run/resolve-cell.ts";
import { CHUNK_STEPS } from "../score/chunk.ts";
import type { ScoringPlan } from "../score/run-scorer.ts";
import { LaneRun, type Spent } from "./lane-run.ts";
import { STREAM_AT } from "./memory-map.ts";

const noForce = supply(2);

/** A run of a number of equal steps h (in time, or in the method's own fictitious time). */
export class StepRun extends LaneRun {
  readonly step: number;
  readonly words: StepWords;
  private readonly kernel: StepKernel;
  /** Loop variables at the start. */
  private readonly variables: Float64Array;
  /** Steps at which to look: horizons of even steps, then the end; ascending, each once. */
  private readonly stops: readonly number[];
  private readonly total: number;
  private readonly evaluations: readonly [start: number, step: number];

  constructor(
    index: number,
    resolved: ResolvedCell,
    plan: ScoringPlan,
    program: StepProgram,
    kernel: StepKernel,
  ) {
    super(index, resolved, plan);
    this.kernel = kernel;
    this.step = resolved.step as number;
    this.total = resolved.steps as number;
    this.words = stepWords(this.track.turnsPerTime, this.step);
    this.variables = new Float64Array(program.step.inputs);
    interpret(program.start).evaluate(this.step, this.start, this.variables, noForce);
    this.evaluations = [countEvaluations(program.start), countEvaluations(program.step)];
    const even = resolved.stepper.uneven ? [] : plan.horizons;
    const horizons = even.map((orbits) => stepsBy(orbits, resolved.stepsPerOrbit as number));
    this.stops = [...new Set(horizons.filter((at) => at < this.total)), this.total];
  }

  put(lane: number): void {
    this.kernel.setLane(lane, this.step, this.variables, STREAM_AT);
  }

  get wanted(): number {
    return (this.stops.find((stop) => stop > this.made) ?? this.total) - this.made;
  }

  stopsAt(steps: number): boolean {
    return this.stops.includes(steps);
  }

  isOver(): boolean {
    return this.made === this.total;
  }

  spent(_lane: number, lastStep: number): Spent {
    const [start, step] = this.evaluations;
    return {
      evaluations: start + step * this.stepsTried(lastStep),
      rejectedSteps: 0,
      smallestStep: Math.abs(this.step),
    };
  }

  /** A run by itself goes on to the end of its chunk before it looks, and counts those steps too. */
  private stepsTried(lastStep: number): number {
    let from = 0;
    for (const stop of this.stops) {
      if (lastStep <= stop) {
        return Math.min(stop, from + CHUNK_STEPS * Math.ceil((lastStep - from) / CHUNK_STEPS));
      }
      from = stop;
    }
    return this.total;
  }
}
