import { cellSize } from "@perigauge/kepler";
import { LANES } from "@perigauge/steppers";
import type { DivergenceReason } from "../score/run-end.ts";
import type { Score, StepMeasure } from "../score/score.ts";
import type { LaneMachine } from "./lane-machine.ts";
import type { LaneRun } from "./lane-run.ts";
import {
  CHUNK,
  EVENTS_AT,
  EXACT_AT,
  laneRows,
  maximumAtRows,
  maximumRows,
  STATE_BYTES,
  STREAM_AT,
  scoreRows,
  trackRows,
} from "./memory-map.ts";
import { startValues } from "./start-values.ts";

const trackEntries = Object.entries(trackRows);
const scoreEntries = Object.entries(scoreRows) as readonly [keyof typeof scoreRows, number][];

/** Doubles of a row. */
const ROW = STATE_BYTES / 32;

/** What a block needs of a stepper's kernel. */
export interface BlockKernel {
  readonly streamBytes: number;
  advance(count: number, stream: number, lanes: number): void;
  moveLane(from: number, to: number, stream: number): void;
}

/** What a block is run with. */
export interface BlockSetting {
  readonly machine: LaneMachine;
  readonly kernel: BlockKernel;
  readonly score: (from: number, count: number, width: number) => number;
  readonly queue: Iterator<LaneRun>;
  /** Whether any measure compares with the exact states. */
  readonly tracks: boolean;
  /** Scores are written to the places of their runs. */
  readonly scores: Score[];
}

/**
 * Runs a queue of cells of one stepper in up to 16 lanes. A lane whose run has ended takes the next cell from the queue, or, where that is
 * empty, the last lane moves into its place, so that no lane works for nothing.
 */
export abstract class LaneBlock<Run extends LaneRun> {
  protected readonly machine: LaneMachine;
  protected readonly kernel: BlockKernel;
  protected readonly score: BlockSetting["score"];
  protected readonly tracks: boolean;
  protected readonly lanes: Run[] = [];
  protected readonly scores: Score[];
  protected readonly state: Float64Array = new Float64Array(4);
  private readonly queue: Iterator<Run>;
  private readonly exact = new Float64Array(4);
  private generation: number;

  constructor({
    machine,
    kernel,
    score,
    queue,
    tracks,
    scores,
  }: BlockSetting & { readonly queue: Iterator<Run> }) {
    this.machine = machine;
    this.kernel = kernel;
    this.score = score;
    this.queue = queue;
    this.tracks = tracks;
    this.scores = scores;
    this.generation = machine.tables.generation;
  }

  run(): void {
    const { doubles } = this.machine;
    while (this.lanes.length < LANES && this.takeNext(this.lanes.length));
    while (this.lanes.length > 0) {
      this.fillOddLane();
      let count = CHUNK;
      for (const lane of this.lanes) count = Math.min(count, lane.wanted);
      this.kernel.advance(count, STREAM_AT, this.lanes.length);
      this.settle(count, 16 * Math.ceil(this.lanes.length / 2));
      moveRow(doubles, STREAM_AT, count, this.kernel.streamBytes);
      moveRow(doubles, EXACT_AT, count, STATE_BYTES);
      this.retire();
    }
  }

  /** Scores the chunk, hands results over where a run wants to be looked at, and marks those that have ended. */
  protected abstract settle(count: number, width: number): void;

  /** What the lane's rows of the track hold beside the orbit's constants. */
  protected abstract trackValues(run: Run): Readonly<Record<string, number>>;

  private takeNext(lane: number): boolean {
    const next = this.queue.next();
    if (next.done === true) return false;
    this.lanes[lane] = next.value;
    this.fill(lane, next.value);
    return true;
  }

  private fill(lane: number, run: Run): void {
    const { doubles } = this.machine;
    const { start } = run;
    run.put(lane);
    start.forEach((value, c) => {
      doubles[EXACT_AT / 8 + c * ROW + lane] = value;
    });
    const track: Readonly<Record<string, unknown>> = { ...run.track, ...this.trackValues(run) };
    for (const [name, offset] of trackEntries) {
      const value = track[name];
      if (typeof value === "number") doubles[offset / 8 + lane] = value;
    }
    this.pointToTable(lane, run);
    const values = startValues(run);
    for (const [name, offset] of scoreEntries) doubles[offset / 8 + lane] = values[name];
    for (const offset of Object.values(maximumRows)) doubles[offset / 8 + lane] = -1;
    for (const offset of Object.values(maximumAtRows)) doubles[offset / 8 + lane] = 0;
    this.setAlive(lane, true);
  }

  private setAlive(lane: number, alive: boolean): void {
    const at = scoreRows.alive / 4 + 2 * lane;
    this.machine.integers.fill(alive ? -1 : 0, at, at + 2);
  }

  /** The table's address, less that of its cell number zero; the kernel adds in 32 bits. */
  private pointToTable(lane: number, { track }: Run): void {
    const { tables, integers } = this.machine;
    const address = tables.addressOf(track.rows);
    const at = trackRows.tableBias / 4 + 2 * lane;
    integers[at] = address - track.base * 8 * cellSize;
    integers[at + 1] = 0;
    if (tables.generation === this.generation) return;
    this.generation = tables.generation;
    this.lanes.forEach((run, other) => {
      this.pointToTable(other, run);
    });
  }

  /** An odd last lane has a neighbour in its vector: a copy of itself that is not alive. */
  private fillOddLane(): void {
    const { length } = this.lanes;
    if (length % 2 === 0) return;
    this.copyLane(length - 1, length);
    this.setAlive(length, false);
  }

  private copyLane(from: number, to: number): void {
    const { doubles } = this.machine;
    for (const row of laneRows) {
      // As bits: some rows hold masks and addresses.
      doubles.copyWithin(row + to, row + from, row + from + 1);
    }
    for (let c = 0; c < 4; c++) {
      doubles[EXACT_AT / 8 + c * ROW + to] = doubles[EXACT_AT / 8 + c * ROW + from] as number;
    }
    this.kernel.moveLane(from, to, STREAM_AT);
  }

  /** Tells each scorer of its passages in rows `from` + 1 to `to`, in their order. */
  protected reportPassages(from: number, to: number): void {
    const { integers } = this.machine;
    for (let n = from; n < to; n++) {
      for (let word = integers[EVENTS_AT / 4 + n] as number; word !== 0; word &= word - 1) {
        const lane = 31 - Math.clz32(word & -word);
        const run = this.lanes[lane] as Run;
        this.readState(STREAM_AT + n * this.kernel.streamBytes, lane, this.state);
        this.readState(EXACT_AT + n * STATE_BYTES, lane, this.exact);
        run.scorer.passages?.passAfter(this.state, this.exact, this.timeAt(run, lane, n));
      }
    }
  }

  /** Time of row n of the stream, in doubles. */
  protected abstract timeAt(run: Run, lane: number, n: number): number;

  protected readState(at: number, lane: number, out: Float64Array): void {
    const { doubles } = this.machine;
    for (let c = 0; c < 4; c++) out[c] = doubles[at / 8 + c * ROW + lane] as number;
  }

  /** Hands a lane's maxima to its scorer; `row` of the stream is the last that they cover. */
  protected handOver(
    run: Run,
    lane: number,
    row: number,
    steps: number,
    divergence: DivergenceReason | null,
    nextTime: number | null,
  ): void {
    const { doubles, integers } = this.machine;
    this.readState(STREAM_AT + row * this.kernel.streamBytes, lane, this.state);
    run.scorer.adopt({
      steps,
      time: this.timeAt(run, lane, row),
      state: this.state,
      maximum: (name: StepMeasure) => ({
        value: doubles[maximumRows[name] / 8 + lane] as number,
        at: doubles[maximumAtRows[name] / 8 + lane] as number,
      }),
      phaseUncertain: integers[scoreRows.uncertain / 4 + 2 * lane] !== 0,
      divergence,
      nextTime,
    });
  }

  protected scored(lane: number): { readonly steps: number; readonly alive: boolean } {
    const { doubles, integers } = this.machine;
    return {
      steps: doubles[scoreRows.lastAlive / 8 + lane] as number,
      alive: integers[scoreRows.alive / 4 + 2 * lane] !== 0,
    };
  }

  private retire(): void {
    for (let lane = this.lanes.length - 1; lane >= 0; lane--) {
      if (!(this.lanes[lane] as Run).ended || this.takeNext(lane)) continue;
      const last = this.lanes.length - 1;
      if (lane < last) {
        this.copyLane(last, lane);
        this.lanes[lane] = this.lanes[last] as Run;
      }
      this.lanes.pop();
    }
  }
}

/** Row `from` becomes row 0. */
function moveRow(doubles: Float64Array, base: number, from: number, bytes: number): void {
  const at = (base + from * bytes) / 8;
  doubles.copyWithin(base / 8, at, at + bytes / 8);
}
