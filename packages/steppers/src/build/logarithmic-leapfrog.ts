import { one, rational, zero } from "../exact/rational.ts";
import { ProgramBuilder } from "../program/builder.ts";
import type { StepProgram, Value } from "../program/program.ts";
import type { Setting } from "./step-program.ts";
import { compensations, RunningState } from "./summation.ts";
import { RunningTime, timeZero } from "./time.ts";

const dot = (b: ProgramBuilder, x: readonly Value[], y: readonly Value[]): Value =>
  x.map((value, k) => b.mul(value, y[k]!)).reduce((total, product) => b.add(total, product));

/**
 * One step s of the time-transformed leapfrog with weight W = 1/r: drift by s/2 with dq = v ds / W, kick dv = a r ds, drift again. W is not
 * taken from the position but integrated beside it (dW = v . grad(1/r) r ds, with the mean velocity of the kick), so any acceleration
 * serves; for the point mass W stays equal to kinetic energy plus binding energy, which is the logarithmic-Hamiltonian leapfrog.
 */
export function buildLogarithmicLeapfrog({ dimension: d, summation, force }: Setting): StepProgram {
  const extra = compensations(d, summation);
  const timeAt = 2 * d + extra;

  const start = new ProgramBuilder(d, 2 * d, force);
  const q0 = start.vector(0);
  const r0 = start.sqrt(dot(start, q0, q0));
  const none = Array.from({ length: extra }, () => start.constant(zero));
  const weight0 = start.div(start.constant(one), r0);
  const initial = [...q0, ...start.vector(d), ...none, ...timeZero(start), weight0];

  const b = new ProgramBuilder(d, timeAt + 3, force);
  const state = new RunningState(b, summation);
  const time = new RunningTime(b, timeAt);
  const half = b.mul(b.constant(rational(1n, 2n)), b.step);
  const drift = (weight: Value): void => {
    const dt = b.div(half, weight);
    for (let k = 0; k < d; k += 1) state.drift(k, b.mul(dt, state.velocity[k]!));
    time.add(dt);
  };

  const weight = b.variable(timeAt + 2);
  drift(weight);
  const q = [...state.position];
  const r2 = dot(b, q, q);
  const kick = b.mul(b.step, b.sqrt(r2));
  const before = [...state.velocity];
  b.acceleration(q).forEach((a, k) => {
    state.kick(k, b.mul(kick, a));
  });
  const mean = before.map((v, k) => b.add(v, state.velocity[k]!));
  const next = b.sub(weight, b.div(b.mul(half, dot(b, mean, q)), r2));
  drift(next);
  return {
    start: start.finish(initial),
    step: b.finish([...state.outputs(), ...time.outputs(), next], [timeAt, timeAt + 1]),
  };
}
