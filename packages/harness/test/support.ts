import { findStepper, type Stepper } from "@perigauge/steppers";
import { runCell } from "../src/run/run-cell.ts";
import { FULL_PLAN, type ScoringPlan } from "../src/score/run-scorer.ts";
import type { Cell, Score } from "../src/score/score.ts";

/** A stepper of the catalogue that the test cannot do without. */
export function stepper(id: string): Stepper {
  const found = findStepper(id);
  if (found === undefined) throw new Error(`no stepper ${id}`);
  return found;
}

/** A cell with the usual defaults: ten orbits from periapsis, plain summation. */
export function cell(fields: Partial<Cell> & Pick<Cell, "stepper" | "eccentricity">): Cell {
  return { orbits: 10, startAnomalyDeg: 0, summation: "plain", ...fields };
}

export function score(
  fields: Partial<Cell> & Pick<Cell, "stepper" | "eccentricity">,
  plan: ScoringPlan = FULL_PLAN,
): Score {
  return runCell(cell(fields), stepper(fields.stepper), plan);
}
