import { invalid } from "./errors.ts";
import { checkAdvance, dimensionOf, stepOf } from "./run/begin.ts";
import type { Acceleration, OwnStepper, Start, Stepper, Trajectory } from "./stepper.ts";

/**
 * Makes a stepper of one's own fit for everything the built-in ones do. Force evaluations are counted through the `acceleration` that it
 * is given. Its order, symmetry and the like are unknown, so they are stated as the least: order 0, not symplectic, not reversible.
 * @throws InvalidInputError where `id` or `step` is missing; its `begin` throws where compensated summation is asked for.
 */
export function ownStepper(own: OwnStepper): Stepper {
  if (typeof own.id !== "string" || own.id === "") throw invalid.ownId(own.id);
  if (typeof own.step !== "function") throw invalid.ownStep(own.step);
  return {
    id: own.id,
    title: own.id,
    family: "own",
    order: 0,
    source: "supplied by the user",
    knob: "step",
    uneven: false,
    symplectic: false,
    timeReversible: false,
    explicit: true,
    selfStarting: true,
    denseOutput: false,
    stages: null,
    evaluationsPerStep: null,
    startEvaluations: null,
    begin: (start) => begin(own, start),
  };
}

function begin(own: OwnStepper, start: Start): Trajectory {
  const d = dimensionOf(start);
  const h = stepOf(start);
  if (start.summation === "compensated") throw invalid.summation(start.summation);
  const q = start.state.slice(0, d);
  const v = start.state.slice(d);
  const force = start.acceleration ?? pointMassAcceleration;
  let evaluations = 0;
  const counted: Acceleration = (position, out) => {
    evaluations += 1;
    force(position, out);
  };
  return {
    advance(maxSteps, rows): number {
      checkAdvance(maxSteps, 2 * d, rows, false, undefined);
      for (let n = 0; n < maxSteps; n += 1) {
        own.step(q, v, h, counted);
        rows.set(q, 2 * d * n);
        rows.set(v, 2 * d * n + d);
      }
      return maxSteps;
    },
    get evaluations() {
      return evaluations;
    },
    rejectedSteps: 0,
    smallestStep: Math.abs(h),
  };
}

/** The point mass as the emitted steppers have it: the same operations in the same order. */
const pointMassAcceleration: Acceleration = (q, out) => {
  let r2 = q[0]! * q[0]!;
  for (let k = 1; k < q.length; k += 1) r2 += q[k]! * q[k]!;
  const w = -1 / (r2 * Math.sqrt(r2));
  for (let k = 0; k < q.length; k += 1) out[k] = q[k]! * w;
};
