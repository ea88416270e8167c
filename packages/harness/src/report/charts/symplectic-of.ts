import type { ChoiceEvidence } from "../evidence.ts";

/** Which steppers of the survey are symplectic. */
export function symplecticOf({ survey }: ChoiceEvidence): ReadonlyMap<string, boolean> {
  return new Map(
    [...survey.againstStep, ...survey.againstEccentricity].map(({ stepper, symplectic }) => [
      stepper,
      symplectic,
    ]),
  );
}
