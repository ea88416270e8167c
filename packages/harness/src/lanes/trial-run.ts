import type { AttemptKernel } from "@perigauge/steppers";
import { endOfOrbits } from "../run/orbit-times.ts";
import type { ResolvedCell } from "../run/resolve-cell.ts";
import type { ScoringPlan } from "../score/run-scorer.ts";
import { LaneRun, type Spent } from "./lane-run.ts";
import { STREAM_AT } from "./memory-map.ts";

/** A run of variable step up to a time. */
export class TrialRun extends LaneRun {
  private readonly kernel: AttemptKernel;
  private readonly end: readonly [hi: number, lo: number];

  constructor(index: number, resolved: ResolvedCell, plan: ScoringPlan, kernel: AttemptKernel) {
    super(index, resolved, plan);
    this.kernel = kernel;
    this.end = endOfOrbits(resolved.cell.orbits);
  }

  put(lane: number): void {
    const { tolerance, maxStep } = this.resolved.cell;
    const longest = maxStep ?? Number.POSITIVE_INFINITY;
    const start = { state: this.start, tolerance: tolerance as number, end: this.end, longest };
    this.kernel.setLane(lane, start, STREAM_AT);
  }

  get wanted(): number {
    return Number.POSITIVE_INFINITY;
  }

  isOver(timeHi: number, timeLo: number): boolean {
    const [hi, lo] = this.end;
    return hi - timeHi + (lo - timeLo) <= 0;
  }

  spent(lane: number): Spent {
    return this.kernel.counts(lane);
  }
}
