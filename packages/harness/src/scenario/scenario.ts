/** The engineer's case, as written in the scenario file (format 1). Units are in the names. */
export interface Scenario {
  readonly format: "perigauge-scenario/1";
  readonly title: string;
  readonly gravitationalParameterKm3S2: number;
  readonly bodyRadiusKm?: number | undefined;
  readonly orbits: readonly ScenarioOrbit[];
  readonly start?: "any" | "periapsis" | "apoapsis" | number | undefined;
  readonly duration: { readonly days: number } | { readonly orbits: number };
  readonly limits: readonly ScenarioLimit[];
  /** Share of each limit that integration may use, the rest being left to models and inputs; 1 where absent. */
  readonly integrationShare?: number | undefined;
  /** Mass of the lighter body over that of the heavier: each body's own error about the barycentre is then given too. */
  readonly massRatio?: number | undefined;
  /** Manoeuvres, eclipse edges and the like, after each of which the integrator starts anew. */
  readonly restartsPerDay?: number | undefined;
  /** Errors of the recommended step stay below limit / designFactor; 2 where absent. */
  readonly designFactor?: number | undefined;
  readonly step?:
    | { readonly maxSeconds?: number | undefined; readonly multipleOfSeconds?: number | undefined }
    | undefined;
  readonly require?: Requirements | undefined;
  readonly current?:
    | {
        readonly stepper: string;
        readonly stepSeconds?: number | undefined;
        readonly tolerance?: number | undefined;
      }
    | undefined;
  /** What one force evaluation of the production code costs; total time is projected from it. */
  readonly evaluationMicroseconds?: number | undefined;
  /** Ids to choose from; the whole catalogue where absent. */
  readonly steppers?: readonly string[] | undefined;
}

export interface Requirements {
  readonly fixedStep?: boolean | undefined;
  readonly symplectic?: boolean | undefined;
  readonly timeReversible?: boolean | undefined;
  readonly explicit?: boolean | undefined;
  readonly selfStarting?: boolean | undefined;
  readonly denseOutput?: boolean | undefined;
  /** At most so many force evaluations per orbit, the shortest orbit counted. */
  readonly evaluationsPerOrbit?: number | undefined;
}

export type NumberOrRange = number | { readonly from: number; readonly to: number };

/** Any two of semi-major axis, eccentricity, periapsis and apoapsis (the last two as radius or altitude). */
export interface ScenarioOrbit {
  readonly name: string;
  /** How many satellites fly it; 1 where absent. */
  readonly count?: number | undefined;
  readonly semiMajorAxisKm?: NumberOrRange | undefined;
  readonly eccentricity?: NumberOrRange | undefined;
  readonly periapsisRadiusKm?: NumberOrRange | undefined;
  readonly apoapsisRadiusKm?: NumberOrRange | undefined;
  readonly periapsisAltitudeKm?: NumberOrRange | undefined;
  readonly apoapsisAltitudeKm?: NumberOrRange | undefined;
}

/** Exactly one measure, with its largest tolerable absolute value, over the whole duration or the first days of it. */
export interface ScenarioLimit {
  readonly alongTrackKm?: number | undefined;
  readonly radialKm?: number | undefined;
  readonly positionKm?: number | undefined;
  readonly timingSeconds?: number | undefined;
  readonly semiMajorAxisM?: number | undefined;
  readonly apsisDeg?: number | undefined;
  readonly phaseRad?: number | undefined;
  readonly energyRelative?: number | undefined;
  readonly withinDays?: number | undefined;
}
