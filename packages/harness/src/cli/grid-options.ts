import { catalogue, type Stepper } from "@perigauge/steppers";
import { InvalidArgumentError, Option } from "commander";
import { InvalidInputError } from "../errors.ts";
import { requireStepper } from "../run/find-stepper.ts";
import type { Summation } from "../score/score.ts";
import type { Shard } from "../sweep/grid.ts";
import { listValues } from "../sweep/study.ts";
import { eccentricity, listOf, number, positive, startAnomaly } from "./options.ts";

const MOST_VALUES = 100_000;

/** `A,B,C`, or a range `FROM:TO:COUNT` with both ends, or `FROM:TO:COUNT:log` spaced evenly in the logarithm. */
export function valuesOf(parse: (text: string) => number): (text: string) => readonly number[] {
  return (text) => {
    if (!text.includes(":")) return listOf(parse)(text);
    const [from = "", to = "", count = "", spacing, more] = text.split(":");
    const values = number(count);
    const known = (spacing === undefined || spacing === "log") && more === undefined;
    if (!known || !(Number.isSafeInteger(values) && values >= 2 && values <= MOST_VALUES)) {
      throw new InvalidArgumentError(
        `Must be a list or FROM:TO:COUNT (:log) with a whole COUNT from 2 to ${MOST_VALUES}, got "${text}".`,
      );
    }
    const range = { from: parse(from), to: parse(to), count: values };
    if (spacing === undefined) return listValues(range);
    if (!(range.from > 0 && range.to > 0))
      throw new InvalidArgumentError(`Must have both ends above 0 where spaced by log, got "${text}".`);
    return listValues({ ...range, spacing: "log" });
  };
}

function tolerance(text: string): number {
  const value = positive(text);
  if (!(value < 1)) throw new InvalidArgumentError(`Must be in (0, 1), got "${text}".`);
  return value;
}

function summation(text: string): Summation {
  if (text === "plain" || text === "compensated") return text;
  throw new InvalidArgumentError(`Must be plain or compensated, got "${text}".`);
}

function shard(text: string): Shard {
  const match = /^(\d+)\/(\d+)$/.exec(text);
  const index = Number(match?.[1]);
  const of = Number(match?.[2]);
  if (!(index >= 1 && index <= of && Number.isSafeInteger(of)))
    throw new InvalidArgumentError(`Must be I/N with 1 <= I <= N, got "${text}".`);
  return { index, of };
}

/** Options of the verbs that run many cells: lists and ranges. */
export const gridOptions = {
  steppers: (): Option =>
    new Option("--stepper <ids>", "ids, comma-separated, or all (perigauge steppers lists them)").argParser(
      listOf((id) => id.trim()),
    ),
  eccentricities: (): Option =>
    new Option("--eccentricity <e>", "in [0, 1): a list, or a range FROM:TO:COUNT").argParser(
      valuesOf(eccentricity),
    ),
  stepsPerOrbit: (): Option =>
    new Option("--steps-per-orbit <N>", "fixed step: a list, or a range FROM:TO:COUNT (:log)").argParser(
      valuesOf(positive),
    ),
  tolerances: (): Option =>
    new Option("--tolerance <t>", "variable step: a list, or a range FROM:TO:COUNT (:log)").argParser(
      valuesOf(tolerance),
    ),
  orbits: (orbits: number): Option =>
    new Option("--orbits <K>", "length of the runs, in orbits").argParser(positive).default(orbits),
  starts: (): Option =>
    new Option("--start <where>", "periapsis, apoapsis or true anomalies in degrees, comma-separated")
      .argParser(listOf(startAnomaly))
      .default([0], "periapsis"),
  summations: (): Option =>
    new Option("--summation <kinds>", "plain, compensated or both, comma-separated")
      .argParser(listOf(summation))
      .default(["plain"], "plain"),
  shard: (): Option =>
    new Option(
      "--shard <I/N>",
      "run every Nth cell only, from the Ith, to share a grid among machines",
    ).argParser(shard),
  out: (): Option => new Option("--out <dir>", "write the result into this folder"),
} as const;

/** @throws InvalidInputError where none is named, one is unknown or one is named twice. */
export function requireSteppers(ids: readonly string[] | undefined, own: readonly Stepper[]): Stepper[] {
  if (ids === undefined && own.length === 0)
    throw new InvalidInputError("--stepper: name at least one (perigauge steppers lists them)");
  if (ids?.length === 1 && ids[0] === "all") return [...catalogue, ...own];
  const steppers = ids === undefined ? [...own] : ids.map((id) => requireStepper("--stepper", id, own));
  if (new Set(steppers).size < steppers.length)
    throw new InvalidInputError("--stepper: names a stepper twice");
  return steppers;
}

/** @throws InvalidInputError where the option is missing. */
export function requireOption<T>(name: string, value: T | undefined): T {
  if (value === undefined) throw new InvalidInputError(`${name}: is missing`);
  return value;
}
