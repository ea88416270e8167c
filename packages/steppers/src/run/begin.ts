import { invalid } from "../errors.ts";
import type { Dimension } from "../program/program.ts";
import type { Start } from "../stepper.ts";

/** The dimension of a start's state. @throws InvalidInputError where its length is neither 4 nor 6. */
export function dimensionOf(start: Start): Dimension {
  const { length } = start.state;
  if (length !== 4 && length !== 6) throw invalid.stateLength(length);
  return length === 4 ? 2 : 3;
}

/** The fixed step of a start; negative runs backward. @throws InvalidInputError where it is zero or not finite. */
export function stepOf(start: Start): number {
  if (!Number.isFinite(start.step) || start.step === 0) throw invalid.step(start.step);
  return start.step;
}

/** @throws InvalidInputError where a call of `advance` does not leave room for its steps. */
export function checkAdvance(
  maxSteps: number,
  width: number,
  rows: Float64Array,
  uneven: boolean,
  times: Float64Array | undefined,
): void {
  if (!Number.isInteger(maxSteps) || maxSteps < 0) throw invalid.maxSteps(maxSteps);
  if (rows.length < width * maxSteps) throw invalid.rowsLength(width * maxSteps, rows.length);
  if (uneven && !(times !== undefined && times.length >= 2 * maxSteps)) {
    throw invalid.timesLength(2 * maxSteps, times?.length);
  }
}
