import { buildAdams } from "../build/adams.ts";
import { buildGaussJackson } from "../build/gauss-jackson.ts";
import type { BuildStep } from "../build/step-program.ts";
import type { Multistep } from "../methods/method.ts";
import { fixedStep, type ProgramStepper } from "../run/fixed-step.ts";
import { notGeometric, published } from "./claims.ts";

/** The Adams predictor-corrector. */
export function fromAdams(method: Multistep): ProgramStepper {
  return multistepStepper(method, (setting) => buildAdams(method, setting));
}

/** The second-sum method of Gauss and Jackson. */
export function fromGaussJackson(method: Multistep): ProgramStepper {
  return multistepStepper(method, (setting) => buildGaussJackson(method, setting));
}

function multistepStepper(method: Multistep, build: BuildStep): ProgramStepper {
  const claims = { ...published(method), ...notGeometric, family: "multistep" } as const;
  return fixedStep({ ...claims, stages: () => method.backValues, selfStarting: false }, build);
}
