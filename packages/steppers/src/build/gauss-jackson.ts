import { type Rational, rational, zero } from "../exact/rational.ts";
import { cumulative, logarithm, ordinates, product, reciprocal } from "../exact/series.ts";
import type { Multistep } from "../methods/method.ts";
import { ProgramBuilder } from "../program/builder.ts";
import type { StepProgram, Value } from "../program/program.ts";
import { writePast } from "./multistep-start.ts";
import type { Setting } from "./step-program.ts";
import { compensations } from "./summation.ts";

/**
 * The second-sum method of Gauss and Jackson: with s and S the first and second sums of the accelerations a, v_n = h (s_n + sum V_k
 * a_{n-k}) and q_n = h^2 (S_n - s_n + sum Q_k a_{n-k}); predicted one step ahead, v = h (s_n + ...), q = h^2 (S_n + ...). Predict,
 * evaluate, correct, evaluate. Carried: rounding errors of the two sums where summation is compensated, S, s, then past accelerations.
 */
export function buildGaussJackson(
  { backValues: k }: Multistep,
  { dimension: d, summation, force }: Setting,
): StepProgram {
  const weights = gaussJacksonWeights(k);
  const extra = compensations(d, summation);
  const sumsAt = 2 * d + extra;
  const pastAt = sumsAt + 2 * d;

  const b = new ProgramBuilder(d, pastAt + k * d, force);
  const past = Array.from({ length: k }, (_, j) => b.vector(pastAt + j * d));
  const first = b.vector(sumsAt + d);
  const second = b.vector(sumsAt);
  const errors = Array.from({ length: extra }, (_, i) => b.variable(2 * d + i));
  const accumulate = (value: Value, increment: Value, slot: number): Value => {
    if (extra === 0) return b.add(value, increment);
    const corrected = b.sub(increment, errors[slot]!);
    const total = b.add(value, corrected);
    errors[slot] = b.sub(b.sub(total, value), corrected);
    return total;
  };
  const h2 = b.mul(b.step, b.step);
  const position = (
    base: readonly Value[],
    row: readonly Rational[],
    points: readonly (readonly Value[])[],
  ): Value[] =>
    base.map((sum, i) =>
      b.mul(
        h2,
        b.add(
          sum,
          b.weightedSum(
            row,
            points.map((point) => point[i]!),
          )!,
        ),
      ),
    );

  const predicted = b.acceleration(position(second, weights.nextPosition, past));
  // S_{n+1} - s_{n+1} = S_n, whatever the new acceleration.
  const q = position(second, weights.position, [predicted, ...past.slice(0, -1)]);
  const corrected = b.acceleration(q);
  const points = [corrected, ...past.slice(0, -1)];
  const nextFirst = first.map((sum, i) => accumulate(sum, corrected[i]!, d + i));
  const nextSecond = second.map((sum, i) => accumulate(sum, nextFirst[i]!, i));
  const v = nextFirst.map((sum, i) =>
    b.mul(
      b.step,
      b.add(
        sum,
        b.weightedSum(
          weights.velocity,
          points.map((point) => point[i]!),
        )!,
      ),
    ),
  );
  return {
    start: startSums(k, weights, d, extra, force),
    step: b.finish([...q, ...v, ...errors, ...nextSecond, ...nextFirst, ...points.flat()]),
  };
}

function startSums(
  k: number,
  weights: GaussJacksonWeights,
  d: Setting["dimension"],
  extra: number,
  force: Setting["force"],
): StepProgram["start"] {
  const b = new ProgramBuilder(d, 2 * d, force, true);
  const past = writePast(b, k).map((point) => point.acceleration);
  const h = b.mul(b.constant(rational(-1n)), b.step);
  const h2 = b.mul(h, h);
  const without = (value: Value, unit: Value, row: readonly Rational[], i: number): Value =>
    b.sub(
      b.div(value, unit),
      b.weightedSum(
        row,
        past.map((point) => point[i]!),
      )!,
    );
  const first = b.vector(d).map((v, i) => without(v, h, weights.velocity, i));
  const second = b.vector(0).map((q, i) => b.add(without(q, h2, weights.position, i), first[i]!));
  const none = Array.from({ length: extra }, () => b.constant(zero));
  return b.finish([...b.vector(0), ...b.vector(d), ...none, ...second, ...first, ...past.flat()]);
}

export interface GaussJacksonWeights {
  readonly velocity: readonly Rational[];
  readonly position: readonly Rational[];
  readonly nextPosition: readonly Rational[];
}

/** From the summed series of Adams-Moulton, Cowell and Stormer, cut at difference k - 1. */
export function gaussJacksonWeights(k: number): GaussJacksonWeights {
  const adams = reciprocal(logarithm(k + 2));
  const cowell = product(adams, adams);
  return {
    velocity: ordinates(adams.slice(1, k + 1)),
    position: ordinates(cowell.slice(2)),
    nextPosition: ordinates(cumulative(cowell).slice(2)),
  };
}
