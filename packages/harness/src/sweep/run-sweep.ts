import type { Stepper } from "@perigauge/steppers";
import type { CellPool } from "../run/cell-pool.ts";
import { MEASURES, type Score } from "../score/score.ts";
import { gridCells, type Shard, shardOf } from "./grid.ts";
import type { Study } from "./study.ts";

export interface SweepResult {
  readonly format: "perigauge-sweep/1";
  readonly study: Study;
  /** Null where the whole grid was run. */
  readonly shard: Shard | null;
  /** Cells of the whole grid. */
  readonly cells: number;
  readonly scores: readonly Score[];
}

/** Runs the grid of a study, or one shard of it; the same scores in the same order for any number of threads. */
export async function runSweep(
  study: Study,
  steppers: readonly Stepper[],
  pool: CellPool,
  shard: Shard | null = null,
): Promise<SweepResult> {
  const grid = gridCells(study, steppers);
  const cells = shard === null ? grid : shardOf(grid, shard);
  const jobs = cells.map((cell) => ({ cell, horizons: [] }));
  const scores = await pool.run(jobs, { measures: MEASURES, summaries: "all" });
  return { format: "perigauge-sweep/1", study, shard, cells: grid.length, scores };
}
