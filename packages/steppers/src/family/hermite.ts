import { buildHermite } from "../build/hermite.ts";
import type { Published } from "../methods/method.ts";
import { fixedStep, type ProgramStepper } from "../run/fixed-step.ts";
import { notGeometric, published } from "./claims.ts";

export function fromHermite(method: Published): ProgramStepper {
  const claims = { ...published(method), ...notGeometric, family: "hermite", needsJerk: true } as const;
  return fixedStep({ ...claims, stages: () => 1 }, buildHermite);
}
