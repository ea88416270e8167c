import type { Rational } from "../exact/rational.ts";
import { isZero, subtract } from "../exact/rational.ts";
import { ProgramBuilder } from "../program/builder.ts";
import type { Program, Value } from "../program/program.ts";
import type { Setting } from "./step-program.ts";

/**
 * What a variable-step run needs of a pair. `first` maps a state to the acceleration there. `trial` maps state, that acceleration and h to
 * (in this order) the new state, the error estimate, the acceleration at the new state where the last stage happens to be it, and, where
 * the pair has dense output, the slopes of all stages: positions of every stage, then velocities of every stage.
 */
export interface PairProgram {
  readonly first: Program;
  readonly trial: Program;
  readonly lastIsFirst: boolean;
}

/** What one method writes into the trial. */
export interface Trial {
  readonly position: readonly Value[];
  readonly velocity: readonly Value[];
  /** Differences of the two formulas, per estimate and dimension: position, velocity. */
  readonly errors: readonly { readonly position: readonly Value[]; readonly velocity: readonly Value[] }[];
  /** Acceleration at the new state, if a stage is there. */
  readonly next: readonly Value[] | null;
  readonly slopes: readonly Value[];
}

export type WriteTrial = (
  builder: ProgramBuilder,
  q: readonly Value[],
  v: readonly Value[],
  first: readonly Value[],
) => Trial;

/**
 * Error norm of a trial: the larger of |position error| over |position| and |velocity error| over |velocity|, where |.| is the largest
 * component and each scale the larger of its values before and after. It has no absolute part: neither vector vanishes on an orbit.
 * Where a pair has two estimates e1, e2 they join as e1^2 / sqrt(e1^2 + e2^2 / 100) (Hairer, Nørsett & Wanner I, sect. II.10).
 */
export function buildPair(setting: Setting, write: WriteTrial): PairProgram {
  const { dimension: d, force } = setting;
  const start = new ProgramBuilder(d, 2 * d, force);
  const first = start.finish(start.acceleration(start.vector(0)));

  const b = new ProgramBuilder(d, 3 * d, force);
  const q = b.vector(0);
  const v = b.vector(d);
  const trial = write(b, q, v, b.vector(2 * d));
  const size = (vector: readonly Value[]): Value => vector.map((x) => b.abs(x)).reduce((m, x) => b.max(m, x));
  const positionScale = b.max(size(q), size(trial.position));
  const velocityScale = b.max(size(v), size(trial.velocity));
  const norms = trial.errors.map((error) =>
    b.max(b.div(size(error.position), positionScale), b.div(size(error.velocity), velocityScale)),
  );
  const error = norms.length === 1 ? norms[0]! : joinEstimates(b, norms[0]!, norms[1]!);
  return {
    first,
    trial: b.finish([...trial.position, ...trial.velocity, error, ...(trial.next ?? []), ...trial.slopes]),
    lastIsFirst: trial.next !== null,
  };
}

function joinEstimates(b: ProgramBuilder, main: Value, second: Value): Value {
  const hundredth = b.constant({ numerator: 1n, denominator: 100n });
  const tiny = b.constant({ numerator: 1n, denominator: 10n ** 300n });
  const square = b.mul(main, main);
  const joined = b.add(square, b.mul(hundredth, b.mul(second, second)));
  return b.div(square, b.sqrt(b.max(joined, tiny)));
}

/** b_i - bhat_i. */
export function difference(weights: readonly Rational[], other: readonly Rational[]): Rational[] {
  return weights.map((weight, i) => subtract(weight, other[i]!));
}

/** True where the last stage stands at the new position: its row repeats the weights, whose last entry is zero. */
export function lastStageIsNext(
  rows: readonly (readonly Rational[])[],
  weights: readonly Rational[],
): boolean {
  const last = rows.at(-1)!;
  const same = last.every((weight, j) => isZero(subtract(weight, weights[j]!)));
  return rows.length > 1 && same && isZero(weights.at(-1)!);
}
