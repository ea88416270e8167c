import type { RankedStepper } from "../choice.ts";
import type { FleetPoint } from "../fleet.ts";

/** Normalised step at a point: from seconds where there are any, else (uneven steps) from steps per shortest orbit; 0 for a tolerance. */
export function stepOf(
  { stepSeconds, stepsPerOrbit }: Pick<RankedStepper, "stepSeconds" | "stepsPerOrbit">,
  shortestPeriodSeconds: number,
  { meanMotion }: FleetPoint,
): number {
  if (stepSeconds !== null) return stepSeconds * meanMotion;
  return stepsPerOrbit === null ? 0 : (shortestPeriodSeconds / stepsPerOrbit) * meanMotion;
}
