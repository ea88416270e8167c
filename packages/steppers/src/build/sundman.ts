import { parseRow } from "../exact/coefficients.ts";
import { type Rational, zero } from "../exact/rational.ts";
import type { Tableau } from "../methods/method.ts";
import { ProgramBuilder } from "../program/builder.ts";
import type { StepProgram, Value } from "../program/program.ts";
import { liveStages } from "./runge-kutta.ts";
import type { Setting } from "./step-program.ts";
import { compensations, RunningState } from "./summation.ts";
import { RunningTime, timeZero } from "./time.ts";

/** One step s of an explicit Runge-Kutta method in the fictitious time of K.F. Sundman: dt = r ds, dq = r v ds, dv = r a ds. */
export function buildSundman(method: Tableau, { dimension: d, summation, force }: Setting): StepProgram {
  const extra = compensations(d, summation);
  const timeAt = 2 * d + extra;
  const start = new ProgramBuilder(d, 2 * d, force);
  const none = Array.from({ length: extra }, () => start.constant(zero));
  const initial = [...start.vector(0), ...start.vector(d), ...none, ...timeZero(start)];

  const b = new ProgramBuilder(d, timeAt + 2, force);
  const state = new RunningState(b, summation);
  const time = new RunningTime(b, timeAt);
  const a = method.a.map(parseRow);
  const weights = parseRow(method.b);
  const live = liveStages(a, weights);
  const q = [...state.position];
  const v = [...state.velocity];
  /** Slopes per stage: position, velocity, then time. */
  const slopes: Value[][] = [];
  const along = (row: readonly Rational[], k: number): Value | null =>
    b.weightedSum(
      row,
      slopes.map((slope) => slope[k]!),
    );
  const shifted = (base: Value, row: readonly Rational[], k: number): Value => {
    const total = along(row, k);
    return total === null ? base : b.add(base, b.mul(b.step, total));
  };
  a.forEach((row, i) => {
    if (!live[i]) {
      slopes.push(new Array<Value>(2 * d + 1).fill(q[0]!));
      return;
    }
    const position = q.map((value, k) => shifted(value, row, k));
    const velocity = v.map((value, k) => shifted(value, row, d + k));
    const squares = position.map((x) => b.mul(x, x));
    const r = b.sqrt(squares.reduce((total, square) => b.add(total, square)));
    const acceleration = b.acceleration(position);
    slopes.push([...velocity.map((x) => b.mul(r, x)), ...acceleration.map((x) => b.mul(r, x)), r]);
  });
  const increment = (k: number): Value => b.mul(b.step, along(weights, k)!);
  const increments = Array.from({ length: 2 * d + 1 }, (_, k) => increment(k));
  for (let k = 0; k < d; k += 1) {
    state.drift(k, increments[k]!);
    state.kick(k, increments[d + k]!);
  }
  time.add(increments[2 * d]!);
  return {
    start: start.finish(initial),
    step: b.finish([...state.outputs(), ...time.outputs()], [timeAt, timeAt + 1]),
  };
}
