import { type DivergenceReason, findEnd } from "../score/run-end.ts";
import { LaneBlock } from "./lane-block.ts";
import { STREAM_AT } from "./memory-map.ts";
import type { StepRun } from "./step-run.ts";

/** A block of runs of equal steps in time: all lanes advance to the nearest stop of any. */
export class EvenBlock extends LaneBlock<StepRun> {
  protected settle(count: number, width: number): void {
    if (this.tracks) this.machine.track(count, width);
    if (this.score(0, count, width) !== 0) this.reportPassages(0, count);
    this.lanes.forEach((run, lane) => {
      const { steps, alive } = this.scored(lane);
      if (!alive || run.stopsAt(run.made + count)) {
        const row = steps - run.made;
        this.handOver(run, lane, row, steps, alive ? null : this.reasonAt(row + 1, lane, run), null);
      }
      run.made += count;
      run.ended = !alive || run.isOver();
      if (run.ended) this.scores[run.index] = run.scorer.finish(run.spent(lane, alive ? steps : steps + 1));
    });
  }

  private reasonAt(row: number, lane: number, run: StepRun): DivergenceReason | null {
    this.readState(STREAM_AT + row * this.kernel.streamBytes, lane, this.state);
    return findEnd(this.state, 1, run.scorer.eccentricity)?.reason ?? null;
  }

  protected trackValues({ words }: StepRun): Readonly<Record<string, number>> {
    return { ...words, step: 0 };
  }

  protected timeAt(run: StepRun, _lane: number, n: number): number {
    return (run.made + n) * run.step;
  }
}
