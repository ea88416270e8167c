import { availableParallelism } from "node:os";
import { Command } from "commander";
import type { LongRun } from "../analyse/long-run.ts";
import { prepareFolder, writeResultFolder } from "../output/result-folder.ts";
import { CellPool } from "../run/cell-pool.ts";
import { loadOwnSteppers } from "../run/own-steppers.ts";
import type { GrowthJudgement } from "../score/growth.ts";
import type { Summation } from "../score/score.ts";
import { gridCells } from "../sweep/grid.ts";
import { plain, scientific } from "../text/numbers.ts";
import { judgeLimits } from "./broken-limits.ts";
import { gridOptions, requireOption, requireSteppers } from "./grid-options.ts";
import { options, type ScoreLimit } from "./options.ts";
import { startProgress } from "./progress.ts";
import type { Outcome } from "./run-command-line.ts";
import { table } from "./table.ts";

interface LongRunOptions {
  readonly stepper?: readonly string[];
  readonly own: readonly string[];
  readonly eccentricity?: readonly number[];
  readonly stepsPerOrbit?: readonly number[];
  readonly tolerance?: readonly number[];
  readonly orbits: number;
  readonly start: number;
  readonly summation: Summation;
  readonly limit: readonly ScoreLimit[];
  readonly out?: string;
  readonly json?: true;
  readonly workers?: number;
  readonly quiet?: true;
}

const ORBITS = 10_000;

/** `long-run`: what happens to energy, phase and apsis over many orbits. */
export function longRunVerb(outcome: Outcome): Command {
  return new Command("long-run")
    .description("behaviour over many orbits: energy trend, growth laws, apsidal precession")
    .addOption(gridOptions.steppers())
    .addOption(options.own())
    .addOption(gridOptions.eccentricities())
    .addOption(gridOptions.stepsPerOrbit())
    .addOption(gridOptions.tolerances())
    .addOption(gridOptions.orbits(ORBITS))
    .addOption(options.start())
    .addOption(options.summation())
    .addOption(options.limit())
    .addOption(gridOptions.out())
    .addOption(options.json())
    .addOption(options.workers())
    .addOption(options.quiet())
    .action(async (given: LongRunOptions) => {
      const own = await loadOwnSteppers(given.own);
      const steppers = requireSteppers(given.stepper, own);
      const cells = gridCells(
        {
          format: "perigauge-study/1",
          steppers: steppers.map(({ id }) => id),
          eccentricities: requireOption("--eccentricity", given.eccentricity),
          stepsPerOrbit: given.stepsPerOrbit,
          tolerances: given.tolerance,
          orbits: given.orbits,
          starts: [given.start],
          summations: [given.summation],
        },
        steppers,
      );
      if (given.out !== undefined) await prepareFolder(given.out);
      const progress = startProgress(given.quiet === true);
      const pool = new CellPool({
        ownFiles: given.own,
        onCells: progress.cells,
        workers: Math.min(cells.length, given.workers ?? availableParallelism()),
      });
      let runs: LongRun[];
      try {
        progress.phase("long runs", `${given.orbits} orbits`);
        runs = await pool.longRuns(cells);
      } finally {
        progress.stop();
        await pool.close();
      }
      const result = { format: "perigauge-long-run/1", runs };
      const scores = runs.map(({ score }) => score);
      if (given.out !== undefined) await writeResultFolder(given.out, result, scores);
      process.stdout.write(given.json ? `${JSON.stringify(result, null, 2)}\n` : describe(runs, given.out));
      judgeLimits(scores, given.limit, outcome);
    });
}

function describe(runs: readonly LongRun[], folder: string | undefined): string {
  const rows = runs.map((run) => [
    run.stepper,
    String(run.eccentricity),
    run.stepsPerOrbit === null ? `tol ${scientific(run.tolerance)}` : plain(run.stepsPerOrbit, 8),
    run.energyTrend === null ? "-" : `${run.energyTrend}${run.atFloor ? " (at floor)" : ""}`,
    scientific(run.score.energy.max),
    exponent(run.growth.energy),
    scientific(run.score.phase.final),
    exponent(run.growth.phase),
    run.apsisPerOrbit === null
      ? "-"
      : `${scientific(run.apsisPerOrbit.value)} ± ${scientific(run.apsisPerOrbit.standardError)} (${run.apsisPerOrbit.points})`,
  ]);
  const head = ["stepper", "e", "steps/orbit", "energy trend", "energy max", "energy growth"];
  const lines = [
    `${runs[0]?.orbits ?? 0} orbits; exponents of time with standard error and number of orbits fitted`,
    "",
    table([...head, "phase final rad", "phase growth", "apsis per orbit rad"], rows),
    "",
    ...runs.flatMap((run) =>
      remarksOn(run).map((remark) => `${run.stepper}, e = ${run.eccentricity}: ${remark}`),
    ),
  ];
  if (folder !== undefined) lines.push(`Written to ${folder}`);
  return `${lines.join("\n").trimEnd()}\n`;
}

function exponent({ growthExponent, growthStandardError, points }: GrowthJudgement): string {
  if (growthExponent === null || growthStandardError === null) return "-";
  return `${growthExponent.toFixed(2).replace("-0.00", "0.00")} ± ${growthStandardError.toFixed(2)} (${points})`;
}

function remarksOn({ growth, energyTrendNote, notes }: LongRun): string[] {
  const whyNot = (["energy", "phase"] as const).flatMap((name) =>
    growth[name].reason === null ? [] : [`no growth exponent of ${name}: ${growth[name].reason}`],
  );
  return [...(energyTrendNote === null ? [] : [`no energy trend: ${energyTrendNote}`]), ...whyNot, ...notes];
}
