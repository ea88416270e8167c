import { findStepper, type Stepper } from "@perigauge/steppers";
import { runInLanes } from "../lanes/run-in-lanes.ts";
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

/** Runs the cells; scores in their order. The same task gives the same scores in any thread, and however cells are put into tasks. */
export async function runCellTask(task: CellTask): Promise<Score[]> {
  const own = await loadOwnSteppers(task.ownFiles);
  const measures = new Set(task.measures);
  const stepperOf = ({ cell }: CellJob): Stepper =>
    (own.find(({ id }) => id === cell.stepper) ?? findStepper(cell.stepper)) as Stepper;
  const scores = new Array<Score>(task.cells.length);
  const left =
    task.summaries === "maxima" ? runInLanes(task.cells, stepperOf, measures, scores) : task.cells.keys();
  for (const index of left) {
    const job = task.cells[index] as CellJob;
    const { cell, horizons } = job;
    scores[index] = runCell(cell, stepperOf(job), { measures, summaries: task.summaries, horizons });
  }
  return scores;
}
