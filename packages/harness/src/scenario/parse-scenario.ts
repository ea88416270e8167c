import { findStepper } from "@perigauge/steppers";
import { LIMIT_KEYS } from "../choose/choice.ts";
import { buildFleet, daysToSeconds, type Fleet } from "../choose/fleet.ts";
import { describeValue, InvalidInputError, mustBe } from "../errors.ts";
import { unknownStepper } from "../run/find-stepper.ts";
import { readJson } from "../text/read-json.ts";
import { firstFinding } from "../text/schema-findings.ts";
import { orbitSampler } from "./orbit-sampler.ts";
import type { Scenario, ScenarioLimit } from "./scenario.ts";
import { scenarioSchema } from "./schema.ts";

/** @throws InvalidInputError where the file cannot be read or is not a scenario: one line, where and what was expected. */
export async function readScenario(file: string): Promise<Scenario> {
  return parseScenario(await readJson(file));
}

/** @throws InvalidInputError for the first thing that is wrong. */
export function parseScenario(value: unknown): Scenario {
  const parsed = scenarioSchema.safeParse(value);
  if (!parsed.success) throw firstFinding("scenario", parsed.error, value);
  const scenario = parsed.data;
  const names = new Set<string>();
  scenario.orbits.forEach((orbit, i) => {
    if (names.has(orbit.name))
      throw mustBe(`scenario.orbits[${i}].name`, "unlike the names of the other orbits", orbit.name);
    names.add(orbit.name);
    orbitSampler(orbit, `scenario.orbits[${i}]`, scenario.bodyRadiusKm);
  });
  const fleet = buildFleet(scenario);
  scenario.limits.forEach((limit, i) => {
    checkLimit(limit, `scenario.limits[${i}]`, fleet);
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

/** Passages of periapsis that timing is judged by need this many orbits, from any start and for a late body. */
const TIMING_ORBITS = 2.5;

function checkLimit(limit: ScenarioLimit, where: string, fleet: Fleet): void {
  const given = LIMIT_KEYS.filter((key) => limit[key] !== undefined);
  if (given.length !== 1) {
    throw new InvalidInputError(
      `${where}: must name exactly one measure (${LIMIT_KEYS.join(", ")}), got ${given.length}`,
    );
  }
  const days = fleet.durationSeconds / daysToSeconds(1);
  const within = Math.min(days, limit.withinDays ?? days);
  const timingDays = (TIMING_ORBITS * fleet.longestPeriodSeconds) / daysToSeconds(1);
  if (limit.timingSeconds !== undefined && within < timingDays) {
    throw mustBe(
      `${where}.timingSeconds`,
      `over at least ${TIMING_ORBITS} orbits (${Number(timingDays.toPrecision(4))} days), which it is judged by`,
      within,
    );
  }
  if (limit.withinDays !== undefined && limit.withinDays > days) {
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
