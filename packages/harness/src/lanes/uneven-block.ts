import { splitter } from "@perigauge/kepler";
import { HORIZON_SLACK } from "../score/run-scorer.ts";
import { LaneBlock } from "./lane-block.ts";
import type { LaneRun } from "./lane-run.ts";
import { STATE_BYTES, STREAM_AT } from "./memory-map.ts";

const ROW = STATE_BYTES / 4;
const TWO_PI = 2 * Math.PI;

/**
 * A block of runs whose steps take unequal times, which the stream holds beside the states. A chunk is scored in pieces, cut where a lane
 * passes a horizon. A run that diverges is left to be run by itself: what it has cost then depends on where it is looked at.
 */
export class UnevenBlock extends LaneBlock<LaneRun> {
  /** Indices of cells that diverged. */
  readonly left: number[] = [];

  protected settle(count: number, width: number): void {
    if (this.tracks) this.machine.trackTimes(count, width);
    for (let from = 0; from < count; ) {
      const to = this.keepHorizons(from, count);
      if (to > from && this.score(from, to - from, width) !== 0) this.reportPassages(from, to);
      from = to;
    }
    this.lanes.forEach((run, lane) => {
      run.made += count;
      const { steps, alive } = this.scored(lane);
      const over = run.isOver(this.timeAt(run, lane, count), this.lowTimeAt(lane, count));
      run.ended = over || !alive;
      if (!alive) this.left.push(run.index);
      else if (over) {
        this.handOver(run, lane, count, steps, null, null);
        this.scores[run.index] = run.scorer.finish(run.spent(lane, steps));
      }
    });
  }

  /** Keeps the horizons that the row after `from` lies beyond; returns the last row before any lane's next one. */
  private keepHorizons(from: number, count: number): number {
    let to = count;
    this.lanes.forEach((run, lane) => {
      for (;;) {
        const horizon = run.horizons[run.horizonsKept];
        if (horizon === undefined) return;
        const limit = horizon * TWO_PI * HORIZON_SLACK;
        if (!(this.timeAt(run, lane, to) > limit)) return;
        let row = from + 1;
        while (!(this.timeAt(run, lane, row) > limit)) row++;
        if (row > from + 1) {
          to = row - 1;
          return;
        }
        this.handOver(run, lane, from, this.scored(lane).steps, null, this.timeAt(run, lane, row));
        run.horizonsKept += 1;
      }
    });
    return to;
  }

  protected trackValues({ track }: LaneRun): Readonly<Record<string, number>> {
    const { hi, lo } = track.turnsPerTime;
    const scaled = splitter * hi;
    const upper = scaled - (scaled - hi);
    return { rateHi: hi, rateLo: lo, rateUpper: upper, rateLower: hi - upper };
  }

  protected timeAt(_run: LaneRun, lane: number, n: number): number {
    return this.timeRow(lane, n, 4);
  }

  private lowTimeAt(lane: number, n: number): number {
    return this.timeRow(lane, n, 5);
  }

  private timeRow(lane: number, n: number, row: number): number {
    const at = STREAM_AT + n * this.kernel.streamBytes + row * ROW;
    return this.machine.doubles[at / 8 + lane] as number;
  }
}
