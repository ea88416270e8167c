import { buildLogarithmicLeapfrog } from "../build/logarithmic-leapfrog.ts";
import { liveStages } from "../build/runge-kutta.ts";
import { buildSundman } from "../build/sundman.ts";
import { parseRow } from "../exact/coefficients.ts";
import type { Published, Sundman } from "../methods/method.ts";
import { fixedStep, type ProgramStepper } from "../run/fixed-step.ts";
import { notGeometric, published } from "./claims.ts";

export function fromLogarithmicLeapfrog(method: Published): ProgramStepper {
  const claims = { ...published(method), family: "time-transformed", explicit: true, uneven: true } as const;
  return fixedStep(
    { ...claims, symplectic: true, timeReversible: true, stages: () => 1 },
    buildLogarithmicLeapfrog,
  );
}

/** A Runge-Kutta method with steps proportional to the distance. */
export function fromSundman(method: Sundman): ProgramStepper {
  const { a, b } = method.tableau;
  const claims = { ...published(method), ...notGeometric, family: "time-transformed", uneven: true } as const;
  return fixedStep(
    { ...claims, stages: () => liveStages(a.map(parseRow), parseRow(b)).filter(Boolean).length },
    (setting) => buildSundman(method.tableau, setting),
  );
}
