import type { Stepper } from "@perigauge/steppers";
import { InvalidInputError, mustBe } from "../errors.ts";
import type { Cell } from "../score/score.ts";
import { stepsBy } from "./orbit-times.ts";

const TWO_PI = 2 * Math.PI;
const MOST_STEPS = 2 ** 33;

/** A cell with its knob worked out: h and the number of steps, or a tolerance and an end. */
export interface ResolvedCell {
  readonly cell: Cell;
  readonly stepper: Stepper;
  /** Normalised step; null for a variable step. */
  readonly step: number | null;
  readonly stepsPerOrbit: number | null;
  /** Steps to make; null where the run ends at a time. */
  readonly steps: number | null;
}

/** @throws InvalidInputError for a cell that cannot be run: which field, its value and what it must be. */
export function resolveCell(cell: Cell, stepper: Stepper): ResolvedCell {
  if (!(cell.eccentricity >= 0 && cell.eccentricity < 1)) {
    throw mustBe("eccentricity", "in [0, 1)", cell.eccentricity);
  }
  if (!(cell.orbits > 0 && Number.isFinite(cell.orbits)))
    throw mustBe("orbits", "positive and finite", cell.orbits);
  if (!Number.isFinite(cell.startAnomalyDeg)) {
    throw mustBe("start", "periapsis, apoapsis or a number of degrees", cell.startAnomalyDeg);
  }
  if (stepper.knob === "tolerance") {
    if (cell.tolerance === undefined)
      throw new InvalidInputError(`${stepper.id}: takes a tolerance, not a step (--tolerance)`);
    if (!(cell.tolerance > 0 && cell.tolerance < 1)) throw mustBe("tolerance", "in (0, 1)", cell.tolerance);
    const fewest = (cell.orbits * TWO_PI) / (cell.maxStep ?? Number.POSITIVE_INFINITY);
    if (fewest > MOST_STEPS)
      throw mustBe("maxStep", `no shorter than a run of ${MOST_STEPS} steps`, cell.maxStep);
    return { cell, stepper, step: null, stepsPerOrbit: null, steps: null };
  }
  if (cell.maxStep !== undefined)
    throw new InvalidInputError(`${stepper.id}: takes a fixed step, so --max-step says nothing`);
  if (cell.step === undefined && cell.stepsPerOrbit === undefined) {
    throw new InvalidInputError(`${stepper.id}: takes a step, not a tolerance (--steps-per-orbit or --step)`);
  }
  if (cell.step !== undefined && !(cell.step > 0 && Number.isFinite(cell.step))) {
    throw mustBe("step", "positive and finite", cell.step);
  }
  if (cell.stepsPerOrbit !== undefined && !(cell.stepsPerOrbit > 0 && Number.isFinite(cell.stepsPerOrbit))) {
    throw mustBe("stepsPerOrbit", "positive and finite", cell.stepsPerOrbit);
  }
  const step = cell.step ?? TWO_PI / (cell.stepsPerOrbit as number);
  const stepsPerOrbit = cell.stepsPerOrbit ?? TWO_PI / step;
  const steps = stepsBy(cell.orbits, stepsPerOrbit);
  if (steps < 1) throw mustBe("orbits", `at least one step long (${1 / stepsPerOrbit} orbits)`, cell.orbits);
  if (steps > MOST_STEPS) throw mustBe("orbits", `at most ${MOST_STEPS} steps long`, cell.orbits);
  return { cell, stepper, step, stepsPerOrbit, steps };
}
