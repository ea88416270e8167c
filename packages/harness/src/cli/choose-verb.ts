import { fileURLToPath } from "node:url";
import { catalogue, type Stepper } from "@perigauge/steppers";
import { Command, Option } from "commander";
import { type ChoiceRun, chooseStepper } from "../choose/choose-stepper.ts";
import { gatherEvidence } from "../choose/gather-evidence.ts";
import { InvalidInputError } from "../errors.ts";
import { writeChoiceFolder } from "../output/choice-folder.ts";
import { prepareFolder } from "../output/result-folder.ts";
import { CellPool } from "../run/cell-pool.ts";
import { requireStepper } from "../run/find-stepper.ts";
import { loadOwnSteppers } from "../run/own-steppers.ts";
import { readScenario } from "../scenario/parse-scenario.ts";
import type { Scenario } from "../scenario/scenario.ts";
import { version } from "../version.ts";
import { describeChoice } from "./describe-choice.ts";
import { options, positive, wholePositive } from "./options.ts";
import { startProgress } from "./progress.ts";
import { EXIT, type Outcome } from "./run-command-line.ts";

interface ChooseOptions {
  readonly own: readonly string[];
  readonly out?: string;
  readonly json?: true;
  readonly workers?: number;
  readonly seed: number;
  readonly minutes: number;
  readonly quiet?: true;
}

/** The scenario that ships with the project. */
const DEMO = fileURLToPath(new URL("../../scenarios/survey-satellites.json", import.meta.url));

/** `choose`: the main job. */
export function chooseVerb(outcome: Outcome): Command {
  return new Command("choose")
    .description(
      "ranked, verified recommendation of integrator and step for a scenario; without one, the demo",
    )
    .argument("[scenario]", "scenario file (JSON); default: the demo scenario")
    .addOption(options.own())
    .addOption(new Option("--out <dir>", "write the result and its report into this folder"))
    .addOption(options.json())
    .addOption(options.workers())
    .addOption(new Option("--seed <n>", "seed of the random checks").argParser(wholePositive).default(1))
    .addOption(
      new Option(
        "--minutes <m>",
        "work to spend, in minutes of two nominal cores; what does not fit is extrapolated",
      )
        .argParser(positive)
        .default(2),
    )
    .addOption(options.quiet())
    .action(async (file: string | undefined, given: ChooseOptions) => {
      const scenario = await readScenario(file ?? DEMO);
      const own = await loadOwnSteppers(given.own);
      const steppers = candidates(scenario, own);
      if (given.out !== undefined) await prepareFolder(given.out);
      const progress = startProgress(given.quiet === true);
      const pool = new CellPool({
        ownFiles: given.own,
        onCells: progress.cells,
        ...(given.workers === undefined ? {} : { workers: given.workers }),
      });
      let run: ChoiceRun;
      let folder: string | null = null;
      try {
        run = await chooseStepper(scenario, {
          pool,
          steppers,
          seed: given.seed,
          minutes: given.minutes,
          ownFiles: given.own,
          version,
          command: commandLine(file, given),
          now: () => performance.now(),
          onPhase: progress.phase,
        });
        if (given.out !== undefined) {
          progress.phase("report", "");
          folder = await writeChoiceFolder(
            given.out,
            await gatherEvidence(run, pool, steppers),
            run.context.measurer.readings,
          );
        }
      } finally {
        progress.stop();
        await pool.close();
      }
      const { choice } = run;
      process.stdout.write(
        given.json ? `${JSON.stringify(choice, null, 2)}\n` : describeChoice(choice, folder),
      );
      if (choice.choice === null) outcome.exitCode = EXIT.exceeded;
    });
}

/** The scenario's list, or the whole catalogue; steppers of one's own always run. */
function candidates(scenario: Scenario, own: readonly Stepper[]): Stepper[] {
  if (scenario.steppers === undefined) return [...catalogue, ...own];
  const listed = scenario.steppers.map((id, i) => requireStepper(`scenario.steppers[${i}]`, id, own));
  const steppers = [...new Set([...listed, ...own])];
  if (steppers.length < scenario.steppers.length)
    throw new InvalidInputError("scenario.steppers: names a stepper twice");
  return steppers;
}

function commandLine(file: string | undefined, given: ChooseOptions): string {
  const own = given.own.map((path) => ` --own ${path}`).join("");
  return `perigauge choose${file === undefined ? "" : ` ${file}`}${own}${given.seed === 1 ? "" : ` --seed ${given.seed}`}${given.minutes === 2 ? "" : ` --minutes ${given.minutes}`}`;
}
