import { runCellTask } from "./cell-task.ts";

export default runCellTask;
