import { zero } from "../exact/rational.ts";
import type { Multistep } from "../methods/method.ts";
import { adamsBashforth, adamsMoulton } from "../methods/multistep/multistep.ts";
import { ProgramBuilder } from "../program/builder.ts";
import type { StepProgram, Value } from "../program/program.ts";
import { writePast } from "./multistep-start.ts";
import type { Setting } from "./step-program.ts";
import { compensations, RunningState } from "./summation.ts";

/**
 * Predict with Adams-Bashforth, evaluate, correct with Adams-Moulton, evaluate, for y' = f(y), y = (q, v). Carried: accelerations of all
 * back points, velocities of all but the present one, newest first.
 */
export function buildAdams(
  { backValues: k }: Multistep,
  { dimension: d, summation, force }: Setting,
): StepProgram {
  const extra = compensations(d, summation);
  const accelerationsAt = 2 * d + extra;
  const velocitiesAt = accelerationsAt + k * d;

  const start = new ProgramBuilder(d, 2 * d, force, true);
  const past = writePast(start, k);
  const initial = [
    ...start.vector(0),
    ...start.vector(d),
    ...Array.from({ length: extra }, () => start.constant(zero)),
    ...past.flatMap((point) => point.acceleration),
    ...past.slice(1).flatMap((point) => point.velocity),
  ];

  const b = new ProgramBuilder(d, velocitiesAt + (k - 1) * d, force);
  const state = new RunningState(b, summation);
  const [q, v] = [[...state.position], [...state.velocity]];
  const accelerations = Array.from({ length: k }, (_, j) => b.vector(accelerationsAt + j * d));
  const velocities = [v, ...Array.from({ length: k - 1 }, (_, j) => b.vector(velocitiesAt + j * d))];
  const sum = (weights: ReturnType<typeof adamsMoulton>, slopes: readonly (readonly Value[])[]): Value[] =>
    q.map((_, i) =>
      b.mul(
        b.step,
        b.weightedSum(
          weights,
          slopes.map((slope) => slope[i]!),
        )!,
      ),
    );
  const plus = (base: readonly Value[], change: readonly Value[]): Value[] =>
    base.map((x, i) => b.add(x, change[i]!));

  const predictor = adamsBashforth(k);
  const corrector = adamsMoulton(k + 1);
  const predictedVelocity = plus(v, sum(predictor, accelerations));
  const predicted = b.acceleration(plus(q, sum(predictor, velocities)));
  sum(corrector, [predictedVelocity, ...velocities]).forEach((change, i) => {
    state.drift(i, change);
  });
  sum(corrector, [predicted, ...accelerations]).forEach((change, i) => {
    state.kick(i, change);
  });
  const corrected = b.acceleration([...state.position]);
  return {
    start: start.finish(initial),
    step: b.finish([
      ...state.outputs(),
      ...corrected,
      ...accelerations.slice(0, -1).flat(),
      ...velocities.slice(0, -1).flat(),
    ]),
  };
}
