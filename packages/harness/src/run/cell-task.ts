import { findStepper, type Stepper } from "@perigauge/steppers";
import type { Cell, MeasureName, Score } from "../score/score.ts";
import { loadOwnSteppers } from "./own-steppers.ts";
import { runCell } from "./run-cell.ts";

/** Cells that a worker runs in one go; plain data, so that it crosses threads. */
export interface CellTask {
  readonly cells: readonly CellJob[];
  readonly measures: readonly MeasureName[];
  readonly summaries: "maxima" | "all";
  /** Modules that export steppers of one's own, as absolute paths. */
  readonly ownFiles: readonly string[];
}

export interface CellJob {
  readonly cell: Cell;
  readonly horizons: readonly number[];
}

/** Runs the cells in order. The same task gives the same scores in any thread. */
export async function runCellTask(task: CellTask): Promise<Score[]> {
  const own = await loadOwnSteppers(task.ownFiles);
  const measures = new Set(task.measures);
  return task.cells.map(({ cell, horizons }) => {
    const stepper = own.find(({ id }) => id === cell.stepper) ?? findStepper(cell.stepper);
    return runCell(cell, stepper as Stepper, { measures, summaries: task.summaries, horizons });
  });
}
