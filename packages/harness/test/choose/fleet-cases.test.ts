import { expect, it } from "vitest";
import { runFull } from "../../src/choose/candidate.ts";
import { chooseStepper } from "../../src/choose/choose-stepper.ts";
import { extrapolate } from "../../src/choose/growth-law.ts";
import { fleetEvaluations } from "../../src/choose/ranked.ts";
import { isVerified, verify } from "../../src/choose/verify.ts";
import { CellPool } from "../../src/run/cell-pool.ts";
import { parseScenario } from "../../src/scenario/parse-scenario.ts";
import { stepper } from "../support.ts";
import { candidateOf, contextOf, scenarioOf } from "./context.ts";

it("two orbits of equal shape are counted as two, and the ranking is that of one with twice the cost", async () => {
  const run = async (orbits: readonly { name: string; semiMajorAxisKm: number; eccentricity: number }[]) => {
    const scenario = scenarioOf({ orbits, limits: [{ alongTrackKm: 1 }], duration: { orbits: 20 } }, 0);
    const pool = new CellPool({ workers: 1 });
    const steppers = ["bettis-nystrom-5", "dormand-nystrom-6", "rk4"].map(stepper);
    return (
      await chooseStepper(scenario, { pool, steppers, seed: 1, version: "", command: "", now: () => 0 })
    ).choice;
  };
  const shape = { semiMajorAxisKm: 26600, eccentricity: 0.3 };
  const one = await run([{ name: "a", ...shape }]);
  const two = await run([
    { name: "a", ...shape },
    { name: "b", ...shape },
  ]);
  expect(two.ranking.map(({ stepper: id }) => id)).toEqual(one.ranking.map(({ stepper: id }) => id));
  expect(two.ranking[0]?.evaluationsTotal).toBe(2 * (one.ranking[0]?.evaluationsTotal ?? 0));
});

it("verification runs random orbits and starts beside its samples, the same for the same seed", async () => {
  const orbits = [{ name: "only", semiMajorAxisKm: 26600, eccentricity: { from: 0.1, to: 0.2 } }];
  const randomRuns = async (): Promise<string[]> => {
    const context = contextOf(
      scenarioOf({ orbits, limits: [{ alongTrackKm: 10 }], duration: { orbits: 4 } }, 0),
    );
    const candidate = candidateOf(context, "rk4");
    const outcome = await verify(context, candidate, 400, []);
    expect(isVerified(outcome)).toBe(true);
    // Samples lie on eighths of the range or halves of those; random orbits do not.
    return context.measurer.readings
      .filter(({ sample }) => (sample.point.parameters[0] * 1024) % 1 !== 0)
      .map(({ cell }) => JSON.stringify(cell));
  };
  const runs = await randomRuns();
  expect(runs).toHaveLength(32);
  expect(await randomRuns()).toEqual(runs);
});

it("restarts charge the start-up again for every satellite", async () => {
  const scenario = scenarioOf(
    { limits: [{ alongTrackKm: 1 }], duration: { days: 10 }, start: "periapsis" },
    0.1,
  );
  const plain = contextOf(scenario);
  const restarted = contextOf({ ...scenario, restartsPerDay: 3 });
  const candidate = candidateOf(plain, "gauss-jackson-8");
  const readings = await runFull(plain, candidate, candidate.samples, 200);
  const more =
    fleetEvaluations(restarted, candidate.stepper, readings) -
    fleetEvaluations(plain, candidate.stepper, readings);
  expect(candidate.stepper.startEvaluations as number).toBeGreaterThan(0);
  expect(more).toBe(30 * (candidate.stepper.startEvaluations as number));
});

it("extrapolation follows the growth seen, no steeper than theory and never downward", () => {
  expect(extrapolate(1, 2, 10, 100, 2)).toBeCloseTo(20, 12);
  expect(extrapolate(1, 4, 10, 100, 2)).toBeCloseTo(400, 10);
  expect(extrapolate(1, 8, 10, 100, 2)).toBeCloseTo(800, 10);
  expect(extrapolate(2, 1, 10, 100, 2)).toBe(1);
  expect(extrapolate(1, 2, 100, 100, 2)).toBe(2);
});

it("a diverged coarse run does not end the screening of a stepper that holds further on", async () => {
  const scenario = scenarioOf(
    {
      limits: [{ alongTrackKm: 50 }],
      duration: { orbits: 20 },
      require: { evaluationsPerOrbit: 5000 },
      start: 45,
    },
    0.95,
  );
  const pool = new CellPool({ workers: 1 });
  const { choice } = await chooseStepper(scenario, {
    pool,
    steppers: [stepper("sundman-dormand-prince-5")],
    seed: 1,
    version: "",
    command: "",
    now: () => 0,
  });
  expect(choice.choice).toBe("sundman-dormand-prince-5");
});

it("timing over fewer than two and a half orbits is refused, not failed", () => {
  const scenario = {
    format: "perigauge-scenario/1",
    title: "short",
    gravitationalParameterKm3S2: 398600.4418,
    orbits: [{ name: "only", semiMajorAxisKm: 26600, eccentricity: 0.3 }],
    duration: { orbits: 100 },
    limits: [{ timingSeconds: 1, withinDays: 0.4 }],
  };
  expect(() => parseScenario(scenario)).toThrow(
    /scenario\.limits\[0\]\.timingSeconds: must be over at least 2\.5 orbits/,
  );
});
