import type { ObservedPassage } from "../score/passages.ts";
import type { ObservedWindow } from "../score/run-scorer.ts";

const TWO_PI = 2 * Math.PI;
const POINTS = 200;
/** First sample, in orbits. */
const FIRST = 1 / 8;

/** Errors at one step of a run; signed, and the largest sizes since the sample before. */
export interface SeriesPoint {
  /** Orbits since the start, at the step. */
  readonly orbit: number;
  readonly energy: number;
  readonly phase: number;
  /** At the last passage so far; null before the first one. */
  readonly timing: number | null;
  /** Null on a circular orbit. */
  readonly apsis: number | null;
  readonly energyMax: number;
  readonly phaseMax: number;
}

/** Samples a run at no more than 200 steps spaced evenly in log time; the last step is always one of them. */
export class LogTimeSeries {
  private readonly edges: readonly number[];
  private readonly step: number | null;
  private readonly circular: boolean;
  private readonly points: SeriesPoint[] = [];
  private readonly passages: ObservedPassage[] = [];
  private timing: number | null = null;
  private next = 0;
  private latest: SeriesPoint | null = null;
  private energyMax = 0;
  private phaseMax = 0;

  /** `step` is null where steps are uneven. */
  constructor(orbits: number, step: number | null, circular: boolean) {
    const first = Math.min(FIRST, orbits / 2);
    this.edges = Array.from({ length: POINTS }, (_, i) => first * (orbits / first) ** (i / (POINTS - 1)));
    this.step = step;
    this.circular = circular;
  }

  passage(passage: ObservedPassage): void {
    this.passages.push(passage);
  }

  accept({ chunk, from, to, errors }: ObservedWindow): void {
    const { step } = this;
    const { times, firstStep } = chunk;
    const energies = errors.energy;
    const phases = errors.phase;
    for (let i = from; i < to; i++) {
      const energy = energies[i] as number;
      const phase = phases[i] as number;
      const energySize = Math.abs(energy);
      const phaseSize = Math.abs(phase);
      if (energySize > this.energyMax) this.energyMax = energySize;
      if (phaseSize > this.phaseMax) this.phaseMax = phaseSize;
      const wanted = this.edges[this.next];
      const time = step === null ? (times[2 * i] as number) : (firstStep + i) * step;
      const orbit = time / TWO_PI;
      const due = wanted !== undefined && orbit >= wanted;
      if (!due && i < to - 1) continue;
      const point: SeriesPoint = {
        orbit,
        energy,
        phase,
        timing: this.timingBy(orbit),
        apsis: this.circular ? null : (errors.apsis[i] as number),
        energyMax: this.energyMax,
        phaseMax: this.phaseMax,
      };
      this.latest = due ? null : point;
      if (!due) continue;
      this.points.push(point);
      this.energyMax = 0;
      this.phaseMax = 0;
      while (this.next < this.edges.length && orbit >= (this.edges[this.next] as number)) this.next += 1;
    }
  }

  private timingBy(orbit: number): number | null {
    for (;;) {
      const first = this.passages[0];
      if (first === undefined || first.atOrbit > orbit) return this.timing;
      this.timing = first.timing;
      this.passages.shift();
    }
  }

  finish(): SeriesPoint[] {
    return this.latest === null ? this.points : [...this.points.slice(0, POINTS - 1), this.latest];
  }
}
