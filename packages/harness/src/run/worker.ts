import { runCellTask } from "./cell-task.ts";
import { runLongRunTask } from "./long-run-task.ts";
import { type Outcome, outcomeOf } from "./task-outcome.ts";

/** Called by name from the pool. */
export async function longRun(
  task: Parameters<typeof runLongRunTask>[0],
): Promise<Outcome<Awaited<ReturnType<typeof runLongRunTask>>>> {
  return outcomeOf(() => runLongRunTask(task));
}

export default async function cells(
  task: Parameters<typeof runCellTask>[0],
): Promise<Outcome<Awaited<ReturnType<typeof runCellTask>>>> {
  return outcomeOf(() => runCellTask(task));
}
