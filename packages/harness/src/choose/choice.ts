import type { Scenario } from "../scenario/scenario.ts";

/** Limits of a scenario, in the physical terms of the engineer. */
export const LIMIT_KEYS = [
  "alongTrackKm",
  "radialKm",
  "positionKm",
  "timingSeconds",
  "semiMajorAxisM",
  "apsisDeg",
  "phaseRad",
  "energyRelative",
] as const;
export type LimitKey = (typeof LIMIT_KEYS)[number];

/** The worst value met against one limit, and the cell that produced it; `score` re-runs that cell to the same digits. */
export interface LimitError {
  /** Null where the run diverged or the measure is not defined: the limit then counts as exceeded, with factor 0. */
  readonly value: number | null;
  readonly limit: number;
  /** limit / value: above 1 the limit holds. */
  readonly factor: number;
  /** Name of the scenario's orbit. */
  readonly orbit: string;
  readonly eccentricity: number;
  readonly startAnomalyDeg: number;
  /** When the worst value was met, in orbits since the start. */
  readonly atOrbit: number;
  readonly withinDays: number | null;
  /** The command that measures this cell again. */
  readonly command: string;
}

/** Keys are the limit's name, with `@DAYS` added where it has a horizon: `alongTrackKm@7`. */
export type LimitErrors = Readonly<Record<string, LimitError>>;

export interface RankedStepper {
  readonly stepper: string;
  readonly title: string;
  readonly symplectic: boolean;
  /** Null for a variable step, and where equal steps of the method take unequal times. */
  readonly stepSeconds: number | null;
  /** Of the shortest orbit. */
  readonly stepsPerOrbit: number | null;
  readonly tolerance: number | null;
  readonly evaluationsPerOrbit: number;
  /** Whole fleet and duration, one start. */
  readonly evaluationsTotal: number;
  readonly errors: LimitErrors;
  /** Smallest factor over the limits; below 1 fails. */
  readonly margin: number;
  readonly bindingLimit: string | null;
  /** Knob values verified in full around the recommended one: step in seconds, or tolerance, or steps per orbit of an uneven stepper; `from` is the coarser end. */
  readonly band: { readonly from: number; readonly to: number; readonly cellsRun: number } | null;
  /** The coarsest knob that still holds every limit (undivided), and the first that fails: how near the edge is. */
  readonly cliff: {
    readonly stepSeconds: number | null;
    readonly tolerance: number | null;
    /** Cliff knob over recommended knob (1.4: the step can grow by 40 % before a limit breaks). */
    readonly ratio: number;
    readonly reason: "fails beyond" | "capped" | "not searched";
  } | null;
  /** Finest knob that still holds, where smaller steps are worse because of rounding; null where none was met. */
  readonly floor: { readonly stepSeconds: number | null; readonly tolerance: number | null } | null;
  readonly evidence: "run" | "extrapolated";
  /** One line: why it wins, or why it loses. */
  readonly why: string;
}

export interface CurrentChoice extends RankedStepper {
  readonly enough: boolean;
  /** Evaluations of the current choice over those of the recommended one; null where there is none. */
  readonly costAgainstChoice: number | null;
}

export interface ExcludedStepper {
  readonly stepper: string;
  readonly reason: string;
  readonly limit: string | null;
  readonly value: number | null;
  readonly allowed: number | null;
}

export interface Provenance {
  readonly version: string;
  readonly node: string;
  readonly command: string;
  readonly seed: number;
  /** SHA-256 of the result without its provenance and times. */
  readonly digest: string;
  readonly cellsRun: number;
  readonly seconds: {
    readonly screening: number;
    readonly search: number;
    readonly verification: number;
    readonly total: number;
  };
}

export interface Choice {
  readonly format: "perigauge-choice/1";
  readonly scenario: Scenario;
  readonly choice: string | null;
  readonly ranking: readonly RankedStepper[];
  readonly current: CurrentChoice | null;
  readonly excluded: readonly ExcludedStepper[];
  /** What would have to give where nothing qualifies; empty otherwise. */
  readonly whatWouldHaveToGive: readonly string[];
  readonly cautions: readonly string[];
  readonly provenance: Provenance;
}
