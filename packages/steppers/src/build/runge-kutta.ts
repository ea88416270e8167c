import { parseRow } from "../exact/coefficients.ts";
import { isZero, type Rational } from "../exact/rational.ts";
import type { EmbeddedTableau, Tableau } from "../methods/method.ts";
import type { ProgramBuilder } from "../program/builder.ts";
import type { StepProgram, Value } from "../program/program.ts";
import { buildPair, difference, lastStageIsNext, type PairProgram } from "./pair.ts";
import { buildStep, type Setting } from "./step-program.ts";

/** The stages whose values reach `weights`, directly or through other stages. */
export function liveStages(a: readonly (readonly Rational[])[], weights: readonly Rational[]): boolean[] {
  const live = weights.map((weight) => !isZero(weight));
  for (let i = live.length - 1; i >= 0; i -= 1) {
    if (!live[i]) continue;
    a[i]!.forEach((weight, j) => {
      live[j] ||= !isZero(weight);
    });
  }
  return live;
}

/** Slopes of all live stages: velocity and acceleration, per dimension. */
export interface Slopes {
  readonly velocity: readonly (readonly Value[])[];
  readonly acceleration: readonly (readonly Value[])[];
}

/** Writes the stages of y' = f(y), y = (q, v): Q_i = q + h sum_j a_ij V_j, V_i = v + h sum_j a_ij a(Q_j). */
export function writeStages(
  b: ProgramBuilder,
  a: readonly (readonly Rational[])[],
  live: readonly boolean[],
  q: readonly Value[],
  v: readonly Value[],
  first?: readonly Value[],
): Slopes {
  const velocity: Value[][] = [];
  const acceleration: Value[][] = [];
  const shifted = (base: readonly Value[], row: readonly Rational[], slopes: readonly Value[][]): Value[] =>
    base.map((value, k) => {
      const total = b.weightedSum(
        row,
        slopes.map((slope) => slope[k]!),
      );
      return total === null ? value : b.add(value, b.mul(b.step, total));
    });
  a.forEach((row, i) => {
    if (!live[i]) {
      velocity.push([...v]);
      acceleration.push([...v]);
      return;
    }
    const position = shifted(q, row, velocity);
    const stageVelocity = shifted(v, row, acceleration);
    velocity.push(stageVelocity);
    acceleration.push(i === 0 && first !== undefined ? [...first] : b.acceleration(position));
  });
  return { velocity, acceleration };
}

/** h times the weighted sum of slopes, per dimension. */
export function increments(
  b: ProgramBuilder,
  weights: readonly Rational[],
  slopes: readonly (readonly Value[])[],
): Value[] {
  return Array.from({ length: b.dimension }, (_, k) => {
    const total = b.weightedSum(
      weights,
      slopes.map((slope) => slope[k]!),
    );
    return b.mul(b.step, total!);
  });
}

/** One step of fixed h. Stages that only the embedded formula needs are left out. */
export function buildRungeKutta(method: Tableau, setting: Setting): StepProgram {
  const a = method.a.map(parseRow);
  const weights = parseRow(method.b);
  return buildStep(setting, false, (b, state) => {
    const slopes = writeStages(b, a, liveStages(a, weights), state.position, state.velocity);
    const drift = increments(b, weights, slopes.velocity);
    const kick = increments(b, weights, slopes.acceleration);
    drift.forEach((increment, k) => {
      state.drift(k, increment);
    });
    kick.forEach((increment, k) => {
      state.kick(k, increment);
    });
    return null;
  });
}

/** The trial step of an embedded pair. */
export function buildRungeKuttaPair(method: EmbeddedTableau, setting: Setting): PairProgram {
  const a = method.a.map(parseRow);
  const { weights, errors } = pairWeights(method);
  const all = weights.map(() => true);
  return buildPair(setting, (b, q, v, first) => {
    const slopes = writeStages(b, a, all, q, v, first);
    const moved = (base: readonly Value[], change: readonly Value[]): Value[] =>
      base.map((value, k) => b.add(value, change[k]!));
    return {
      position: moved(q, increments(b, weights, slopes.velocity)),
      velocity: moved(v, increments(b, weights, slopes.acceleration)),
      errors: errors.map((error) => ({
        position: increments(b, error, slopes.velocity),
        velocity: increments(b, error, slopes.acceleration),
      })),
      next: lastStageIsNext(a, weights) ? slopes.acceleration.at(-1)! : null,
      slopes: method.dense === undefined ? [] : [...slopes.velocity.flat(), ...slopes.acceleration.flat()],
    };
  });
}

/** The weights that a variable-step run goes on from, and those of its one or two error estimates. */
export function pairWeights(method: EmbeddedTableau): {
  readonly weights: readonly Rational[];
  readonly errors: readonly (readonly Rational[])[];
} {
  const { embedded } = method;
  const main = parseRow(method.b);
  const error =
    embedded.b === undefined ? parseRow(embedded.difference ?? "") : difference(main, parseRow(embedded.b));
  const weights = embedded.advances === true ? difference(main, error) : main;
  const second = embedded.second === undefined ? [] : [difference(main, parseRow(embedded.second))];
  return { weights, errors: [error, ...second] };
}
