/**
 * A cell is one measurement to be made; a score is what it yields. Both are plain JSON. Everything here is in normalised units
 * (gravitational parameter 1, semi-major axis 1, period 2 pi); angles in radians unless the name says degrees.
 */

export type Summation = "plain" | "compensated";

export interface Cell {
  readonly stepper: string;
  readonly eccentricity: number;
  /** One of the three knobs is set: the step h itself, steps per orbit (h is the double nearest 2 pi / N), or a tolerance. */
  readonly step?: number;
  readonly stepsPerOrbit?: number;
  readonly tolerance?: number;
  /** Largest step allowed to a variable-step stepper. */
  readonly maxStep?: number;
  readonly orbits: number;
  /** True anomaly of the start, degrees. */
  readonly startAnomalyDeg: number;
  readonly summation: Summation;
}

/** Measures taken at every step, in the order they are reported. */
export const STEP_MEASURES = [
  "energy",
  "angularMomentum",
  "phase",
  "apsis",
  "position",
  "alongTrack",
  "radial",
] as const;
/** Measures taken at each periapsis passage. */
export const PASSAGE_MEASURES = ["period", "timing"] as const;

export type StepMeasure = (typeof STEP_MEASURES)[number];
export type PassageMeasure = (typeof PASSAGE_MEASURES)[number];
export type MeasureName = StepMeasure | PassageMeasure;
export const MEASURES: readonly MeasureName[] = [...STEP_MEASURES, ...PASSAGE_MEASURES];

/** Summaries of one measure over a run; a field that does not apply, or was not asked for, is null. */
export interface MeasureSummary {
  /** Largest absolute value. */
  readonly max: number | null;
  /** Where the largest absolute value was met, in orbits since the start. */
  readonly maxAtOrbit: number | null;
  readonly rms: number | null;
  /** At the last step or passage. */
  readonly final: number | null;
  readonly driftPerOrbit: number | null;
  readonly growthExponent: number | null;
  readonly growthStandardError: number | null;
}

export type Ended =
  | { readonly status: "completed" }
  | {
      readonly status: "diverged";
      readonly reason: "escaped" | "collided" | "not finite";
      readonly atOrbit: number;
    };

/** Largest absolute values up to a horizon shorter than the run. */
export interface HorizonMaxima {
  readonly orbits: number;
  readonly maxima: Readonly<
    Partial<Record<MeasureName, { readonly max: number | null; readonly maxAtOrbit: number | null }>>
  >;
}

export interface Score extends Readonly<Record<MeasureName, MeasureSummary>> {
  readonly format: "perigauge-score/1";
  readonly stepper: string;
  readonly eccentricity: number;
  readonly stepsPerOrbit: number | null;
  readonly tolerance: number | null;
  readonly orbits: number;
  readonly startAnomalyDeg: number;
  readonly summation: Summation;
  readonly step: number | null;
  readonly maxStep: number | null;
  readonly steps: number;
  readonly evaluations: number;
  readonly evaluationsPerOrbit: number;
  readonly rejectedSteps: number;
  /** Smallest accepted step; h for a fixed step. */
  readonly smallestStep: number;
  /** True if one step changed the phase error by more than pi/2, so that its multiple of 2 pi is a guess. */
  readonly phaseUncertain: boolean;
  readonly finalState: {
    readonly t: number;
    readonly x: number;
    readonly y: number;
    readonly vx: number;
    readonly vy: number;
  };
  readonly ended: Ended;
  readonly horizons?: readonly HorizonMaxima[];
}
