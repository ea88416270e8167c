import { availableParallelism } from "node:os";
import { fileURLToPath } from "node:url";
import { Piscina } from "piscina";
import type { MeasureName, Score } from "../score/score.ts";
import { type CellJob, type CellTask, runCellTask } from "./cell-task.ts";

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

/** A task should take this many steps, give or take: long enough to hide the hand-over, short enough to keep all threads busy. */
const STEPS_PER_TASK = 400_000;

/** Runs cells on worker threads; scores come back in the order of the cells, the same bits for any number of threads. */
export class CellPool {
  private readonly pool: Piscina | null;
  private readonly ownFiles: readonly string[];
  private readonly onCells: (finished: number) => void;
  cellsRun = 0;
  stepsRun = 0;

  constructor(options: PoolOptions = {}) {
    const workers = options.workers ?? availableParallelism();
    this.ownFiles = options.ownFiles ?? [];
    this.onCells = options.onCells ?? (() => undefined);
    this.pool =
      workers > 1 ? new Piscina({ filename: workerFile(), minThreads: workers, maxThreads: workers }) : null;
  }

  async run(jobs: readonly CellJob[], plan: PoolPlan): Promise<Score[]> {
    const scores = new Array<Score>(jobs.length);
    await Promise.all(
      batches(jobs).map(async (indices) => {
        const task: CellTask = {
          cells: indices.map((i) => jobs[i] as CellJob),
          measures: plan.measures,
          summaries: plan.summaries,
          ownFiles: this.ownFiles,
        };
        const done: Score[] = this.pool === null ? await runCellTask(task) : await this.pool.run(task);
        indices.forEach((index, k) => {
          const score = done[k] as Score;
          scores[index] = score;
          this.stepsRun += score.steps;
        });
        this.cellsRun += indices.length;
        this.onCells(indices.length);
      }),
    );
    return scores;
  }

  async close(): Promise<void> {
    await this.pool?.close({ force: true });
  }
}

/** Groups of job indices of about equal work, the largest jobs first. */
function batches(jobs: readonly CellJob[]): number[][] {
  const order = jobs
    .map((_, i) => i)
    .sort((a, b) => expectedSteps(jobs[b]) - expectedSteps(jobs[a]) || a - b);
  const groups: number[][] = [];
  let group: number[] = [];
  let steps = 0;
  for (const index of order) {
    group.push(index);
    steps += expectedSteps(jobs[index]);
    if (steps >= STEPS_PER_TASK) {
      groups.push(group);
      group = [];
      steps = 0;
    }
  }
  if (group.length > 0) groups.push(group);
  return groups;
}

function expectedSteps(job: CellJob | undefined): number {
  if (job === undefined) return 0;
  const { orbits, step, stepsPerOrbit } = job.cell;
  // A variable-step run is not known beforehand; some hundred steps an orbit is usual.
  return orbits * (stepsPerOrbit ?? (step === undefined ? 300 : (2 * Math.PI) / step));
}

function workerFile(): string {
  const name = import.meta.url.endsWith(".ts") ? "./worker-dev.mjs" : "./worker.js";
  return fileURLToPath(new URL(name, import.meta.url));
}
