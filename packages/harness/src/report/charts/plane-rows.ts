import type { PlaneCell, SurveyPlane } from "../evidence.ts";
import { limitWords } from "../text/words.ts";
import type { Row } from "./make-chart.ts";
import type { Tip } from "./series-layers.ts";

export const PLANE_TIPS: readonly Tip[] = [
  { field: "stepper", title: "stepper" },
  { field: "eccentricity", title: "eccentricity", format: ".4e" },
  { field: "steps", title: "steps per orbit", format: ".4e" },
  { field: "evaluationsPerOrbit", title: "force evaluations per orbit", format: ".4e" },
  { field: "ratio", title: "largest error over its limit", format: ".3e" },
  { field: "bindingLimit", title: "binding limit" },
  { field: "phase", title: "phase error of the short run, rad", format: ".3e" },
  { field: "ended", title: "ended" },
  { field: "command", title: "command" },
];

/** One table for all charts of the plane: the page then holds it once. */
export function planeRows(plane: SurveyPlane, symplectic: ReadonlyMap<string, boolean>): Row[] {
  return plane.cells.map((cell) => ({
    stepper: cell.stepper,
    symplectic: symplectic.get(cell.stepper) ?? false,
    eccentricity: cell.eccentricity,
    steps: cell.stepsPerOrbit,
    evaluationsPerOrbit: cell.evaluationsPerOrbit,
    ratio: cell.ratio,
    bindingLimit: cell.bindingLimit === null ? "" : limitWords(cell.bindingLimit),
    phase: cell.phase,
    ended: cell.ratio === null ? "diverged" : "completed",
    command: cell.command,
  }));
}

/**
 * Steps per orbit from which every finer cell of a row (one stepper, one eccentricity) holds the limits: between the last that breaks one and
 * the next, straight in logarithms, and that next one where the last left the orbit. Null where the finest cell breaks a limit; the coarsest
 * where all hold.
 */
export function stepsThatHold(cells: readonly PlaneCell[]): number | null {
  const row = cells.toSorted((a, b) => a.stepsPerOrbit - b.stepsPerOrbit);
  const lastBroken = row.findLastIndex(({ ratio }) => ratio === null || ratio > 1);
  const first = row[lastBroken + 1];
  if (first === undefined) return null;
  const broken = row[lastBroken];
  if (broken === undefined || broken.ratio === null || !((first.ratio ?? 0) > 0)) return first.stepsPerOrbit;
  const share = Math.log(broken.ratio) / Math.log(broken.ratio / (first.ratio as number));
  return broken.stepsPerOrbit * (first.stepsPerOrbit / broken.stepsPerOrbit) ** share;
}

/** The eccentricity of the grid that is nearest to one wanted. */
export function nearestEccentricity(plane: SurveyPlane, wanted: number): number {
  return plane.eccentricities.reduce((a, b) => (Math.abs(b - wanted) < Math.abs(a - wanted) ? b : a));
}
