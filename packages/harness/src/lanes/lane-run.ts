import {
  orbitThrough,
  type PlanarOrbit,
  stateAtTrueAnomalyDegrees,
  type TrackConstants,
  trackConstants,
} from "@perigauge/kepler";
import type { Trajectory } from "@perigauge/steppers";
import type { ResolvedCell } from "../run/resolve-cell.ts";
import { RunScorer, type ScoringPlan } from "../score/run-scorer.ts";

/** What a run has cost, as its score states it. */
export type Spent = Pick<Trajectory, "evaluations" | "rejectedSteps" | "smallestStep">;

/** One cell on its way through a lane. */
export abstract class LaneRun {
  /** Place of the cell among those asked for. */
  readonly index: number;
  readonly orbit: PlanarOrbit;
  readonly start: Float64Array;
  readonly track: TrackConstants;
  readonly scorer: RunScorer;
  readonly horizons: readonly number[];
  /** Steps made, or trials. */
  made = 0;
  ended = false;
  /** Horizons kept so far. */
  horizonsKept = 0;
  protected readonly resolved: ResolvedCell;

  constructor(index: number, resolved: ResolvedCell, plan: ScoringPlan) {
    const { cell } = resolved;
    const { x, y, vx, vy } = stateAtTrueAnomalyDegrees(cell.eccentricity, cell.startAnomalyDeg);
    this.index = index;
    this.resolved = resolved;
    this.start = Float64Array.of(x, y, vx, vy);
    this.orbit = orbitThrough({ x, y, vx, vy });
    this.track = trackConstants(this.orbit);
    this.scorer = new RunScorer(resolved, this.orbit, this.start, plan);
    this.horizons = plan.horizons;
  }

  /** Puts the run at its start into a lane of its kernel. */
  abstract put(lane: number): void;
  /** Steps or trials until it must be looked at. */
  abstract get wanted(): number;
  abstract isOver(timeHi: number, timeLo: number): boolean;
  /** `lastStep` is the last step that was tried: the last of all, or the one that diverged. */
  abstract spent(lane: number, lastStep: number): Spent;
}
