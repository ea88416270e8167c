import { Command, Option } from "commander";
import { InvalidInputError } from "../errors.ts";
import { type ExactState, exactAtPeriods, exactAtSteps } from "../run/exact-states.ts";
import { listOf, number, options } from "./options.ts";
import type { Outcome } from "./run-command-line.ts";
import { table } from "./table.ts";

interface ExactOptions {
  readonly eccentricity: number;
  readonly start: number;
  readonly periods?: readonly number[];
  readonly stepsPerOrbit?: number;
  readonly atStep?: readonly number[];
  readonly roundedStart?: true;
  readonly json?: true;
}

/** `exact`: the reference itself, for comparing other code with. */
export function exactVerb(_outcome: Outcome): Command {
  return new Command("exact")
    .description("the exact state at given times, or at step k of h = P/N")
    .addOption(options.eccentricity())
    .addOption(options.start())
    .addOption(new Option("--periods <t>", "times in periods, comma-separated").argParser(listOf(number)))
    .addOption(options.stepsPerOrbit())
    .addOption(new Option("--at-step <k>", "step numbers, comma-separated").argParser(listOf(number)))
    .addOption(
      new Option(
        "--rounded-start",
        "the orbit through the start rounded to doubles, as scoring uses; default: of the elements",
      ),
    )
    .addOption(options.json())
    .action((given: ExactOptions) => {
      const states = statesOf(given);
      if (given.json) {
        process.stdout.write(`${JSON.stringify({ format: "perigauge-exact/1", states }, null, 2)}\n`);
        return;
      }
      const names = ["t", "x", "y", "vx", "vy", "meanAnomaly", "eccentricAnomaly", "trueAnomaly"] as const;
      process.stdout.write(
        `${table(
          names,
          states.map((state) => names.map((name) => String(state[name]))),
        )}\n`,
      );
    });
}

function statesOf(given: ExactOptions): ExactState[] {
  const { eccentricity, start, periods, stepsPerOrbit, atStep } = given;
  const kind = given.roundedStart ? "through rounded start" : "of elements";
  if (periods !== undefined && stepsPerOrbit === undefined && atStep === undefined) {
    return exactAtPeriods(eccentricity, start, periods, kind);
  }
  if (periods === undefined && stepsPerOrbit !== undefined && atStep !== undefined) {
    return exactAtSteps(eccentricity, start, stepsPerOrbit, atStep, kind);
  }
  throw new InvalidInputError("exact: give either --periods T or both --steps-per-orbit N and --at-step K");
}
