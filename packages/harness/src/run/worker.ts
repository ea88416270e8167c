import { runCellTask } from "./cell-task.ts";
import { runLongRunTask } from "./long-run-task.ts";

/** Called by name from the pool. */
export const longRun: typeof runLongRunTask = runLongRunTask;

export default runCellTask;
