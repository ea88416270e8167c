import { Command } from "commander";
import { requireStepper } from "../run/find-stepper.ts";
import { loadOwnSteppers } from "../run/own-steppers.ts";
import { runCell } from "../run/run-cell.ts";
import { FULL_PLAN } from "../score/run-scorer.ts";
import { type Cell, MEASURES, type Score, type Summation } from "../score/score.ts";
import { scientific } from "../text/numbers.ts";
import { brokenLimits, options, requireKnob, type ScoreLimit } from "./options.ts";
import { EXIT, type Outcome } from "./run-command-line.ts";
import { table } from "./table.ts";

interface ScoreOptions {
  readonly stepper: string;
  readonly own: readonly string[];
  readonly eccentricity: number;
  readonly stepsPerOrbit?: number;
  readonly step?: number;
  readonly tolerance?: number;
  readonly maxStep?: number;
  readonly orbits: number;
  readonly start: number;
  readonly summation: Summation;
  readonly limit: readonly ScoreLimit[];
  readonly json?: true;
}

/** `score`: one cell, every measure at every step. */
export function scoreVerb(outcome: Outcome): Command {
  return new Command("score")
    .description("score one cell: a stepper, an eccentricity, a step and a length")
    .requiredOption("--stepper <id>", "id of the stepper (perigauge steppers lists them)")
    .addOption(options.own())
    .addOption(options.eccentricity())
    .addOption(options.stepsPerOrbit())
    .addOption(options.step())
    .addOption(options.tolerance())
    .addOption(options.maxStep())
    .addOption(options.orbits())
    .addOption(options.start())
    .addOption(options.summation())
    .addOption(options.limit())
    .addOption(options.json())
    .addOption(options.quiet())
    .action(async (given: ScoreOptions) => {
      const own = await loadOwnSteppers(given.own);
      const stepper = requireStepper("--stepper", given.stepper, own);
      requireKnob(given);
      const score = runCell(cellOf(given), stepper, FULL_PLAN);
      const broken = brokenLimits(score, given.limit);
      process.stdout.write(given.json ? `${JSON.stringify(score, null, 2)}\n` : describeScore(score));
      for (const { limit, value } of broken) {
        process.stderr.write(
          `perigauge: ${limit.measure}.${limit.summary} is ${value === null ? "not defined" : scientific(value)}, limit ${scientific(limit.limit)}${score.ended.status === "diverged" ? " (the run diverged)" : ""}\n`,
        );
      }
      if (broken.length > 0) outcome.exitCode = EXIT.exceeded;
    });
}

function cellOf(given: ScoreOptions): Cell {
  return {
    stepper: given.stepper,
    eccentricity: given.eccentricity,
    orbits: given.orbits,
    startAnomalyDeg: given.start,
    summation: given.summation,
    ...(given.step === undefined ? {} : { step: given.step }),
    ...(given.stepsPerOrbit === undefined ? {} : { stepsPerOrbit: given.stepsPerOrbit }),
    ...(given.tolerance === undefined ? {} : { tolerance: given.tolerance }),
    ...(given.maxStep === undefined ? {} : { maxStep: given.maxStep }),
  };
}

const UNITS: Readonly<Record<(typeof MEASURES)[number], string>> = {
  energy: "relative",
  angularMomentum: "relative",
  phase: "rad",
  apsis: "rad",
  position: "of a",
  alongTrack: "of a",
  radial: "of a",
  period: "relative",
  timing: "periods",
};

function describeScore(score: Score): string {
  const knob =
    score.stepsPerOrbit === null
      ? `tolerance ${scientific(score.tolerance)}`
      : `${score.stepsPerOrbit} steps per orbit`;
  const end =
    score.ended.status === "completed"
      ? "completed"
      : `diverged (${score.ended.reason}) at orbit ${score.ended.atOrbit.toPrecision(6)}`;
  const rows = MEASURES.map((name) => {
    const summary = score[name];
    return [
      name,
      UNITS[name],
      scientific(summary.max),
      scientific(summary.rms),
      scientific(summary.final),
      scientific(summary.driftPerOrbit),
      summary.growthExponent === null || summary.growthStandardError === null
        ? "-"
        : `${summary.growthExponent.toFixed(2)} ± ${summary.growthStandardError.toFixed(2)}`,
    ];
  });
  return `${[
    `${score.stepper}, e = ${score.eccentricity}, ${knob}, ${score.orbits} orbits from true anomaly ${score.startAnomalyDeg} deg: ${end}`,
    `${score.steps} steps, ${score.evaluations} force evaluations (${score.evaluationsPerOrbit.toPrecision(6)} per orbit)`,
    "",
    table(["measure", "unit", "max", "rms", "final", "drift per orbit", "growth exponent"], rows),
  ].join("\n")}\n`;
}
