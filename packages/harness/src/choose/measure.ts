import type { CellPool } from "../run/cell-pool.ts";
import type { CellJob } from "../run/cell-task.ts";
import type { Cell, Score } from "../score/score.ts";
import { type FleetPoint, orbitsOf } from "./fleet.ts";
import { horizonsOf, type Limit, type LimitReading, measuresOf, readLimit, readMaxima } from "./limits.ts";

/** Where a run starts: a point of the fleet and a true anomaly. */
export interface Sample {
  readonly point: FleetPoint;
  readonly startAnomalyDeg: number;
}

/** One run held against every limit. */
export interface Reading {
  readonly sample: Sample;
  readonly cell: Cell;
  readonly score: Score;
  /** In the order of the limits. */
  readonly limits: readonly LimitReading[];
  /** Largest value over its limit; infinite where the run diverged. */
  readonly ratio: number;
}

/** Runs cells and holds them against the limits; no cell is run twice. */
export class Measurer {
  readonly limits: readonly Limit[];
  readonly durationSeconds: number;
  private readonly pool: CellPool;
  private readonly known = new Map<string, Reading>();
  private readonly scores: Map<string, Score>;

  constructor(
    pool: CellPool,
    limits: readonly Limit[],
    durationSeconds: number,
    scores = new Map<string, Score>(),
  ) {
    this.pool = pool;
    this.limits = limits;
    this.durationSeconds = durationSeconds;
    this.scores = scores;
  }

  /** The same runs held against other limits of the same measures, or carried on to another duration. */
  withLimits(limits: readonly Limit[], durationSeconds: number): Measurer {
    return new Measurer(this.pool, limits, durationSeconds, this.scores);
  }

  /** Every run so far, in the order it was first asked for. */
  get readings(): readonly Reading[] {
    return [...this.known.values()];
  }

  /** `extraHorizons(point)` adds horizons, in orbits, that screening reads growth from. */
  async measure(
    runs: readonly { readonly sample: Sample; readonly cell: Cell }[],
    extraHorizons: (point: FleetPoint) => readonly number[] = () => [],
  ): Promise<Reading[]> {
    // Two orbits of a fleet may be alike: they share scores, but each reading belongs to its own orbit.
    const keys = runs.map(({ sample: { point }, cell }) =>
      JSON.stringify([point.orbitIndex, point.parameters, cell]),
    );
    const fresh = new Map<string, { sample: Sample; cell: Cell; job: CellJob }>();
    runs.forEach(({ sample, cell }, i) => {
      const key = keys[i] as string;
      if (this.known.has(key) || fresh.has(key)) return;
      const horizons = new Set([
        ...horizonsOf(this.limits, sample.point, cell.orbits),
        ...extraHorizons(sample.point),
      ]);
      const sorted = [...horizons].filter((orbits) => orbits < cell.orbits).sort((a, b) => a - b);
      fresh.set(key, { sample, cell, job: { cell, horizons: sorted } });
    });
    const wanted = new Map([...fresh.values()].map(({ job }) => [JSON.stringify(job), job]));
    const jobs = [...wanted].filter(([key]) => !this.scores.has(key));
    const scores = await this.pool.run(
      jobs.map(([, job]) => job),
      { measures: measuresOf(this.limits), summaries: "maxima" },
    );
    jobs.forEach(([key], i) => {
      this.scores.set(key, scores[i] as Score);
    });
    for (const [key, { sample, cell, job }] of fresh) {
      this.known.set(key, this.read(sample, cell, this.scores.get(JSON.stringify(job)) as Score));
    }
    return keys.map((key) => this.known.get(key) as Reading);
  }

  private read(sample: Sample, cell: Cell, score: Score): Reading {
    const limits = this.limits.map((limit) => readLimit(limit, score, sample.point));
    const ratio = Math.max(...limits.map(({ value }, i) => value / (this.limits[i] as Limit).limit));
    return { sample, cell, score, limits, ratio };
  }

  /** Whether the run of a cell covers the scenario's duration. */
  isFull(reading: Reading): boolean {
    return reading.cell.orbits >= orbitsOf(reading.sample.point, this.durationSeconds);
  }
}

/** The reading with the largest ratio; the first of equals. */
export function worst(readings: readonly Reading[]): Reading {
  return readings.reduce((a, b) => (b.ratio > a.ratio ? b : a));
}

/** Samples of up to `count` worst readings: first the worst of each limit, then the worst that are left. */
export function worstSamples(readings: readonly Reading[], limitCount: number, count: number): Sample[] {
  const chosen: Sample[] = [];
  const add = (reading: Reading | undefined): void => {
    if (reading !== undefined && !chosen.some((sample) => sameSample(sample, reading.sample)))
      chosen.push(reading.sample);
  };
  for (let i = 0; i < limitCount; i++) {
    add(readings.reduce((a, b) => ((b.limits[i]?.value ?? 0) > (a.limits[i]?.value ?? 0) ? b : a)));
  }
  for (const reading of readings.toSorted((a, b) => b.ratio - a.ratio)) {
    if (chosen.length >= count) break;
    add(reading);
  }
  return chosen.slice(0, Math.max(count, limitCount));
}

export function sameSample(a: Sample, b: Sample): boolean {
  return (
    a.startAnomalyDeg === b.startAnomalyDeg &&
    a.point.orbitIndex === b.point.orbitIndex &&
    a.point.parameters[0] === b.point.parameters[0] &&
    a.point.parameters[1] === b.point.parameters[1]
  );
}

/** Value of a limit at a horizon that was kept beside the scenario's own. */
export function readingOfHorizon(limit: Limit, { score, sample }: Reading, orbits: number): number {
  const horizon = score.horizons?.find((entry) => entry.orbits === orbits);
  if (horizon === undefined) return 0;
  return readMaxima(limit, horizon.maxima, sample.point);
}
