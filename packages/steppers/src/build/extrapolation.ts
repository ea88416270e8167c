import { parseRow } from "../exact/coefficients.ts";
import {
  divide,
  multiply,
  one,
  type Rational,
  rational,
  subtract,
  toDouble,
  zero,
} from "../exact/rational.ts";
import type { Extrapolation } from "../methods/method.ts";
import type { ProgramBuilder } from "../program/builder.ts";
import type { StepProgram, Value } from "../program/program.ts";
import { buildPair, type PairProgram } from "./pair.ts";
import { buildStep, type Setting } from "./step-program.ts";

/** Numbers of sub-steps, column by column. */
export function sequenceOf(method: Extrapolation): readonly Rational[] {
  return parseRow(method.sequence);
}

/**
 * Weights that take the basic results to the extrapolated one: the value at 0 of the polynomial in 1/n^2 through them (what the scheme of
 * Aitken and Neville gives, written as one sum): prod over j != i of 1 / (1 - (n_j / n_i)^2).
 */
export function extrapolationWeights(sequence: readonly Rational[]): readonly Rational[] {
  return sequence.map((ni, i) =>
    sequence.reduce((product, nj, j) => {
      if (i === j) return product;
      const ratio = divide(nj, ni);
      return divide(product, subtract(one, multiply(ratio, ratio)));
    }, one),
  );
}

/** The changes of position and velocity over the step that one basic method with n sub-steps gives. */
type Basic = (
  b: ProgramBuilder,
  n: Rational,
  q: readonly Value[],
  v: readonly Value[],
  first: readonly Value[],
) => { readonly drift: readonly Value[]; readonly kick: readonly Value[] };

/** W.B. Gragg's modified midpoint rule for y' = f(y), without the smoothing step. Increments are summed, not states. */
const modifiedMidpoint: Basic = (b, n, q, v, first) => {
  const h = b.div(b.step, b.constant(n));
  const double = b.add(h, h);
  const zeroes = q.map(() => b.constant(zero));
  let [q0, v0] = [zeroes, zeroes];
  let q1 = v.map((x) => b.mul(h, x));
  let v1 = first.map((x) => b.mul(h, x));
  for (let m = 1; m < toDouble(n); m += 1) {
    const velocity = v.map((x, k) => b.add(x, v1[k]!));
    const acceleration = b.acceleration(q.map((x, k) => b.add(x, q1[k]!)));
    const step = (from: readonly Value[], slope: readonly Value[]): Value[] =>
      slope.map((x, k) => (m === 1 ? b.mul(double, x) : b.add(from[k]!, b.mul(double, x))));
    [q0, q1] = [q1, step(q0, velocity)];
    [v0, v1] = [v1, step(v0, acceleration)];
  }
  return { drift: q1, kick: v1 };
};

/** C. Størmer's rule for q'' = a(q) as velocity Verlet: kick, drift, ..., drift, kick. Increments are summed, not states. */
const stormerRule: Basic = (b, n, q, v, first) => {
  const h = b.div(b.step, b.constant(n));
  const half = b.mul(h, b.constant(divide(one, two)));
  let kick = first.map((a) => b.mul(half, a));
  let drift: Value[] = [];
  for (let m = 1; m <= toDouble(n); m += 1) {
    const moved = kick.map((change, k) => b.mul(h, b.add(v[k]!, change)));
    drift = m === 1 ? moved : drift.map((x, k) => b.add(x, moved[k]!));
    const acceleration = b.acceleration(q.map((x, k) => b.add(x, drift[k]!)));
    const factor = m < toDouble(n) ? h : half;
    kick = kick.map((x, k) => b.add(x, b.mul(factor, acceleration[k]!)));
  }
  return { drift, kick };
};

const two = rational(2n);
const basics = { "modified-midpoint": modifiedMidpoint, stormer: stormerRule } as const;

function extrapolated(
  b: ProgramBuilder,
  method: Extrapolation,
  q: readonly Value[],
  v: readonly Value[],
  first: readonly Value[],
): { drift: Value[]; kick: Value[]; error: { position: Value[]; velocity: Value[] } } {
  const sequence = sequenceOf(method);
  const columns = sequence.map((n) => basics[method.basic](b, n, q, v, first));
  const weights = extrapolationWeights(sequence);
  const lower = extrapolationWeights(sequence.slice(1));
  const difference = weights.map((weight, i) => subtract(weight, i === 0 ? zero : lower[i - 1]!));
  const combine = (part: "drift" | "kick", by: readonly Rational[]): Value[] =>
    q.map(
      (_, k) =>
        b.weightedSum(
          by,
          columns.map((column) => column[part][k]!),
        )!,
    );
  return {
    drift: combine("drift", weights),
    kick: combine("kick", weights),
    error: { position: combine("drift", difference), velocity: combine("kick", difference) },
  };
}

/** One step of fixed h with all columns. */
export function buildExtrapolation(method: Extrapolation, setting: Setting): StepProgram {
  return buildStep(setting, false, (b, state) => {
    const [q, v] = [[...state.position], [...state.velocity]];
    const { drift, kick } = extrapolated(b, method, q, v, b.acceleration(q));
    for (let k = 0; k < b.dimension; k += 1) {
      state.drift(k, drift[k]!);
      state.kick(k, kick[k]!);
    }
    return null;
  });
}

/** The trial of variable step: the error estimate is the difference to the extrapolation without the coarsest column. */
export function buildExtrapolationPair(method: Extrapolation, setting: Setting): PairProgram {
  return buildPair(setting, (b, q, v, first) => {
    const { drift, kick, error } = extrapolated(b, method, q, v, first);
    return {
      position: q.map((x, k) => b.add(x, drift[k]!)),
      velocity: v.map((x, k) => b.add(x, kick[k]!)),
      errors: [error],
      next: null,
      slopes: [],
    };
  });
}
