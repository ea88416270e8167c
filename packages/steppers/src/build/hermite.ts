import { type Rational, rational, zero } from "../exact/rational.ts";
import { ProgramBuilder } from "../program/builder.ts";
import type { StepProgram, Value } from "../program/program.ts";
import type { Setting } from "./step-program.ts";
import { compensations, RunningState } from "./summation.ts";

const fraction = (n: bigint, d: bigint): Rational => rational(n, d);

/**
 * Predict q and v by Taylor series to the jerk, evaluate acceleration and jerk there, correct once:
 * v' = v + h/2 (a + a1) + h^2/12 (j - j1), q' = q + h/2 (v + v') + h^2/12 (a - a1). Carried: acceleration and jerk.
 */
export function buildHermite({ dimension: d, summation, force }: Setting): StepProgram {
  const extra = compensations(d, summation);
  const carriedAt = 2 * d + extra;
  const start = new ProgramBuilder(d, 2 * d, force);
  const first = start.accelerationAndJerk(start.vector(0), start.vector(d));
  const none = Array.from({ length: extra }, () => start.constant(zero));
  const initial = [...start.vector(0), ...start.vector(d), ...none, ...first.acceleration, ...first.jerk];

  const b = new ProgramBuilder(d, carriedAt + 2 * d, force);
  const state = new RunningState(b, summation);
  const [q, v] = [[...state.position], [...state.velocity]];
  const a = b.vector(carriedAt);
  const j = b.vector(carriedAt + d);
  const h = b.step;
  const half = b.mul(b.constant(fraction(1n, 2n)), h);
  const third = b.mul(b.constant(fraction(1n, 3n)), h);
  const twelfth = b.mul(b.constant(fraction(1n, 12n)), b.mul(h, h));
  // q + h (v + h/2 (a + h/3 j)), v + h (a + h/2 j).
  const position = q.map((x, k) =>
    b.add(x, b.mul(h, b.add(v[k]!, b.mul(half, b.add(a[k]!, b.mul(third, j[k]!)))))),
  );
  const velocity = v.map((x, k) => b.add(x, b.mul(h, b.add(a[k]!, b.mul(half, j[k]!)))));
  const next = b.accelerationAndJerk(position, velocity);
  const corrected = (slopes: Value, before: Value, after: Value): Value =>
    b.add(b.mul(half, slopes), b.mul(twelfth, b.sub(before, after)));
  for (let k = 0; k < d; k += 1) {
    state.kick(k, corrected(b.add(a[k]!, next.acceleration[k]!), j[k]!, next.jerk[k]!));
    state.drift(k, corrected(b.add(v[k]!, state.velocity[k]!), a[k]!, next.acceleration[k]!));
  }
  return {
    start: start.finish(initial),
    step: b.finish([...state.outputs(), ...next.acceleration, ...next.jerk]),
  };
}
