import {
  orbitThrough,
  type PlanarOrbit,
  type StepWords,
  stateAtTrueAnomalyDegrees,
  stepWords,
  type TrackConstants,
  trackConstants,
} from "@perigauge/kepler";
import { countEvaluations, interpret, type StepProgram, supply } from "@perigauge/steppers";
import { stepsBy } from "../run/orbit-times.ts";
import type { ResolvedCell } from "../run/resolve-cell.ts";
import { CHUNK_STEPS } from "../score/chunk.ts";
import { RunScorer, type ScoringPlan } from "../score/run-scorer.ts";
import type { Score } from "../score/score.ts";

const noForce = supply(2);

/** One cell on its way through a lane. */
export class LaneRun {
  /** Place of the cell among those asked for. */
  readonly index: number;
  readonly step: number;
  readonly orbit: PlanarOrbit;
  readonly start: Float64Array;
  /** Loop variables at the start. */
  readonly variables: Float64Array;
  readonly track: TrackConstants;
  readonly words: StepWords;
  readonly scorer: RunScorer;
  /** Steps at which to look: horizons, then the end; ascending, each once. */
  private readonly stops: readonly number[];
  private stop = 0;
  private readonly total: number;
  private readonly evaluations: readonly [start: number, step: number];
  made = 0;
  ended = false;

  constructor(index: number, resolved: ResolvedCell, program: StepProgram, plan: ScoringPlan) {
    const { cell } = resolved;
    const startState = stateAtTrueAnomalyDegrees(cell.eccentricity, cell.startAnomalyDeg);
    this.index = index;
    this.step = resolved.step as number;
    this.total = resolved.steps as number;
    this.start = Float64Array.of(startState.x, startState.y, startState.vx, startState.vy);
    this.orbit = orbitThrough(startState);
    this.track = trackConstants(this.orbit);
    this.words = stepWords(this.track.turnsPerTime, this.step);
    this.variables = new Float64Array(program.step.inputs);
    interpret(program.start).evaluate(this.step, this.start, this.variables, noForce);
    this.scorer = new RunScorer(resolved, this.orbit, this.start, plan);
    this.evaluations = [countEvaluations(program.start), countEvaluations(program.step)];
    const horizons = plan.horizons.map((orbits) => stepsBy(orbits, resolved.stepsPerOrbit as number));
    const before = horizons.filter((at) => at < this.total);
    this.stops = [...new Set(before), this.total];
  }

  /** Steps until the next stop. */
  get wanted(): number {
    return (this.stops[this.stop] as number) - this.made;
  }

  /** Counts steps; true at a stop. */
  count(steps: number): boolean {
    this.made += steps;
    if (this.wanted > 0) return false;
    this.stop += 1;
    return true;
  }

  get finished(): boolean {
    return this.made === this.total;
  }

  /** The score; `lastStep` is the last step that was tried: the total, or the one that diverged. */
  finish(lastStep: number): Score {
    const [start, step] = this.evaluations;
    return this.scorer.finish({
      evaluations: start + step * this.stepsTried(lastStep),
      rejectedSteps: 0,
      smallestStep: Math.abs(this.step),
    });
  }

  /** A run by itself goes on to the end of its chunk before it looks, and counts those steps too. */
  private stepsTried(lastStep: number): number {
    let from = 0;
    for (const stop of this.stops) {
      if (lastStep <= stop)
        return Math.min(stop, from + CHUNK_STEPS * Math.ceil((lastStep - from) / CHUNK_STEPS));
      from = stop;
    }
    return this.total;
  }
}
