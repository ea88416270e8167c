import { findStepper, type Stepper } from "@perigauge/steppers";
import {
  type Cell,
  FULL_PLAN,
  type LongRun,
  longRun,
  runCell,
  type Score,
  type ScoringPlan,
} from "perigauge";

/** A cell with the usual defaults: from periapsis, plain summation. */
export type CellFields = Partial<Cell> & Pick<Cell, "stepper" | "eccentricity" | "orbits">;

export function stepper(id: string): Stepper {
  const found = findStepper(id);
  if (found === undefined) throw new Error(`no stepper ${id}`);
  return found;
}

const cellOf = (fields: CellFields): Cell => ({ startAnomalyDeg: 0, summation: "plain", ...fields });

export function score(fields: CellFields, plan: ScoringPlan = FULL_PLAN): Score {
  return runCell(cellOf(fields), stepper(fields.stepper), plan);
}

export function behaviour(fields: CellFields): LongRun {
  return longRun(cellOf(fields), stepper(fields.stepper));
}

/** Exponent q of a quantity that goes as h^q, from its values at h and at h/2. */
export const exponentInStep = (coarse: number, fine: number): number => Math.log2(Math.abs(coarse / fine));
