import type { Score } from "../score/score.ts";

/** What an order is fitted to: largest errors of a run, or errors at the end of its whole orbits. */
export const ORDER_MEASURES = [
  "energy",
  "energyAtWholeOrbits",
  "phase",
  "position",
  "period",
  "timing",
  "apsis",
] as const;
export type OrderMeasure = (typeof ORDER_MEASURES)[number];

/** In the words of a table. */
export const ORDER_MEASURE_TITLES: Readonly<Record<OrderMeasure, string>> = {
  energy: "energy, largest",
  energyAtWholeOrbits: "energy, at whole orbits",
  phase: "phase, largest",
  position: "position, largest",
  period: "period, largest",
  timing: "timing, largest",
  apsis: "apsis, at whole orbits",
};

/**
 * Size of the error, from the score of the run over whole orbits and, for passages, from that of a longer run (a late body
 * would miss the last passage otherwise). Null where the run gave none.
 */
export function errorOf(measure: OrderMeasure, run: Score, passages: Score): number | null {
  const value = ((): number | null => {
    switch (measure) {
      case "energyAtWholeOrbits":
        return endsWithAnOrbit(run) ? run.energy.final : null;
      case "apsis":
        return endsWithAnOrbit(run) ? run.apsis.final : null;
      case "period":
      case "timing":
        return passages[measure].max;
      default:
        return run[measure].max;
    }
  })();
  const source = measure === "period" || measure === "timing" ? passages : run;
  const guessed = measure === "phase" && source.phaseUncertain;
  return value === null || guessed || source.ended.status === "diverged" ? null : Math.abs(value);
}

/** A fixed step that does not divide the orbit ends short of it, and what would be seen there is where. */
function endsWithAnOrbit({ stepsPerOrbit, orbits }: Score): boolean {
  return stepsPerOrbit === null || Number.isInteger(stepsPerOrbit * orbits);
}

/** Unit roundoff of IEEE doubles. */
const UNIT = 2 ** -53;

/**
 * Rounding floor of a measure after so many orbits, from the random walk of rounding (Brouwer, Astron. J. 46, 149, 1937): energy
 * 1.5e-16 sqrt(evaluations), mean longitude 2 u t sqrt(steps), each with the rounding of one evaluation of the measure itself added; angles
 * and distances grow by the largest rate of the orbit. An estimate, good to a factor of a few: what lies within twenty times of it is not fitted.
 */
export function roundingFloor(
  measure: OrderMeasure,
  eccentricity: number,
  orbits: number,
  steps: number,
  evaluations: number,
): number {
  const e = eccentricity;
  const energy = 1.5e-16 * Math.sqrt(evaluations) + (4 * UNIT * (3 + e)) / (1 - e);
  const longitude = 2 * UNIT * 2 * Math.PI * orbits * Math.sqrt(steps);
  switch (measure) {
    case "energy":
    case "energyAtWholeOrbits":
      return energy;
    case "apsis":
      return energy / Math.max(e, UNIT);
    case "phase":
      return longitude * periapsisRate(e) + 4 * UNIT;
    case "position":
      return longitude * Math.sqrt((1 + e) / (1 - e)) + 2 * UNIT;
    default:
      return longitude / (2 * Math.PI) + 4 * UNIT * orbits;
  }
}

/** Angular rate at periapsis over the mean motion. */
export function periapsisRate(eccentricity: number): number {
  return Math.sqrt((1 + eccentricity) / (1 - eccentricity) ** 3);
}
