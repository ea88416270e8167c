import { timeSincePeriapsis } from "@perigauge/kepler";
import { BlockMeans } from "./drift.ts";
import { GrowthSamples, type RoundingFloor } from "./growth.ts";
import type { MeasureSummary } from "./score.ts";
import { timeToDirection } from "./time-to-direction.ts";

const PERIOD = 2 * Math.PI;

/** The exact orbit as the passages need it. */
export interface PassageReference {
  readonly circular: boolean;
  readonly eccentricity: number;
  /** Mean anomaly of the start in (-pi, pi], rad; 0 on a circular orbit. */
  readonly startMeanAnomaly: number;
  /** Direction of the start, which a circular orbit returns to. */
  readonly startX: number;
  readonly startY: number;
}

/** A numerical passage: when it was, in orbits since the start, and its lateness as a fraction of the period. */
export interface ObservedPassage {
  readonly atOrbit: number;
  readonly timing: number;
}

/**
 * Periapsis passages, numerical against exact, counted and never matched by nearness.
 *
 * From the last step before q.v rises through zero the exact Kepler flow of that state's osculating orbit leads to the passage; the same
 * is done for the exact state at the same time, so the difference of the two needs no long times. On a circular orbit the passages are
 * returns of the polar angle to its start. `timing` of passage k is its lateness as a fraction of the period, and since exact passages are
 * one period apart, `period` is the difference of successive timings.
 */
export class Passages {
  private readonly reference: PassageReference;
  private readonly detailed: boolean;
  private readonly previous = new Float64Array(4);
  private readonly previousExact = new Float64Array(4);
  private previousTime = 0;
  private previousSide = 0;
  /** Index of the next numerical passage; an exact passage of index j has mean anomaly 2 pi j. */
  private next: number;
  private readonly first: number;
  private lastTiming: number | null;
  private strayed = false;
  private count = 0;
  private readonly timing: PassageSummary;
  private readonly period: PassageSummary;
  private readonly observe: ((passage: ObservedPassage) => void) | undefined;

  constructor(
    reference: PassageReference,
    start: Float64Array,
    wholeOrbits: number,
    detailed: boolean,
    observe?: (passage: ObservedPassage) => void,
  ) {
    this.observe = observe;
    this.reference = reference;
    this.detailed = detailed;
    this.previous.set(start.subarray(0, 4));
    this.previousExact.set(this.previous);
    this.next = reference.circular || reference.startMeanAnomaly >= 0 ? 1 : 0;
    this.first = this.next;
    const startsOnPassage = reference.circular || reference.startMeanAnomaly === 0;
    this.lastTiming = startsOnPassage ? 0 : null;
    this.count = startsOnPassage ? 1 : 0;
    this.timing = new PassageSummary(wholeOrbits);
    this.period = new PassageSummary(wholeOrbits);
    this.previousSide = this.side(this.previous, 0);
  }

  /** Rows `from` to `to`; `stepTime` is the fixed step (row i is reached at (firstStep + i) h), or null where `times` holds the times. */
  accept(
    rows: Float64Array,
    exact: Float64Array,
    from: number,
    to: number,
    firstStep: number,
    stepTime: number | null,
    times: Float64Array,
  ): void {
    if (this.reference.circular) {
      this.walk(rows, exact, from, to, firstStep, stepTime, times);
      return;
    }
    // The common case first: one multiplication pair and a comparison a step.
    let side = this.previousSide;
    let pending = from;
    for (let i = from; i < to; i++) {
      const now = rows[4 * i]! * rows[4 * i + 2]! + rows[4 * i + 1]! * rows[4 * i + 3]!;
      if (side < 0 && now >= 0) {
        this.remember(rows, exact, pending, i, firstStep, stepTime, times);
        this.pass();
        pending = i;
      }
      side = now;
    }
    this.remember(rows, exact, pending, to, firstStep, stepTime, times);
    this.previousSide = side;
  }

  /** A passage found elsewhere: states and time of the last step before it. */
  passAfter(previous: Float64Array, previousExact: Float64Array, previousTime: number): void {
    this.previous.set(previous);
    this.previousExact.set(previousExact);
    this.previousTime = previousTime;
    this.pass();
  }

  private walk(
    rows: Float64Array,
    exact: Float64Array,
    from: number,
    to: number,
    firstStep: number,
    stepTime: number | null,
    times: Float64Array,
  ): void {
    for (let i = from; i < to; i++) {
      const now = this.side(rows, 4 * i);
      const ahead = rows[4 * i]! * this.reference.startX + rows[4 * i + 1]! * this.reference.startY > 0;
      if (this.previousSide < 0 && now >= 0 && ahead) this.pass();
      this.previousSide = now;
      this.remember(rows, exact, i, i + 1, firstStep, stepTime, times);
    }
  }

  /** Negative before a passage, positive after it, near the passage. */
  private side(state: Float64Array, at: number): number {
    const x = state[at]!;
    const y = state[at + 1]!;
    if (this.reference.circular) return this.reference.startX * y - this.reference.startY * x;
    return x * state[at + 2]! + y * state[at + 3]!;
  }

  /** Keeps the last of rows `from` to `to`, as the state before a passage to come. */
  private remember(
    rows: Float64Array,
    exact: Float64Array,
    from: number,
    to: number,
    firstStep: number,
    stepTime: number | null,
    times: Float64Array,
  ): void {
    if (to <= from) return;
    const last = to - 1;
    for (let c = 0; c < 4; c++) {
      this.previous[c] = rows[4 * last + c]!;
      this.previousExact[c] = exact[4 * last + c]!;
    }
    this.previousTime = stepTime === null ? times[2 * last]! : (firstStep + last) * stepTime;
  }

  private pass(): void {
    const toPassage = this.timeToPassage(this.previous);
    const exactToPassage = this.timeToPassage(this.previousExact);
    // Which exact passage the exact body was nearest to: its mean anomaly so far, less the part since (or plus the part until) it.
    const exactIndex = Math.round(
      (this.previousTime + this.reference.startMeanAnomaly + exactToPassage) / PERIOD,
    );
    // Exact passages are one period apart: the one of equal number lies that many periods from the one found.
    const timing = (toPassage - exactToPassage) / PERIOD + (exactIndex - this.next);
    if (!Number.isFinite(timing) || (!this.reference.circular && this.osculatingEccentricityStrays()))
      this.strayed = true;
    this.next += 1;
    this.count += 1;
    // Passage k falls in the orbit that it ends.
    const orbit = Math.max(1, this.next - this.first);
    const atOrbit = (this.previousTime + toPassage) / PERIOD;
    this.timing.accept(timing, orbit, atOrbit, this.detailed);
    if (this.lastTiming !== null) this.period.accept(timing - this.lastTiming, orbit, atOrbit, this.detailed);
    this.lastTiming = timing;
    this.observe?.({ atOrbit, timing });
  }

  private timeToPassage(state: Float64Array): number {
    const { circular, startX, startY } = this.reference;
    const x = state[0]!;
    const y = state[1]!;
    const vx = state[2]!;
    const vy = state[3]!;
    return circular ? timeToDirection(x, y, vx, vy, startX, startY) : -timeSincePeriapsis(x, y, vx, vy);
  }

  private osculatingEccentricityStrays(): boolean {
    const [x, y, vx, vy] = this.previous as unknown as readonly [number, number, number, number];
    const momentum = x * vy - y * vx;
    const r = Math.sqrt(x * x + y * y);
    const ex = vy * momentum - x / r;
    const ey = -vx * momentum - y / r;
    const osculating = Math.sqrt(ex * ex + ey * ey);
    return Math.abs(osculating - this.reference.eccentricity) > this.reference.eccentricity / 4;
  }

  /** Timing and period so far: for horizons. */
  maxima(): { readonly timing: PassageSummary; readonly period: PassageSummary } | null {
    return this.count < 2 || this.strayed ? null : { timing: this.timing, period: this.period };
  }

  finish(
    timingFloor: RoundingFloor,
  ): { readonly timing: MeasureSummary; readonly period: MeasureSummary } | null {
    const found = this.maxima();
    return found && { timing: found.timing.finish(timingFloor), period: found.period.finish(null) };
  }
}

/** Running summary of a measure that is taken once a passage; passages are not weighted. */
export class PassageSummary {
  max = 0;
  maxAtOrbit: number | null = null;
  private square = 0;
  private count = 0;
  private final: number | null = null;
  private readonly blocks: BlockMeans;
  private readonly samples: GrowthSamples;

  constructor(wholeOrbits: number) {
    this.blocks = new BlockMeans(wholeOrbits);
    // A late body's last passage falls after the end of the run: growth is judged up to the one before.
    this.samples = new GrowthSamples(wholeOrbits - 1);
  }

  accept(value: number, orbit: number, atOrbit: number, detailed: boolean): void {
    const size = Math.abs(value);
    if (size > this.max || this.maxAtOrbit === null) {
      this.max = size;
      this.maxAtOrbit = atOrbit;
    }
    this.count += 1;
    this.square += value * value;
    this.final = value;
    if (!detailed) return;
    this.blocks.accept(orbit, value);
    this.samples.accept(orbit, value);
  }

  /** `floor` is null for a measure whose growth is not judged. */
  finish(floor: RoundingFloor | null): MeasureSummary {
    const growth =
      floor === null ? { growthExponent: null, growthStandardError: null } : this.samples.growth(floor);
    return {
      max: this.count > 0 ? this.max : null,
      maxAtOrbit: this.maxAtOrbit,
      rms: this.count > 0 ? Math.sqrt(this.square / this.count) : null,
      final: this.final,
      driftPerOrbit: this.blocks.drift(),
      ...growth,
    };
  }
}
