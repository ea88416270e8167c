import type { StepperInfo } from "@perigauge/steppers";
import type { Requirements } from "../scenario/scenario.ts";
import type { ExcludedStepper } from "./choice.ts";

const PROPERTIES: readonly {
  readonly requirement: Exclude<keyof Requirements, "evaluationsPerOrbit">;
  readonly holds: (stepper: StepperInfo) => boolean;
  readonly reason: string;
}[] = [
  {
    requirement: "fixedStep",
    holds: (s) => s.knob === "step" && !s.uneven,
    reason: "does not take a fixed step",
  },
  { requirement: "symplectic", holds: (s) => s.symplectic, reason: "is not symplectic" },
  { requirement: "timeReversible", holds: (s) => s.timeReversible, reason: "is not time-reversible" },
  { requirement: "explicit", holds: (s) => s.explicit, reason: "is not explicit" },
  { requirement: "selfStarting", holds: (s) => s.selfStarting, reason: "does not start itself" },
  { requirement: "denseOutput", holds: (s) => s.denseOutput, reason: "has no dense output" },
];

/** The first property required that the stepper lacks, or null. */
export function unmetRequirement(
  stepper: StepperInfo,
  required: Requirements | undefined,
): ExcludedStepper | null {
  const unmet = PROPERTIES.find(
    ({ requirement, holds }) => required?.[requirement] === true && !holds(stepper),
  );
  if (unmet === undefined) return null;
  return {
    stepper: stepper.id,
    reason: `${unmet.reason}, and ${unmet.requirement} is required`,
    limit: unmet.requirement,
    value: null,
    allowed: null,
  };
}
