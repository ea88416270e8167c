import type { Choice } from "../choose/choice.ts";

/**
 * What the report of a choice is drawn from, beside the choice itself: every number was computed by a run. Physical units are in the
 * names; `null` where a measure does not apply.
 */
export interface ChoiceEvidence {
  readonly choice: Choice;
  /** Error against cost: one point per stepper and knob value tried on the scenario. */
  readonly costPoints: readonly CostPoint[];
  /** Short runs over a grid of eccentricities at fixed steps per orbit, and over steps per orbit at the scenario's largest eccentricity. */
  readonly survey: Survey;
  /** The chosen stepper and its best rival of the other kind (symplectic or not) over the whole duration, thinned. */
  readonly histories: readonly History[];
  /** One orbit, exact and numerical, in kilometres. */
  readonly track: OrbitTrack;
}

export interface CostPoint {
  readonly stepper: string;
  readonly title: string;
  readonly symplectic: boolean;
  readonly stepsPerOrbit: number | null;
  readonly tolerance: number | null;
  readonly evaluationsPerOrbit: number;
  /** Largest error over its limit (1: exactly at the limit). */
  readonly worstRatio: number;
  readonly bindingLimit: string;
  readonly evidence: "run" | "extrapolated";
  /** The command that measures the worst cell of this point again. */
  readonly command?: string | undefined;
}

export interface SurveyPoint {
  readonly stepper: string;
  readonly title: string;
  readonly symplectic: boolean;
  readonly eccentricity: number;
  readonly stepsPerOrbit: number | null;
  readonly tolerance: number | null;
  /** Steps really taken, per orbit: places a variable-step stepper on an axis of steps per orbit. */
  readonly meanStepsPerOrbit?: number | undefined;
  readonly evaluationsPerOrbit: number;
  /** Largest absolute phase error, rad; energy error, relative; period error, relative. */
  readonly phase: number | null;
  readonly energy: number | null;
  readonly period: number | null;
  readonly ended: "completed" | "diverged";
  readonly command: string;
}

export interface Survey {
  readonly orbits: number;
  readonly startAnomalyDeg: number;
  /** At equal cost for every stepper: so many force evaluations per orbit. */
  readonly evaluationsPerOrbit: number;
  readonly againstEccentricity: readonly SurveyPoint[];
  readonly eccentricity: number;
  readonly againstStep: readonly SurveyPoint[];
  /** Absent from older results. */
  readonly plane?: SurveyPlane | undefined;
}

/** Short runs of the leading fixed-step steppers over a grid of eccentricities and steps per orbit. */
export interface SurveyPlane {
  readonly orbits: number;
  /** Of every cell: the semi-major axis that the limits in kilometres and seconds are read at. */
  readonly semiMajorAxisKm: number;
  readonly steppers: readonly string[];
  readonly eccentricities: readonly number[];
  readonly stepsPerOrbit: readonly number[];
  readonly cells: readonly PlaneCell[];
}

export interface PlaneCell {
  readonly stepper: string;
  readonly eccentricity: number;
  readonly stepsPerOrbit: number;
  readonly evaluationsPerOrbit: number;
  /** Largest absolute phase error of the short run, rad; null where it left the orbit. */
  readonly phase: number | null;
  /** Largest error over its limit, carried on from the short run to the scenario's duration; null where the run left the orbit or a measure is not defined. */
  readonly ratio: number | null;
  readonly bindingLimit: string | null;
  readonly command: string;
}

export interface History {
  readonly stepper: string;
  readonly title: string;
  readonly symplectic: boolean;
  readonly role: "choice" | "rival" | "current";
  readonly label: string;
  readonly orbit: string;
  readonly eccentricity: number;
  readonly startAnomalyDeg: number;
  readonly command: string;
  /** Largest absolute values within each interval, at its end; evenly spaced in log time. */
  readonly points: readonly {
    readonly orbit: number;
    readonly days: number;
    readonly energyRelative: number;
    readonly phaseRad: number;
    readonly alongTrackKm: number;
  }[];
  /** Signed period error of single orbits, at most 400 of them spread evenly over the run; absent from older results. */
  readonly periods?: readonly { readonly orbit: number; readonly periodRelative: number }[] | undefined;
  /** Signed energy error over the first orbit, and where in it periapsis is passed; absent from older results. */
  readonly oscillation?:
    | {
        readonly periapsisAtOrbit: number | null;
        readonly points: readonly { readonly orbit: number; readonly energyRelative: number }[];
      }
    | undefined;
}

export interface OrbitTrack {
  readonly orbit: string;
  readonly eccentricity: number;
  readonly bodyRadiusKm: number | null;
  readonly exact: readonly { readonly xKm: number; readonly yKm: number }[];
  /** Step by step: the chosen stepper, last orbit of the run. */
  readonly numerical: readonly { readonly xKm: number; readonly yKm: number; readonly step: number }[];
  readonly stepper: string;
}
