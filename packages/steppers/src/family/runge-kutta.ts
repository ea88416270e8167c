import { denseRows } from "../build/dense-rows.ts";
import { buildDenseStages } from "../build/dense-stages.ts";
import { buildRungeKutta, buildRungeKuttaPair, liveStages } from "../build/runge-kutta.ts";
import { parseRow } from "../exact/coefficients.ts";
import type { EmbeddedTableau, Tableau } from "../methods/method.ts";
import { type Dense, rungeKuttaInterpolant } from "../run/dense.ts";
import { fixedStep, type ProgramStepper } from "../run/fixed-step.ts";
import { type PairStepper, variableStep } from "../run/variable-step.ts";
import { notGeometric, published, rounded } from "./claims.ts";

/** A fixed-step stepper from an explicit Runge-Kutta tableau. */
export function fromTableau(method: Tableau): ProgramStepper {
  return fixedStep(
    {
      ...published(method),
      ...notGeometric,
      family: "runge-kutta",
      stages: () => liveStages(method.a.map(parseRow), parseRow(method.b)).filter(Boolean).length,
    },
    (setting) => buildRungeKutta(method, setting),
  );
}

/** The variable-step stepper of a tableau that has an embedded formula. */
export function fromPair(method: EmbeddedTableau): PairStepper {
  const { embedded, dense } = method;
  const swapped = embedded.advances === true;
  return variableStep(
    {
      ...published(method),
      ...notGeometric,
      id: embedded.id,
      title: embedded.title,
      family: "runge-kutta",
      order: swapped ? embedded.order : method.order,
      embeddedOrder: swapped ? method.order : embedded.order,
      stages: () => method.a.length,
    },
    (setting) => buildRungeKuttaPair(method, setting),
    dense === undefined ? null : () => rungeKuttaDense(dense, method),
  );
}

function rungeKuttaDense(dense: NonNullable<Tableau["dense"]>, method: Tableau): Dense {
  return {
    order: dense.order,
    interpolate: rungeKuttaInterpolant(rounded(denseRows(dense, parseRow(method.b)))),
    stages: "rows" in dense ? null : (setting) => buildDenseStages(dense, method.a.length, setting),
  };
}
