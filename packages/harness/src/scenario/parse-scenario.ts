import { findStepper } from "@perigauge/steppers";
import { LIMIT_KEYS } from "../choose/choice.ts";
import { buildFleet, corners, daysToSeconds, type Fleet } from "../choose/fleet.ts";
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
  checkLengths(scenario, fleet);
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
  if (limit.apsisDeg !== undefined && corners(fleet).some(({ eccentricity }) => eccentricity === 0)) {
    throw mustBe(
      `${where}.apsisDeg`,
      "asked of orbits that have an apsis (an eccentricity above 0)",
      limit.apsisDeg,
    );
  }
  if (limit.withinDays !== undefined && limit.withinDays > days) {
    throw mustBe(`${where}.withinDays`, `at most the duration (${days} days)`, limit.withinDays);
  }
}

/** Runs longer than this are beyond what is searched. */
const MOST_ORBITS = 1e7;
const MOST_STEPS_PER_ORBIT = 2 ** 22;
const FEWEST_STEPS_PER_ORBIT = 5;

/** Steps and durations that no run can be made of. */
function checkLengths({ step, current }: Scenario, fleet: Fleet): void {
  const { shortestPeriodSeconds: shortest, longestPeriodSeconds: longest, durationSeconds } = fleet;
  const orbits = durationSeconds / shortest;
  if (!(orbits <= MOST_ORBITS)) throw mustBe("scenario.duration", `at most ${MOST_ORBITS} orbits`, orbits);
  const smallest = longest / MOST_STEPS_PER_ORBIT;
  const within = (seconds: number | undefined, where: string, least: number, most: number): void => {
    if (seconds === undefined || (seconds >= least && seconds <= most)) return;
    const bounds = `${Number(least.toPrecision(3))} to ${Number(most.toPrecision(3))} s here`;
    throw mustBe(where, bounds, seconds);
  };
  within(step?.maxSeconds, "scenario.step.maxSeconds", smallest, Number.MAX_VALUE);
  within(
    step?.multipleOfSeconds,
    "scenario.step.multipleOfSeconds",
    smallest,
    shortest / FEWEST_STEPS_PER_ORBIT,
  );
  within(
    current?.stepSeconds,
    "scenario.current.stepSeconds",
    smallest,
    Math.min(durationSeconds, shortest / 2),
  );
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
