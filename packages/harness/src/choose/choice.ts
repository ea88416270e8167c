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
  /** Of an extrapolated value: it may be this many times larger, should growth turn to the steepest that theory allows. 1 for a run. */
  readonly uncertaintyFactor: number;
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

/** What the engineer should see when repeating the choice on the production code, switched to a point mass. */
export interface HandOver {
  readonly days: number;
  readonly orbits: number;
  readonly orbit: string;
  readonly eccentricity: number;
  readonly startAnomalyDeg: number;
  readonly stepSeconds: number;
  /** Largest distance between runs with step h and h/2 at common times. */
  readonly halfStepDifferenceKm: number;
  /** Distance from the start after running forward and, with reversed velocities, back. */
  readonly closureKm: number;
}

/** The cheapest stepper of a changed scenario, by screening. */
export interface Sensitivity {
  readonly change: string;
  readonly stepper: string | null;
  readonly stepSeconds: number | null;
  readonly stepsPerOrbit: number | null;
  readonly tolerance: number | null;
  readonly evaluationsPerOrbit: number | null;
  readonly evidence: "extrapolated";
}

/** Share of each body's motion about the barycentre in an error of the relative orbit. */
export interface BodyErrors {
  readonly massRatio: number;
  /** Worst position-like error of each body, over that of the relative orbit: m2/(m1 + m2) for the heavier, m1/(m1 + m2) for the lighter. */
  readonly heavierShare: number;
  readonly lighterShare: number;
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
    readonly sensitivity: number;
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
  /** In plain words: why this one, what limits it, what to watch for, what it does not show. */
  readonly explanation: string;
  readonly sensitivity: readonly Sensitivity[];
  readonly handOver: HandOver | null;
  readonly bodies: BodyErrors | null;
  readonly cautions: readonly string[];
  readonly provenance: Provenance;
}
