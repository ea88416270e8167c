import { InvalidArgumentError, Option } from "commander";
import { InvalidInputError, mustBe } from "../errors.ts";
import {
  MEASURES,
  type MeasureName,
  type MeasureSummary,
  type Score,
  type Summation,
} from "../score/score.ts";

/** A finite number, or a message that names what was given. */
export function number(text: string): number {
  const value = text.trim() === "" ? Number.NaN : Number(text);
  if (!Number.isFinite(value)) throw new InvalidArgumentError(`Must be a finite number, got "${text}".`);
  return value;
}

export function positive(text: string): number {
  const value = number(text);
  if (!(value > 0)) throw new InvalidArgumentError(`Must be greater than 0, got "${text}".`);
  return value;
}

export function wholePositive(text: string): number {
  const value = positive(text);
  if (!Number.isSafeInteger(value)) throw new InvalidArgumentError(`Must be a whole number, got "${text}".`);
  return value;
}

/** Comma-separated list of what `parse` reads. */
export function listOf<T>(parse: (text: string) => T): (text: string) => T[] {
  return (text) => text.split(",").map((part) => parse(part));
}

export function eccentricity(text: string): number {
  const value = number(text);
  if (!(value >= 0 && value < 1)) throw new InvalidArgumentError(`Must be in [0, 1), got "${text}".`);
  return value;
}

/** True anomaly of the start in degrees. */
export function startAnomaly(text: string): number {
  if (text === "periapsis") return 0;
  if (text === "apoapsis") return 180;
  const value = text.trim() === "" ? Number.NaN : Number(text);
  if (!Number.isFinite(value)) {
    throw new InvalidArgumentError(
      `Must be periapsis, apoapsis or a true anomaly in degrees, got "${text}".`,
    );
  }
  return value;
}

export const options = {
  eccentricity: (): Option =>
    new Option("--eccentricity <e>", "eccentricity, in [0, 1)").argParser(eccentricity).makeOptionMandatory(),
  stepsPerOrbit: (): Option =>
    new Option("--steps-per-orbit <N>", "fixed step: N steps an orbit, whole or not").argParser(positive),
  step: (): Option =>
    new Option("--step <h>", "fixed step h, normalised (an orbit is 2 pi)")
      .argParser(positive)
      .conflicts("stepsPerOrbit"),
  tolerance: (): Option =>
    new Option("--tolerance <t>", "variable step: local error tolerance").argParser(positive),
  maxStep: (): Option =>
    new Option("--max-step <h>", "variable step: no step longer than h, normalised").argParser(positive),
  orbits: (): Option =>
    new Option("--orbits <K>", "length of the run, in orbits").argParser(positive).default(10),
  start: (): Option =>
    new Option("--start <where>", "periapsis, apoapsis or a true anomaly in degrees")
      .argParser(startAnomaly)
      .default(0, "periapsis"),
  summation: (): Option =>
    new Option("--summation <kind>", "how steps are added up")
      .choices(["plain", "compensated"])
      .default("plain" satisfies Summation),
  own: (): Option =>
    new Option("--own <file>", "module that exports a stepper of your own (repeatable)")
      .argParser((file: string, files: string[] = []) => [...files, file])
      .default([], "none"),
  limit: (): Option =>
    new Option(
      "--limit <measure=value>",
      "exit 1 where the measure exceeds it, e.g. phase.max=1e-4 (repeatable)",
    )
      .argParser((text: string, limits: ScoreLimit[] = []) => [...limits, parseLimit(text)])
      .default([], "none"),
  json: (): Option => new Option("--json", "one JSON document on stdout, nothing else"),
  workers: (): Option =>
    new Option("--workers <W>", "threads; default: one per core").argParser(wholePositive),
  quiet: (): Option => new Option("--quiet", "no progress and no notes on stderr"),
} as const;

/** A limit on one summary of one measure. */
export interface ScoreLimit {
  readonly measure: MeasureName;
  readonly summary: keyof MeasureSummary;
  readonly limit: number;
}

const SUMMARIES: readonly (keyof MeasureSummary)[] = [
  "max",
  "rms",
  "final",
  "driftPerOrbit",
  "growthExponent",
];

export function parseLimit(text: string): ScoreLimit {
  const match = /^([a-zA-Z]+)(?:\.([a-zA-Z]+))?=(.+)$/.exec(text);
  const measure = match?.[1] as MeasureName | undefined;
  const summary = (match?.[2] ?? "max") as keyof MeasureSummary;
  const limit = Number(match?.[3]);
  if (
    measure === undefined ||
    !MEASURES.includes(measure) ||
    !SUMMARIES.includes(summary) ||
    !(limit > 0 && Number.isFinite(limit))
  ) {
    throw new InvalidArgumentError(
      `Must be MEASURE.SUMMARY=VALUE with a measure of ${MEASURES.join(", ")}, a summary of ${SUMMARIES.join(", ")} and a value above 0, got "${text}".`,
    );
  }
  return { measure, summary, limit };
}

/** Limits that the score breaks, each with the value found; a measure that does not apply, and any of a diverged run, breaks its limit. */
export function brokenLimits(
  score: Score,
  limits: readonly ScoreLimit[],
): { limit: ScoreLimit; value: number | null }[] {
  return limits
    .map((limit) => ({ limit, value: score[limit.measure][limit.summary] }))
    .filter(
      ({ limit, value }) =>
        value === null || score.ended.status === "diverged" || !(Math.abs(value) <= limit.limit),
    );
}

/** @throws InvalidInputError unless exactly one knob is given. */
export function requireKnob(given: { step?: number; stepsPerOrbit?: number; tolerance?: number }): void {
  const count = [given.step, given.stepsPerOrbit, given.tolerance].filter(
    (value) => value !== undefined,
  ).length;
  if (count === 0) throw new InvalidInputError("give a step: --steps-per-orbit N, --step H or --tolerance T");
  if (count > 1) throw mustBe("step", "given once (--steps-per-orbit, --step or --tolerance)", count);
}
