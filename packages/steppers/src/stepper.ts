/**
 * What the harness sees of a stepper. Lengths and times are normalised (gravitational parameter 1, semi-major axis 1); a state is one
 * `Float64Array` of positions followed by velocities, 4 numbers in the plane or 6 in space.
 */

/** The acceleration at position `q`, written to `out`; both of length 2 or 3. */
export type Acceleration = (q: Float64Array, out: Float64Array) => void;

/** The time derivative of the acceleration at position `q` and velocity `v`, written to `out`; all of length 2 or 3. */
export type Jerk = (q: Float64Array, v: Float64Array, out: Float64Array) => void;

export type Summation = "plain" | "compensated";

/** What can be said of a stepper without running it. */
export interface StepperInfo {
  readonly id: string;
  readonly title: string;
  readonly family: StepperFamily;
  readonly order: number;
  readonly source: string;
  /** `step`: fixed h, in time or (where `uneven`) in the method's own fictitious time; `tolerance`: variable step. */
  readonly knob: "step" | "tolerance";
  /** True where steps of equal h take unequal times; such a run writes the time each step reached. All variable steps are uneven. */
  readonly uneven: boolean;
  readonly symplectic: boolean;
  readonly timeReversible: boolean;
  readonly explicit: boolean;
  readonly selfStarting: boolean;
  readonly denseOutput: boolean;
  readonly stages: number | null;
  /** New force evaluations of one step once started, counted from its program; null where it depends on the run. */
  readonly evaluationsPerStep: number | null;
  /** Evaluations made before the first step and again after every restart (carried stages, multistep start-up); null as above. */
  readonly startEvaluations: number | null;
  readonly note?: string;
}

export type StepperFamily =
  | "runge-kutta"
  | "runge-kutta-nystrom"
  | "symplectic-splitting"
  | "implicit-symplectic"
  | "multistep"
  | "extrapolation"
  | "collocation"
  | "hermite"
  | "time-transformed"
  | "own";

export interface Start {
  /** Length 4 or 6; copied, never changed. */
  readonly state: Float64Array;
  /** Step h for a fixed step (or fictitious step); ignored where the knob is `tolerance`. */
  readonly step: number;
  /** Tolerance where the knob is `tolerance`. */
  readonly tolerance?: number;
  /** Where the knob is `tolerance`: the end time as an unevaluated sum hi + lo; the last step lands on it exactly. */
  readonly endTime?: readonly [hi: number, lo: number];
  /** Where the knob is `tolerance`: no step is longer than this; no bound where absent. */
  readonly maxStep?: number;
  /** Default `plain`. */
  readonly summation?: Summation;
  /** Default: the point mass, a = -q / r^3. */
  readonly acceleration?: Acceleration;
  /** The jerk that belongs to `acceleration`; only steppers that use it (`hermite-4`) ask for it. */
  readonly jerk?: Jerk;
}

/** A run in progress. */
export interface Trajectory {
  /**
   * Makes up to `maxSteps` steps. After each it writes the state to `rows` (4 or 6 numbers a step) and, if the stepper is `uneven`, the
   * time reached as an unevaluated sum hi + lo to `times` (2 numbers a step). Returns the steps made: fewer than `maxSteps` only when
   * the end time is reached (0 from then on). States that are not finite are written as they are; the caller looks.
   */
  advance(maxSteps: number, rows: Float64Array, times?: Float64Array): number;
  /** Force evaluations so far, start-up and rejected steps included. */
  readonly evaluations: number;
  /** Rejected trial steps so far (0 for a fixed step). */
  readonly rejectedSteps: number;
  /** Smallest accepted step so far other than the last (clipped) one; h for a fixed step. */
  readonly smallestStep: number;
  /** State at time t inside the last step made; only where `denseOutput`. */
  interpolate?(timeHi: number, timeLo: number, out: Float64Array): void;
}

export interface Stepper extends StepperInfo {
  begin(start: Start): Trajectory;
}

/** A stepper of one's own: the least that is needed to be swept, ranked and plotted beside the built-in ones. */
export interface OwnStepper {
  readonly id: string;
  /** Advances position q and velocity v (length 2 or 3, normalised units) in place by h. */
  step(q: Float64Array, v: Float64Array, h: number, acceleration: Acceleration): void;
}
