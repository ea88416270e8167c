import { readFile } from "node:fs/promises";
import { findStepper } from "@perigauge/steppers";
import type { z } from "zod";
import { LIMIT_KEYS } from "../choose/choice.ts";
import { describeValue, InvalidInputError, mustBe } from "../errors.ts";
import { unknownStepper } from "../run/find-stepper.ts";
import { orbitSampler } from "./orbit-sampler.ts";
import type { Scenario, ScenarioLimit } from "./scenario.ts";
import { scenarioSchema } from "./schema.ts";

/** @throws InvalidInputError where the file cannot be read or is not a scenario: one line, where and what was expected. */
export async function readScenario(file: string): Promise<Scenario> {
  let text: string;
  try {
    text = await readFile(file, "utf8");
  } catch (error) {
    const code = (error as NodeJS.ErrnoException).code;
    throw new InvalidInputError(`${file}: cannot be read (${code === "ENOENT" ? "no such file" : code})`);
  }
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch (error) {
    throw new InvalidInputError(
      `${file}: is not JSON (${(error as Error).message.replaceAll(/\s+/g, " ")}${lineOf(text, error)})`,
    );
  }
  return parseScenario(value);
}

function lineOf(text: string, error: unknown): string {
  const position = /position (\d+)/.exec((error as Error).message)?.[1];
  if (position === undefined || (error as Error).message.includes("line ")) return "";
  return `, line ${text.slice(0, Number(position)).split("\n").length}`;
}

/** @throws InvalidInputError for the first thing that is wrong. */
export function parseScenario(value: unknown): Scenario {
  const parsed = scenarioSchema.safeParse(value);
  if (!parsed.success)
    throw new InvalidInputError(describeIssue(parsed.error.issues[0] as z.core.$ZodIssue, value));
  const scenario = parsed.data;
  const names = new Set<string>();
  scenario.orbits.forEach((orbit, i) => {
    if (names.has(orbit.name))
      throw mustBe(`scenario.orbits[${i}].name`, "unlike the names of the other orbits", orbit.name);
    names.add(orbit.name);
    orbitSampler(orbit, `scenario.orbits[${i}]`, scenario.bodyRadiusKm);
  });
  scenario.limits.forEach((limit, i) => {
    checkLimit(limit, `scenario.limits[${i}]`, scenario);
  });
  scenario.steppers?.forEach((id, i) => {
    if (findStepper(id) === undefined) throw unknownStepper(`scenario.steppers[${i}]`, id);
  });
  checkCurrent(scenario);
  const { maxSeconds, multipleOfSeconds } = scenario.step ?? {};
  if (maxSeconds !== undefined && multipleOfSeconds !== undefined && maxSeconds < multipleOfSeconds) {
    throw mustBe("scenario.step.maxSeconds", `at least multipleOfSeconds (${multipleOfSeconds})`, maxSeconds);
  }
  return scenario;
}

function checkLimit(limit: ScenarioLimit, where: string, scenario: Scenario): void {
  const given = LIMIT_KEYS.filter((key) => limit[key] !== undefined);
  if (given.length !== 1) {
    throw new InvalidInputError(
      `${where}: must name exactly one measure (${LIMIT_KEYS.join(", ")}), got ${given.length}`,
    );
  }
  const days = "days" in scenario.duration ? scenario.duration.days : null;
  if (limit.withinDays !== undefined && days !== null && limit.withinDays > days) {
    throw mustBe(`${where}.withinDays`, `at most the duration (${days} days)`, limit.withinDays);
  }
}

function checkCurrent({ current }: Scenario): void {
  if (current === undefined) return;
  const stepper = findStepper(current.stepper);
  if (stepper === undefined) throw unknownStepper("scenario.current.stepper", current.stepper);
  const needed = stepper.knob === "step" ? "stepSeconds" : "tolerance";
  const other = stepper.knob === "step" ? "tolerance" : "stepSeconds";
  if (current[needed] === undefined || current[other] !== undefined) {
    throw new InvalidInputError(
      `scenario.current: ${current.stepper} takes ${needed} and nothing else, got ${describeValue(current)}`,
    );
  }
}

/** One line for one finding of the schema. */
function describeIssue(issue: z.core.$ZodIssue, root: unknown): string {
  const where = issue.path.reduce<string>(
    (path, key) => (typeof key === "number" ? `${path}[${key}]` : `${path}.${String(key)}`),
    "scenario",
  );
  const value = issue.path.reduce<unknown>(
    (inner, key) => (inner as Record<PropertyKey, unknown> | undefined)?.[key as PropertyKey],
    root,
  );
  if (issue.code === "unrecognized_keys")
    return `${where}: unknown field ${issue.keys.map(describeValue).join(", ")}`;
  if (value === undefined) return `${where}: is missing (${expectation(issue)})`;
  return `${where}: ${expectation(issue)}, got ${describeValue(value)}`;
}

function expectation(issue: z.core.$ZodIssue): string {
  switch (issue.code) {
    case "invalid_type":
      return `must be ${article(issue.expected)}`;
    case "invalid_value":
      return `must be ${issue.values.map(describeValue).join(" or ")}`;
    case "too_small":
      return issue.origin === "array" || issue.origin === "string"
        ? "must not be empty"
        : `must be ${issue.inclusive ? "at least" : "greater than"} ${issue.minimum}`;
    case "too_big":
      return issue.origin === "array" || issue.origin === "string"
        ? `must be at most ${issue.maximum} long`
        : `must be ${issue.inclusive ? "at most" : "less than"} ${issue.maximum}`;
    default:
      return issue.message;
  }
}

function article(kind: string): string {
  if (kind === "int") return "a whole number";
  return /^[aeio]/.test(kind) ? `an ${kind}` : `a ${kind}`;
}
