import type { Coefficients } from "../exact/coefficients.ts";

/** What every published method states of itself. What follows from the coefficients is computed, never typed. */
export interface Published {
  readonly id: string;
  readonly title: string;
  readonly order: number;
  readonly source: string;
  readonly note?: string;
}

/** The second formula of a pair, which estimates the error of the first. Either its weights are given or their difference. */
export interface Embedded {
  /** Id of the variable-step stepper: the usual name and both orders. */
  readonly id: string;
  readonly title: string;
  readonly order: number;
  /** True where the published pair goes on from this formula and not from the one of higher order. */
  readonly advances?: true;
  readonly b?: Coefficients;
  /** Weights of the main formula minus those of this one, where they are published so. */
  readonly difference?: Coefficients;
  /** Weights of a third formula, whose estimate guards the first against being small by accident. */
  readonly second?: Coefficients;
}

/** Weights b_i(theta) = sum over k of rows[i][k] theta^(k+1), for the state at theta in [0, 1] of a step. */
export interface DenseOutput {
  readonly order: number;
  readonly rows: readonly Coefficients[];
}

/**
 * Dense output with stages of its own, which follow the method's and the slope at the new state:
 * y = y0 + x(F0 + (1-x)(F1 + x(F2 + (1-x)(F3 + x(F4 + (1-x)(F5 + x F6)))))), F0 = y1 - y0, F1 = h f0 - F0, F2 = 2 F0 - h(f0 + f1) and
 * F3 to F6 the rows of `nested` times h and all slopes.
 */
export interface NestedDenseOutput {
  readonly order: number;
  readonly stages: readonly Coefficients[];
  readonly nested: readonly Coefficients[];
}

/** An explicit Runge-Kutta method for y' = f(y): row i of `a` holds the i weights of the stages before it. */
export interface Tableau extends Published {
  readonly a: readonly Coefficients[];
  readonly b: Coefficients;
  readonly embedded?: Embedded;
  readonly dense?: DenseOutput | NestedDenseOutput;
}

/** A tableau with an embedded formula: a fixed-step and a variable-step stepper. */
export type EmbeddedTableau = Tableau & Required<Pick<Tableau, "embedded">>;

/**
 * An explicit Runge-Kutta-Nystrom method for q'' = a(q): stage positions q + c h v + h^2 sum a_ij a_j, new position q + h v + h^2 sum
 * position_i a_i, new velocity v + h sum velocity_i a_i.
 */
export interface NystromTableau extends Published {
  readonly c: Coefficients;
  readonly a: readonly Coefficients[];
  readonly position: Coefficients;
  readonly velocity: Coefficients;
  readonly embedded?: {
    readonly id: string;
    readonly title: string;
    readonly order: number;
    readonly position: Coefficients;
    readonly velocity: Coefficients;
  };
  readonly dense?: NystromDenseOutput;
}

/**
 * q(theta) = q + theta h v + (theta h)^2 sum_i (sum_k position[i][k] theta^k) a_i, v(theta) = v + theta h sum_i (sum_k velocity[i][k]
 * theta^k) a_i.
 */
export interface NystromDenseOutput {
  readonly order: number;
  readonly position: readonly Coefficients[];
  readonly velocity: readonly Coefficients[];
}

export type EmbeddedNystrom = NystromTableau & Required<Pick<NystromTableau, "embedded">>;

/**
 * A splitting for q'' = a(q): drifts q += w h v and kicks v += w h a(q) in turn, beginning with `first`. Where `symmetric`, only the
 * first half is written, up to and with the operation in the middle; the mirror follows.
 */
export interface Splitting extends Published {
  readonly first: "drift" | "kick";
  readonly symmetric: boolean;
  readonly weights: Coefficients;
  /** Order for two flows that have nothing to do with each other; less than `order` where that needs kinetic energy quadratic in v. */
  readonly genericOrder?: number;
}

/**
 * A symmetric composition of a symmetric second-order step: steps of factor times h in turn, the first half up to and with the middle one
 * written. Over leapfrog and over velocity Verlet it makes two steppers.
 */
export interface Composition extends Published {
  readonly factors: Coefficients;
}

/** True where a method comes with an embedded formula. */
export function hasEmbedded<Method extends { readonly embedded?: object }>(
  method: Method,
): method is Method & Required<Pick<Method, "embedded">> {
  return method.embedded !== undefined;
}

/** Extrapolation of a basic rule in 1/n^2 over numbers n of sub-steps: order twice the number of columns. */
export interface Extrapolation extends Published {
  readonly basic: "modified-midpoint" | "stormer";
  readonly sequence: Coefficients;
  readonly variable: { readonly id: string; readonly title: string };
}

/** An explicit Runge-Kutta method in the fictitious time ds = dt / r. */
export interface Sundman extends Published {
  readonly tableau: Tableau;
}

/** A predictor-corrector on equal steps; its weights are generated, not typed. */
export interface Multistep extends Published {
  /** Accelerations (and velocities) of this many past points, the present one included, enter a step. */
  readonly backValues: number;
}

/** Collocation nodes in [0, 1]; weights follow by integrating the interpolation polynomial, exactly. */
export interface Collocation extends Published {
  readonly nodes: Coefficients;
}
