import { buildNystrom, buildNystromPair } from "../build/nystrom.ts";
import { parseRow } from "../exact/coefficients.ts";
import type { EmbeddedNystrom, NystromTableau } from "../methods/method.ts";
import { nystromInterpolant } from "../run/dense.ts";
import { fixedStep, type ProgramStepper } from "../run/fixed-step.ts";
import { type PairStepper, variableStep } from "../run/variable-step.ts";
import { notGeometric, published, rounded } from "./claims.ts";

/** A fixed-step stepper from a Nystrom tableau. */
export function fromNystrom(method: NystromTableau): ProgramStepper {
  return fixedStep(
    { ...published(method), ...notGeometric, family: "runge-kutta-nystrom", stages: () => method.a.length },
    (setting) => buildNystrom(method, setting),
  );
}

/** The variable-step stepper of a Nystrom tableau that has an embedded formula. */
export function fromNystromPair(method: EmbeddedNystrom): PairStepper {
  const { embedded, dense } = method;
  return variableStep(
    {
      ...published(method),
      ...notGeometric,
      id: embedded.id,
      title: embedded.title,
      family: "runge-kutta-nystrom",
      embeddedOrder: embedded.order,
      stages: () => method.a.length,
    },
    (setting) => buildNystromPair(method, setting),
    dense === undefined
      ? null
      : () => ({
          order: dense.order,
          interpolate: nystromInterpolant(
            rounded(dense.position.map(parseRow)),
            rounded(dense.velocity.map(parseRow)),
          ),
          stages: null,
        }),
  );
}
