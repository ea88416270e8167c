import type { PlanarOrbit } from "@perigauge/kepler";
import type { Trajectory } from "@perigauge/steppers";
import { stepsBy } from "../run/orbit-times.ts";
import type { ResolvedCell } from "../run/resolve-cell.ts";
import { ApsisErrors } from "./apsis-errors.ts";
import { CHUNK_STEPS, type Chunk } from "./chunk.ts";
import { displacementErrors } from "./displacement-errors.ts";
import { angleFloor, energyFloor, type RoundingFloor } from "./growth.ts";
import { angularMomentumErrors, energyErrors } from "./invariant-errors.ts";
import { Maximum } from "./maximum.ts";
import { type ObservedPassage, Passages } from "./passages.ts";
import { PhaseErrors } from "./phase-errors.ts";
import { type DivergenceReason, findEnd } from "./run-end.ts";
import {
  type Ended,
  type HorizonMaxima,
  MEASURES,
  type MeasureName,
  type MeasureSummary,
  type Score,
  STEP_MEASURES,
  type StepMeasure,
} from "./score.ts";
import { type GrowthValue, StepSummary } from "./step-summary.ts";

const TWO_PI = 2 * Math.PI;
/** Orbits by which a step may overshoot the end of an orbit and still belong to it: time is rounded. */
const ORBIT_SLACK = 1e-9;

/** What is to be measured of a run. Maxima come out with the same digits whatever else is asked for. */
export interface ScoringPlan {
  readonly measures: ReadonlySet<MeasureName>;
  /** `maxima`: only those, faster; `all`: root mean square, drift and growth too. */
  readonly summaries: "maxima" | "all";
  /** Horizons, in orbits, at which the maxima so far are kept; ascending, each shorter than the run. */
  readonly horizons: readonly number[];
  /** Called after each chunk with rows `from` to `to`: for histories of a run. Errors are indexed by row. */
  readonly observe?: (window: ObservedWindow) => void;
  /** Called at each passage, before `observe` sees the chunk it falls in; only where `period` or `timing` is measured. */
  readonly observePassage?: (passage: ObservedPassage) => void;
}

export interface ObservedWindow {
  readonly chunk: Chunk;
  readonly from: number;
  readonly to: number;
  readonly errors: Readonly<Record<StepMeasure, Float64Array>>;
}

/** A run that was scored elsewhere, as it stands after `steps` steps. */
export interface AdoptedProgress {
  readonly steps: number;
  /** Reached at this time. */
  readonly time: number;
  /** x, y, vx, vy. */
  readonly state: Float64Array;
  /** Largest absolute values so far (-1: none), and the step each was met at, or the time where steps are uneven. */
  readonly maximum: (name: StepMeasure) => { readonly value: number; readonly at: number };
  readonly phaseUncertain: boolean;
  readonly divergence: DivergenceReason | null;
  /** Where steps are uneven: time of the next step, if horizons before it are to be kept. */
  readonly nextTime: number | null;
}

/** Uneven steps may overshoot a horizon by rounding. */
export const HORIZON_SLACK: number = 1 + 1e-12;

export const FULL_PLAN: ScoringPlan = { measures: new Set(MEASURES), summaries: "all", horizons: [] };

const NOTHING: MeasureSummary = {
  max: null,
  maxAtOrbit: null,
  rms: null,
  final: null,
  driftPerOrbit: null,
  growthExponent: null,
  growthStandardError: null,
};

const GROWTH_VALUE: Readonly<Record<StepMeasure, GrowthValue>> = {
  energy: "orbit maximum",
  angularMomentum: "orbit maximum",
  phase: "orbit mean",
  apsis: "orbit mean",
  position: "orbit mean",
  alongTrack: "orbit mean",
  radial: "orbit maximum",
};

/** Errors of the chunk at hand and lengths of its steps; chunks are scored one at a time. */
const errors = perMeasure(() => new Float64Array(CHUNK_STEPS));
const lengths = new Float64Array(CHUNK_STEPS);

/** Scores one run, chunk by chunk. */
export class RunScorer {
  private readonly resolved: ResolvedCell;
  private readonly plan: ScoringPlan;
  private readonly energy0: number;
  private readonly angularMomentum0: number;
  readonly circular: boolean;
  private readonly wholeOrbits: number;
  readonly wanted: readonly StepMeasure[];
  private readonly maxima: Readonly<Record<StepMeasure, Maximum>>;
  private readonly summaries: Readonly<Record<StepMeasure, StepSummary>> | null;
  private readonly phaseErrors = new PhaseErrors();
  private readonly apsisErrors: ApsisErrors;
  readonly passages: Passages | null;
  private readonly lastState = new Float64Array(4);
  private readonly horizonMaxima: HorizonMaxima[] = [];
  private lastTime = 0;
  private steps = 0;
  private divergence: DivergenceReason | null = null;

  constructor(resolved: ResolvedCell, orbit: PlanarOrbit, start: Float64Array, plan: ScoringPlan) {
    const { cell } = resolved;
    this.resolved = resolved;
    this.plan = plan;
    this.energy0 = orbit.energy.hi;
    this.angularMomentum0 = orbit.angularMomentum.hi;
    this.circular = cell.eccentricity === 0;
    this.wholeOrbits = Math.floor(cell.orbits + 1e-9);
    this.wanted = STEP_MEASURES.filter(
      (name) => plan.measures.has(name) && !(name === "apsis" && this.circular),
    );
    this.maxima = perMeasure(() => new Maximum());
    this.summaries =
      plan.summaries === "all"
        ? perMeasure((name) => new StepSummary(this.wholeOrbits, GROWTH_VALUE[name]))
        : null;
    this.apsisErrors = new ApsisErrors(orbit.eccentricityX.hi, orbit.eccentricityY.hi);
    const wantsPassages = plan.measures.has("period") || plan.measures.has("timing");
    const reference = {
      circular: this.circular,
      eccentricity: cell.eccentricity,
      startMeanAnomaly: this.circular ? 0 : orbit.meanAnomaly.hi,
      startX: start[0]!,
      startY: start[1]!,
    };
    this.passages = wantsPassages
      ? new Passages(reference, start, this.wholeOrbits, plan.summaries === "all", plan.observePassage)
      : null;
    this.lastState.set(start);
    // Horizons shorter than one step are reached before the first.
    this.closeHorizons(null);
  }

  /** Scores the chunk; false where the run has diverged in it and must not go on. */
  accept(chunk: Chunk): boolean {
    const end = findEnd(chunk.rows, chunk.count, this.resolved.cell.eccentricity);
    const count = end === null ? chunk.count : end.rowsBefore;
    const { uneven } = this.resolved.stepper;
    for (let from = 0; from < count; ) {
      const to = Math.min(count, uneven ? this.cutAtHorizon(chunk, from, count) : count);
      if (to > from) this.acceptRows(chunk, from, to);
      from = to;
      this.closeHorizons(uneven && from < count ? chunk.times[2 * from]! : null);
    }
    if (end !== null) this.divergence = end.reason;
    return end === null;
  }

  get eccentricity(): number {
    return this.resolved.cell.eccentricity;
  }

  /** Takes over what was scored elsewhere, with horizons kept where it stops at them; passages were reported one by one. */
  adopt(progress: AdoptedProgress): void {
    this.steps = progress.steps;
    this.lastTime = progress.time;
    this.lastState.set(progress.state);
    for (const name of this.wanted) {
      const { value, at } = progress.maximum(name);
      this.maxima[name].value = value;
      if (this.resolved.stepper.uneven) this.maxima[name].atTime = at;
      else this.maxima[name].atStep = at;
    }
    this.phaseErrors.uncertain = progress.phaseUncertain;
    this.closeHorizons(progress.nextTime);
    this.divergence = progress.divergence;
  }

  /** First row at or after `from` that lies beyond the next horizon. */
  private cutAtHorizon(chunk: Chunk, from: number, count: number): number {
    const horizon = this.plan.horizons[this.horizonMaxima.length];
    if (horizon === undefined) return count;
    const limit = horizon * TWO_PI * HORIZON_SLACK;
    let to = from;
    while (to < count && chunk.times[2 * to]! <= limit) to++;
    return to;
  }

  /** Keeps the maxima of every horizon that is reached: by the steps made, or because the next row (at `nextTime`) lies beyond it. */
  private closeHorizons(nextTime: number | null): void {
    const { stepsPerOrbit } = this.resolved;
    for (;;) {
      const horizon = this.plan.horizons[this.horizonMaxima.length];
      if (horizon === undefined) return;
      const reached =
        stepsPerOrbit !== null && !this.resolved.stepper.uneven
          ? this.steps >= stepsBy(horizon, stepsPerOrbit)
          : nextTime !== null && nextTime > horizon * TWO_PI * HORIZON_SLACK;
      if (!reached) return;
      this.horizonMaxima.push(this.maximaSoFar(horizon));
    }
  }

  private maximaSoFar(orbits: number): HorizonMaxima {
    const maxima: Partial<Record<MeasureName, { max: number | null; maxAtOrbit: number | null }>> = {};
    for (const name of this.wanted) maxima[name] = this.maximumOf(name);
    const passages = this.passages?.maxima() ?? null;
    for (const name of ["timing", "period"] as const) {
      if (!this.plan.measures.has(name)) continue;
      maxima[name] = { max: passages?.[name].max ?? null, maxAtOrbit: passages?.[name].maxAtOrbit ?? null };
    }
    return { orbits, maxima };
  }

  private maximumOf(name: StepMeasure): { max: number | null; maxAtOrbit: number | null } {
    const maximum = this.maxima[name];
    if (maximum.value < 0) return { max: null, maxAtOrbit: null };
    const { step } = this.resolved;
    const time = step !== null && !this.resolved.stepper.uneven ? maximum.atStep * step : maximum.atTime;
    return { max: maximum.value, maxAtOrbit: time / TWO_PI };
  }

  private acceptRows(chunk: Chunk, from: number, to: number): void {
    const { rows, exact, times, firstStep } = chunk;
    const { wanted } = this;
    const { uneven } = this.resolved.stepper;
    const has = (name: StepMeasure): boolean => wanted.includes(name);
    if (has("energy")) energyErrors(rows, from, to, this.energy0, errors.energy);
    if (has("angularMomentum"))
      angularMomentumErrors(rows, from, to, this.angularMomentum0, errors.angularMomentum);
    if (has("apsis")) this.apsisErrors.fill(rows, from, to, errors.apsis);
    const displaced = has("position") || has("alongTrack") || has("radial");
    if (has("phase") || displaced) this.phaseErrors.fill(rows, exact, from, to, errors.phase);
    if (displaced) {
      displacementErrors(
        rows,
        exact,
        errors.phase,
        from,
        to,
        errors.position,
        errors.alongTrack,
        errors.radial,
      );
    }
    for (const name of wanted)
      this.maxima[name].accept(errors[name], from, to, firstStep, uneven ? times : null);
    this.passages?.accept(rows, exact, from, to, firstStep, uneven ? null : this.resolved.step, times);
    if (this.summaries !== null) this.summarise(chunk, from, to);
    this.plan.observe?.({ chunk, from, to, errors });
    this.steps = firstStep + to - 1;
    this.lastTime = uneven ? times[2 * (to - 1)]! : this.steps * (this.resolved.step as number);
    this.lastState.set(rows.subarray(4 * (to - 1), 4 * to));
  }

  /** Feeds the summaries orbit by orbit: a step belongs to the orbit it ends in, counted from 1. */
  private summarise(chunk: Chunk, from: number, to: number): void {
    const { uneven } = this.resolved.stepper;
    if (uneven) {
      let previous = this.lastTime;
      for (let i = from; i < to; i++) {
        lengths[i] = chunk.times[2 * i]! - previous;
        previous = chunk.times[2 * i]!;
      }
    } else lengths.fill(this.resolved.step as number, from, to);
    for (let start = from; start < to; ) {
      const orbit = this.orbitOf(chunk, start);
      const stop = this.orbitEnd(chunk, orbit, start, to);
      for (const name of this.wanted) {
        this.summaries?.[name].accept(errors[name], start, stop, lengths, orbit);
      }
      start = stop;
    }
  }

  private orbitOf(chunk: Chunk, row: number): number {
    const { step, stepper } = this.resolved;
    const time = stepper.uneven || step === null ? chunk.times[2 * row]! : (chunk.firstStep + row) * step;
    return Math.max(1, Math.ceil(time / TWO_PI - ORBIT_SLACK));
  }

  /** First row after `row` that lies beyond the orbit, at most `to`. */
  private orbitEnd(chunk: Chunk, orbit: number, row: number, to: number): number {
    const { step, stepper } = this.resolved;
    const end = (orbit + ORBIT_SLACK) * TWO_PI;
    if (!stepper.uneven && step !== null) {
      return Math.max(row + 1, Math.min(to, Math.floor(end / step) - chunk.firstStep + 1));
    }
    let stop = row + 1;
    while (stop < to && chunk.times[2 * stop]! <= end) stop++;
    return stop;
  }

  finish(trajectory: Pick<Trajectory, "evaluations" | "rejectedSteps" | "smallestStep">): Score {
    const { cell, stepsPerOrbit, step } = this.resolved;
    const orbitsMade = this.lastTime / TWO_PI;
    const evaluations = this.evaluationsMade(trajectory);
    const evaluationsPerOrbit = orbitsMade > 0 ? evaluations / orbitsMade : evaluations;
    const floors = {
      energy: energyFloor(evaluationsPerOrbit),
      angle: angleFloor(orbitsMade > 0 ? this.steps / orbitsMade : 1),
    };
    const completed = this.divergence === null;
    const stepSummaries = Object.fromEntries(
      STEP_MEASURES.map((name) => [name, this.summaryOf(name, completed, floors)]),
    ) as Record<StepMeasure, MeasureSummary>;
    const passages = this.passages?.finish((orbit) => floors.angle(orbit) / TWO_PI) ?? null;
    const wantedOrNothing = (name: "period" | "timing"): MeasureSummary =>
      passages !== null && this.plan.measures.has(name) ? passages[name] : NOTHING;
    const [x, y, vx, vy] = this.lastState as unknown as readonly [number, number, number, number];
    const ended: Ended =
      this.divergence === null
        ? { status: "completed" }
        : { status: "diverged", reason: this.divergence, atOrbit: orbitsMade };
    return {
      format: "perigauge-score/1",
      stepper: cell.stepper,
      eccentricity: cell.eccentricity,
      stepsPerOrbit,
      tolerance: this.resolved.step === null ? (cell.tolerance ?? null) : null,
      orbits: cell.orbits,
      startAnomalyDeg: cell.startAnomalyDeg,
      summation: cell.summation,
      step,
      maxStep: cell.maxStep ?? null,
      steps: this.steps,
      evaluations,
      evaluationsPerOrbit,
      rejectedSteps: trajectory.rejectedSteps,
      smallestStep: trajectory.smallestStep,
      ...stepSummaries,
      period: wantedOrNothing("period"),
      timing: wantedOrNothing("timing"),
      phaseUncertain: this.phaseErrors.uncertain,
      finalState: { t: this.lastTime, x, y, vx, vy },
      ended,
      ...(this.plan.horizons.length > 0 ? { horizons: this.horizonMaxima } : {}),
    };
  }

  /** A run that diverged was advanced to the end of its chunk: only the steps up to the one that failed count. */
  private evaluationsMade({ evaluations }: Pick<Trajectory, "evaluations">): number {
    const { evaluationsPerStep, startEvaluations, knob } = this.resolved.stepper;
    if (this.divergence === null || knob !== "step" || evaluationsPerStep === null) return evaluations;
    return Math.min(evaluations, (startEvaluations ?? 0) + evaluationsPerStep * (this.steps + 1));
  }

  private summaryOf(
    name: StepMeasure,
    completed: boolean,
    floors: { readonly energy: RoundingFloor; readonly angle: RoundingFloor },
  ): MeasureSummary {
    if (!this.wanted.includes(name)) return NOTHING;
    const { max, maxAtOrbit } = this.maximumOf(name);
    if (max === null) return NOTHING;
    const floor = name === "energy" || name === "angularMomentum" ? floors.energy : floors.angle;
    return { ...NOTHING, ...this.summaries?.[name].finish(completed, floor), max, maxAtOrbit };
  }
}

function perMeasure<T>(make: (name: StepMeasure) => T): Readonly<Record<StepMeasure, T>> {
  return Object.fromEntries(STEP_MEASURES.map((name) => [name, make(name)])) as Record<StepMeasure, T>;
}
