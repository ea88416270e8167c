import type { Stepper } from "@perigauge/steppers";
import { Command } from "commander";
import { InvalidInputError } from "../errors.ts";
import { prepareFolder, writeResultFolder } from "../output/result-folder.ts";
import { CellPool } from "../run/cell-pool.ts";
import { requireStepper } from "../run/find-stepper.ts";
import { loadOwnSteppers } from "../run/own-steppers.ts";
import type { Score, Summation } from "../score/score.ts";
import type { Shard } from "../sweep/grid.ts";
import { readStudy } from "../sweep/parse-study.ts";
import { runSweep, type SweepResult } from "../sweep/run-sweep.ts";
import type { Study } from "../sweep/study.ts";
import { plain, scientific } from "../text/numbers.ts";
import { judgeLimits } from "./broken-limits.ts";
import { gridOptions, requireOption, requireSteppers } from "./grid-options.ts";
import { options, type ScoreLimit } from "./options.ts";
import { startProgress } from "./progress.ts";
import type { Outcome } from "./run-command-line.ts";
import { table } from "./table.ts";

interface SweepOptions {
  readonly stepper?: readonly string[];
  readonly own: readonly string[];
  readonly eccentricity?: readonly number[];
  readonly stepsPerOrbit?: readonly number[];
  readonly tolerance?: readonly number[];
  readonly orbits: number;
  readonly start: readonly number[];
  readonly summation: readonly Summation[];
  readonly shard?: Shard;
  readonly limit: readonly ScoreLimit[];
  readonly out?: string;
  readonly json?: true;
  readonly workers?: number;
  readonly quiet?: true;
}

/** `sweep`: a grid of cells, from options or from a study file. */
export function sweepVerb(outcome: Outcome): Command {
  return new Command("sweep")
    .description("score a grid of cells: steppers, eccentricities, steps or tolerances, starts, summations")
    .argument("[study]", "study file (JSON) instead of the grid's options")
    .addOption(gridOptions.steppers())
    .addOption(options.own())
    .addOption(gridOptions.eccentricities())
    .addOption(gridOptions.stepsPerOrbit())
    .addOption(gridOptions.tolerances())
    .addOption(gridOptions.orbits(10))
    .addOption(gridOptions.starts())
    .addOption(gridOptions.summations())
    .addOption(gridOptions.shard())
    .addOption(options.limit())
    .addOption(gridOptions.out())
    .addOption(options.json())
    .addOption(options.workers())
    .addOption(options.quiet())
    .action(async (file: string | undefined, given: SweepOptions, command: Command) => {
      const own = await loadOwnSteppers(given.own);
      const { study, steppers } =
        file === undefined ? fromOptions(given, own) : await fromFile(file, own, command);
      if (given.out !== undefined) await prepareFolder(given.out);
      const progress = startProgress(given.quiet === true);
      const pool = new CellPool({
        ownFiles: given.own,
        onCells: progress.cells,
        ...(given.workers === undefined ? {} : { workers: given.workers }),
      });
      let result: SweepResult;
      try {
        progress.phase("sweep", "");
        result = await runSweep(study, steppers, pool, given.shard ?? null);
      } finally {
        progress.stop();
        await pool.close();
      }
      if (given.out !== undefined) {
        const { scores, ...rest } = result;
        await writeResultFolder(given.out, { ...rest, scores }, scores);
      }
      process.stdout.write(given.json ? `${JSON.stringify(result, null, 2)}\n` : describe(result, given.out));
      judgeLimits(result.scores, given.limit, outcome);
    });
}

interface Grid {
  readonly study: Study;
  readonly steppers: readonly Stepper[];
}

function fromOptions(given: SweepOptions, own: readonly Stepper[]): Grid {
  const steppers = requireSteppers(given.stepper, own);
  const study: Study = {
    format: "perigauge-study/1",
    steppers: steppers.map(({ id }) => id),
    eccentricities: requireOption("--eccentricity", given.eccentricity),
    ...(given.stepsPerOrbit === undefined ? {} : { stepsPerOrbit: given.stepsPerOrbit }),
    ...(given.tolerance === undefined ? {} : { tolerances: given.tolerance }),
    orbits: given.orbits,
    starts: given.start,
    summations: given.summation,
  };
  return { study, steppers };
}

/** Options that a study file takes the place of. */
const OF_THE_GRID = [
  "stepper",
  "eccentricity",
  "stepsPerOrbit",
  "tolerance",
  "orbits",
  "start",
  "summation",
] as const;

async function fromFile(file: string, own: readonly Stepper[], command: Command): Promise<Grid> {
  for (const name of OF_THE_GRID) {
    if (command.getOptionValueSource(name) === "cli") {
      const flag = command.options.find((option) => option.attributeName() === name)?.long ?? name;
      throw new InvalidInputError(`${flag}: is given by the study file`);
    }
  }
  const study = await readStudy(file);
  const steppers = study.steppers.map((id, i) => requireStepper(`study.steppers[${i}]`, id, own));
  return { study, steppers };
}

function describe(result: SweepResult, folder: string | undefined): string {
  const { scores, cells, shard } = result;
  const rows = scores.map((score) => [
    score.stepper,
    String(score.eccentricity),
    score.stepsPerOrbit === null ? `tol ${scientific(score.tolerance)}` : String(score.stepsPerOrbit),
    String(score.startAnomalyDeg),
    score.summation,
    plain(score.evaluationsPerOrbit),
    ...(["energy", "phase", "position", "timing"] as const).map((name) => scientific(score[name].max)),
    endOf(score),
  ]);
  const head = ["stepper", "e", "steps/orbit", "start deg", "summation", "eval/orbit"];
  const lines = [
    table([...head, "energy", "phase rad", "position", "timing", "ended"], rows),
    "",
    `${scores.length} cells${shard === null ? "" : ` of ${cells} (shard ${shard.index}/${shard.of})`}; largest errors over each run.`,
  ];
  if (folder !== undefined) lines.push(`Written to ${folder}`);
  return `${lines.join("\n")}\n`;
}

function endOf({ ended }: Score): string {
  return ended.status === "completed" ? "completed" : `${ended.reason} at ${ended.atOrbit.toPrecision(4)}`;
}
