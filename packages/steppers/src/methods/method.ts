import type { Coefficients } from "../exact/coefficients.ts";

/** What every published method states of itself. What follows from the coefficients is computed, never typed. */
export interface Published {
  readonly id: string;
  readonly title: string;
  readonly order: number;
  readonly source: string;
  readonly note?: string;
}

/** The second formula of a pair, which estimates the error of the first. */
export interface Embedded {
  /** Id of the variable-step stepper: the usual name and both orders. */
  readonly id: string;
  readonly title: string;
  readonly order: number;
  readonly b: Coefficients;
  /** Weights of a third formula, whose estimate guards the first against being small by accident. */
  readonly second?: Coefficients;
}

/** Weights b_i(theta) = sum over k of rows[i][k] theta^(k+1), for the state at theta in [0, 1] of a step. */
export interface DenseOutput {
  readonly order: number;
  readonly rows: readonly Coefficients[];
}

/** An explicit Runge-Kutta method for y' = f(y): row i of `a` holds the i weights of the stages before it. */
export interface Tableau extends Published {
  readonly a: readonly Coefficients[];
  readonly b: Coefficients;
  readonly embedded?: Embedded;
  readonly dense?: DenseOutput;
}

/** A tableau with an embedded formula: a fixed-step and a variable-step stepper. */
export type EmbeddedTableau = Tableau & Required<Pick<Tableau, "embedded">>;

/**
 * A splitting for q'' = a(q): drifts q += w h v and kicks v += w h a(q) in turn, beginning with `first`. Where `symmetric`, only the
 * first half is written, up to and with the operation in the middle; the mirror follows.
 */
export interface Splitting extends Published {
  readonly first: "drift" | "kick";
  readonly symmetric: boolean;
  readonly weights: Coefficients;
}
