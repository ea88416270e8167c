import { availableParallelism } from "node:os";
import { fileURLToPath } from "node:url";
import { Piscina } from "piscina";
import type { LongRun } from "../analyse/long-run.ts";
import { noteFallback } from "../lanes/fallback-note.ts";
import type { Cell, MeasureName, Score } from "../score/score.ts";
import { type CellJob, type CellTask, runCellTask } from "./cell-task.ts";
import { type LongRunTask, runLongRunTask } from "./long-run-task.ts";
import { taskIndices } from "./task-indices.ts";
import { outcomeOf, resultOf } from "./task-outcome.ts";

/** What of each run is to be measured, for all jobs of a call alike. */
export interface PoolPlan {
  readonly measures: readonly MeasureName[];
  readonly summaries: "maxima" | "all";
}

export interface PoolOptions {
  /** Threads; 1 runs everything in the calling thread. Default: one per core. */
  readonly workers?: number;
  readonly ownFiles?: readonly string[];
  /** Called as cells finish, with how many. */
  readonly onCells?: (finished: number) => void;
}

/** Runs cells on worker threads; scores come back in the order of the cells, the same bits for any number of threads. */
export class CellPool {
  private readonly pool: Piscina | null;
  private readonly workers: number;
  private readonly ownFiles: readonly string[];
  private readonly onCells: (finished: number) => void;
  cellsRun = 0;
  stepsRun = 0;
  evaluationsRun = 0;

  constructor(options: PoolOptions = {}) {
    const workers = options.workers ?? availableParallelism();
    this.workers = workers;
    noteFallback();
    this.ownFiles = options.ownFiles ?? [];
    this.onCells = options.onCells ?? (() => undefined);
    this.pool =
      workers > 1 ? new Piscina({ filename: workerFile(), minThreads: workers, maxThreads: workers }) : null;
  }

  async run(jobs: readonly CellJob[], plan: PoolPlan): Promise<Score[]> {
    const scores = new Array<Score>(jobs.length);
    await Promise.all(
      taskIndices(jobs, this.workers).map(async (indices) => {
        const task: CellTask = {
          cells: indices.map((i) => jobs[i] as CellJob),
          measures: plan.measures,
          summaries: plan.summaries,
          ownFiles: this.ownFiles,
        };
        const done = resultOf<Score[]>(await (this.pool?.run(task) ?? outcomeOf(() => runCellTask(task))));
        indices.forEach((index, k) => {
          const score = done[k] as Score;
          scores[index] = score;
          this.stepsRun += score.steps;
          this.evaluationsRun += score.evaluations;
        });
        this.cellsRun += indices.length;
        this.onCells(indices.length);
      }),
    );
    return scores;
  }

  /** Long runs, one to a thread; results in the order of the cells. */
  async longRuns(cells: readonly Cell[]): Promise<LongRun[]> {
    return Promise.all(
      cells.map(async (cell) => {
        const task: LongRunTask = { cell, ownFiles: this.ownFiles };
        const run = resultOf<LongRun>(
          await (this.pool?.run(task, { name: "longRun" }) ?? outcomeOf(() => runLongRunTask(task))),
        );
        this.stepsRun += run.score.steps;
        this.cellsRun += 1;
        this.onCells(1);
        return run;
      }),
    );
  }

  async close(): Promise<void> {
    await this.pool?.close({ force: true });
  }
}

function workerFile(): string {
  const name = import.meta.url.endsWith(".ts") ? "./worker-dev.mjs" : "./worker.js";
  return fileURLToPath(new URL(name, import.meta.url));
}
