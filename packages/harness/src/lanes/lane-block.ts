import { cellSize } from "@perigauge/kepler";
import { LANES } from "@perigauge/steppers";
import { COLLISION_SHARE, type DivergenceReason, findEnd } from "../score/run-end.ts";
import type { Score, StepMeasure } from "../score/score.ts";
import type { LaneMachine, LaneStepper } from "./lane-machine.ts";
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

/** Doubles of a row. */
const ROW = STATE_BYTES / 32;

/**
 * Runs a queue of cells of one stepper in up to 16 lanes. All lanes advance together, to the nearest stop of any; a lane whose run has
 * ended takes the next cell from the queue, or, where that is empty, the last lane moves into its place, so that no lane works for nothing.
 */
export class LaneBlock {
  private readonly machine: LaneMachine;
  private readonly stepper: LaneStepper;
  private readonly score: (count: number, width: number) => number;
  private readonly lanes: LaneRun[] = [];
  private readonly queue: Iterator<LaneRun>;
  private readonly scores: Score[];
  private readonly state = new Float64Array(4);
  private readonly exact = new Float64Array(4);
  private generation: number;

  /** Scores are written to `scores` by the index of their runs. */
  constructor(
    machine: LaneMachine,
    stepper: LaneStepper,
    score: (count: number, width: number) => number,
    queue: Iterator<LaneRun>,
    scores: Score[],
  ) {
    this.machine = machine;
    this.stepper = stepper;
    this.score = score;
    this.queue = queue;
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
      const width = 16 * Math.ceil(this.lanes.length / 2);
      this.stepper.kernel.advance(count, STREAM_AT, this.lanes.length);
      this.machine.track(count, width);
      const passed = this.score(count, width);
      if (passed !== 0) this.reportPassages(count);
      this.settle(count);
      const { streamBytes } = this.stepper.kernel;
      moveRow(doubles, STREAM_AT, count, streamBytes);
      moveRow(doubles, EXACT_AT, count, STATE_BYTES);
      this.retire();
    }
  }

  private takeNext(lane: number): boolean {
    const next = this.queue.next();
    if (next.done === true) return false;
    this.lanes[lane] = next.value;
    this.fill(lane, next.value);
    return true;
  }

  private fill(lane: number, run: LaneRun): void {
    const { doubles } = this.machine;
    const { start, orbit, scorer } = run;
    this.stepper.kernel.setLane(lane, run.step, run.variables, STREAM_AT);
    start.forEach((value, c) => {
      doubles[EXACT_AT / 8 + c * ROW + lane] = value;
    });
    const track = { ...run.track, ...run.words, step: 0 };
    for (const [name, offset] of Object.entries(trackRows)) {
      const value = track[name as keyof typeof track];
      if (typeof value === "number") doubles[offset / 8 + lane] = value;
    }
    this.pointToTable(lane, run);
    const energy0 = orbit.energy.hi;
    const momentum0 = orbit.angularMomentum.hi;
    const collision = COLLISION_SHARE * (1 - scorer.eccentricity);
    const [x, y, vx, vy] = start as unknown as readonly [number, number, number, number];
    const values: Readonly<Record<keyof typeof scoreRows, number>> = {
      step: 0,
      alive: 0,
      lastAlive: 0,
      // On a circular orbit the start itself is the direction that is passed.
      side: scorer.circular ? x * y - y * x : x * vx + y * vy,
      energy0,
      energyScale: 1 / Math.abs(energy0),
      momentum0,
      momentumScale: 1 / Math.abs(momentum0),
      apsisX: orbit.eccentricityX.hi,
      apsisY: orbit.eccentricityY.hi,
      collision2: collision * collision,
      startX: x,
      startY: y,
      phase: 0,
      apsis: 0,
      uncertain: 0,
      inverse: 0,
      momentum: 0,
    };
    for (const [name, offset] of Object.entries(scoreRows))
      doubles[offset / 8 + lane] = values[name as keyof typeof values];
    for (const offset of Object.values(maximumRows)) doubles[offset / 8 + lane] = -1;
    for (const offset of Object.values(maximumAtRows)) doubles[offset / 8 + lane] = 0;
    this.setAlive(lane, true);
  }

  private setAlive(lane: number, alive: boolean): void {
    const at = scoreRows.alive / 4 + 2 * lane;
    this.machine.integers.fill(alive ? -1 : 0, at, at + 2);
  }

  /** The table's address, less that of its cell number zero; the kernel adds in 32 bits. */
  private pointToTable(lane: number, { track }: LaneRun): void {
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
    this.stepper.kernel.moveLane(from, to, STREAM_AT);
  }

  /** Tells each scorer of its passages, in the order of the steps. */
  private reportPassages(count: number): void {
    const { integers } = this.machine;
    const { streamBytes } = this.stepper.kernel;
    for (let n = 0; n < count; n++) {
      for (let word = integers[EVENTS_AT / 4 + n] as number; word !== 0; word &= word - 1) {
        const lane = 31 - Math.clz32(word & -word);
        const run = this.lanes[lane] as LaneRun;
        this.readState(STREAM_AT + n * streamBytes, lane, this.state);
        this.readState(EXACT_AT + n * STATE_BYTES, lane, this.exact);
        run.scorer.passages?.passAfter(this.state, this.exact, (run.made + n) * run.step);
      }
    }
  }

  private readState(at: number, lane: number, out: Float64Array): void {
    const { doubles } = this.machine;
    for (let c = 0; c < 4; c++) out[c] = doubles[at / 8 + c * ROW + lane] as number;
  }

  /** Hands results over at stops, and those of runs that have ended. */
  private settle(count: number): void {
    const { doubles } = this.machine;
    const { streamBytes } = this.stepper.kernel;
    this.lanes.forEach((run, lane) => {
      const before = run.made;
      const steps = doubles[scoreRows.lastAlive / 8 + lane] as number;
      const stops = run.count(count);
      const diverged = steps < run.made;
      if (!stops && !diverged) return;
      let divergence: DivergenceReason | null = null;
      if (diverged) {
        this.readState(STREAM_AT + (steps + 1 - before) * streamBytes, lane, this.state);
        divergence = findEnd(this.state, 1, run.scorer.eccentricity)?.reason ?? null;
      }
      this.readState(STREAM_AT + (steps - before) * streamBytes, lane, this.state);
      run.scorer.adopt({
        steps,
        state: this.state,
        maximum: (name: StepMeasure) => ({
          value: doubles[maximumRows[name] / 8 + lane] as number,
          atStep: doubles[maximumAtRows[name] / 8 + lane] as number,
        }),
        phaseUncertain: this.machine.integers[scoreRows.uncertain / 4 + 2 * lane] !== 0,
        divergence,
      });
      if (diverged || run.finished) {
        run.ended = true;
        this.scores[run.index] = run.finish(diverged ? steps + 1 : steps);
      }
    });
  }

  private retire(): void {
    for (let lane = this.lanes.length - 1; lane >= 0; lane--) {
      if (!(this.lanes[lane] as LaneRun).ended || this.takeNext(lane)) continue;
      const last = this.lanes.length - 1;
      if (lane < last) {
        this.copyLane(last, lane);
        this.lanes[lane] = this.lanes[last] as LaneRun;
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
