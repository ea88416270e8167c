import type { Scenario } from "../scenario/scenario.ts";

/** Twelve true anomalies: symmetric starts alone understate the worst case, and worst starts lie at 30 to 50 degrees. */
export const TWELVE_STARTS: readonly number[] = [0, 30, 45, 60, 90, 135, 180, -135, -90, -60, -45, -30];
/**
 * Half of them suffice for a time-reversible stepper: a start mirrored in the line of apsides runs the same orbit backward. Over less than
 * three orbits the two cover different parts of it.
 */
const MIRRORED_ORBITS = 3;
const MIRROR_FREE: readonly number[] = [0, 15, 30, 45, 60, 90, 135, 180];
export const SCREENING_STARTS: readonly number[] = [0, 45, 90, 180, -45];

/** True anomalies, degrees, from which the scenario's runs start. */
export function startsOf(
  scenario: Scenario,
  timeReversible: boolean,
  shortestRunOrbits: number,
): readonly number[] {
  const start = scenario.start ?? "any";
  if (start === "any")
    return timeReversible && shortestRunOrbits >= MIRRORED_ORBITS ? MIRROR_FREE : TWELVE_STARTS;
  return [fixedStart(start)];
}

export function screeningStartsOf(scenario: Scenario): readonly number[] {
  const start = scenario.start ?? "any";
  return start === "any" ? SCREENING_STARTS : [fixedStart(start)];
}

function fixedStart(start: "periapsis" | "apoapsis" | number): number {
  if (start === "periapsis") return 0;
  return start === "apoapsis" ? 180 : start;
}
