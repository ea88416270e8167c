import { findStepper, type Stepper } from "@perigauge/steppers";
import { type LongRun, longRun } from "../analyse/long-run.ts";
import type { Cell } from "../score/score.ts";
import { loadOwnSteppers } from "./own-steppers.ts";

/** A long run for a worker: plain data, so that it crosses threads. */
export interface LongRunTask {
  readonly cell: Cell;
  readonly ownFiles: readonly string[];
}

/** The same task gives the same result in any thread. */
export async function runLongRunTask({ cell, ownFiles }: LongRunTask): Promise<LongRun> {
  const own = await loadOwnSteppers(ownFiles);
  const stepper = own.find(({ id }) => id === cell.stepper) ?? findStepper(cell.stepper);
  return longRun(cell, stepper as Stepper);
}
