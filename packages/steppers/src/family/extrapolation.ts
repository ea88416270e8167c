import { buildExtrapolation, buildExtrapolationPair } from "../build/extrapolation.ts";
import { parseRow } from "../exact/coefficients.ts";
import type { Extrapolation } from "../methods/method.ts";
import { fixedStep, type ProgramStepper } from "../run/fixed-step.ts";
import { type PairStepper, variableStep } from "../run/variable-step.ts";
import { notGeometric, published } from "./claims.ts";

/** Extrapolation with a fixed number of columns: of fixed step, and of variable step with the last two columns compared. */
export function fromExtrapolation(method: Extrapolation): readonly [ProgramStepper, PairStepper] {
  const claims = { ...published(method), ...notGeometric, family: "extrapolation" } as const;
  const stages = (): number => parseRow(method.sequence).length;
  return [
    fixedStep({ ...claims, stages }, (setting) => buildExtrapolation(method, setting)),
    variableStep(
      { ...claims, ...method.variable, embeddedOrder: method.order - 2, stages },
      (setting) => buildExtrapolationPair(method, setting),
      null,
    ),
  ];
}
