import { readFile } from "node:fs/promises";
import { describe, expect, it } from "vitest";
import { InvalidInputError } from "../../src/errors.ts";
import { parseScenario } from "../../src/scenario/parse-scenario.ts";

const demo = async (): Promise<Record<string, unknown>> =>
  JSON.parse(await readFile(new URL("../../scenarios/survey-satellites.json", import.meta.url), "utf8"));

async function messageFor(change: (scenario: Record<string, unknown>) => void): Promise<string> {
  const scenario = await demo();
  change(scenario);
  try {
    parseScenario(scenario);
  } catch (error) {
    expect(error).toBeInstanceOf(InvalidInputError);
    return (error as Error).message;
  }
  throw new Error("the scenario was accepted");
}

describe("a scenario", () => {
  it("is accepted as shipped", async () => {
    expect(parseScenario(await demo()).title).toBe("Four survey satellites, sixty days");
  });

  it.each<[string, (scenario: Record<string, unknown>) => void, string]>([
    [
      "format",
      (s) => {
        s.format = "other/2";
      },
      'scenario.format: must be "perigauge-scenario/1", got "other/2"',
    ],
    [
      "missing",
      (s) => {
        delete s.duration;
      },
      'scenario.duration: is missing (must be { "days": number } or { "orbits": number })',
    ],
    [
      "unknown field",
      (s) => {
        s.colour = "red";
      },
      'scenario: unknown field "colour"',
    ],
    [
      "negative",
      (s) => {
        s.gravitationalParameterKm3S2 = -1;
      },
      "scenario.gravitationalParameterKm3S2: must be greater than 0, got -1",
    ],
    [
      "wrong type",
      (s) => {
        s.title = 7;
      },
      "scenario.title: must be a string, got 7",
    ],
    [
      "not finite",
      (s) => {
        s.designFactor = Number.NaN;
      },
      "scenario.designFactor: must be a number, got NaN",
    ],
    [
      "no limit",
      (s) => {
        s.limits = [];
      },
      "scenario.limits: must not be empty, got []",
    ],
    [
      "two measures",
      (s) => {
        s.limits = [{ alongTrackKm: 1, radialKm: 1 }];
      },
      "scenario.limits[0]: must name exactly one measure (alongTrackKm, radialKm, positionKm, timingSeconds, semiMajorAxisM, apsisDeg, phaseRad, energyRelative), got 2",
    ],
    [
      "horizon",
      (s) => {
        s.limits = [{ alongTrackKm: 1, withinDays: 90 }];
      },
      "scenario.limits[0].withinDays: must be at most the duration (60 days), got 90",
    ],
    [
      "eccentricity",
      (s) => {
        s.orbits = [{ name: "a", semiMajorAxisKm: 20000, eccentricity: 1.2 }];
      },
      "scenario.orbits[0].eccentricity: must be less than 1, got 1.2",
    ],
    [
      "three sizes",
      (s) => {
        s.orbits = [{ name: "a", semiMajorAxisKm: 20000, eccentricity: 0.1, periapsisRadiusKm: 18000 }];
      },
      "scenario.orbits[0]: must be given by two of semi-major axis, eccentricity, periapsis and apoapsis, got semiMajorAxisKm, eccentricity, periapsisRadiusKm",
    ],
    [
      "under the ground",
      (s) => {
        s.orbits = [{ name: "a", semiMajorAxisKm: 7000, eccentricity: 0.2 }];
      },
      "scenario.orbits[0]: its periapsis radius, km: must be above the surface (6378.137 km), got 5600",
    ],
    [
      "upside down",
      (s) => {
        s.orbits = [{ name: "a", periapsisRadiusKm: 9000, apoapsisRadiusKm: 8000 }];
      },
      "scenario.orbits[0]: its apoapsis: must be no nearer than its periapsis (eccentricity in [0, 1)), got -0.058823529411764705",
    ],
    [
      "twins",
      (s) => {
        s.orbits = [
          { name: "a", semiMajorAxisKm: 7000, eccentricity: 0 },
          { name: "a", semiMajorAxisKm: 7001, eccentricity: 0 },
        ];
      },
      'scenario.orbits[1].name: must be unlike the names of the other orbits, got "a"',
    ],
    [
      "stepper",
      (s) => {
        s.steppers = ["rk4", "leapfog"];
      },
      'scenario.steppers[1]: unknown stepper "leapfog"; did you mean leapfrog? (perigauge steppers lists them)',
    ],
    [
      "current",
      (s) => {
        s.current = { stepper: "rk4", tolerance: 1e-9 };
      },
      'scenario.current: rk4 takes stepSeconds and nothing else, got {"stepper":"rk4","tolerance":1e-9}',
    ],
    [
      "cap below grid",
      (s) => {
        s.step = { maxSeconds: 3, multipleOfSeconds: 5 };
      },
      "scenario.step.maxSeconds: must be at least multipleOfSeconds (5), got 3",
    ],
  ])("%s: one line that says where, what and the value", async (_, change, message) => {
    expect(await messageFor(change)).toBe(message);
  });
});
