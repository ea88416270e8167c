import type { Stepper } from "@perigauge/steppers";
import { afterAll, expect, it } from "vitest";
import { runFull } from "../../src/choose/candidate.ts";
import { chooseStepper } from "../../src/choose/choose-stepper.ts";
import { pointAt } from "../../src/choose/fleet.ts";
import { worst } from "../../src/choose/measure.ts";
import { seededRandom } from "../../src/choose/seeded-random.ts";
import { CellPool } from "../../src/run/cell-pool.ts";
import type { Scenario } from "../../src/scenario/scenario.ts";
import { stepper } from "../support.ts";
import { scenarioOf } from "./context.ts";

const SCENARIOS = 40;
const CELLS_EACH = 4;
const FIELD = [
  "rk4",
  "dormand-prince-5",
  "dormand-nystrom-8",
  "kahan-li-6",
  "leapfrog",
  "dormand-prince-54",
  "tsitouras-5",
  "blanes-moan-4",
];

const pool = new CellPool();
afterAll(() => pool.close());

/** A scenario of one orbit with a range of eccentricity, some with cap and grid, some with a horizon; three steppers of the field. */
function randomScenario(random: () => number): { scenario: Scenario; steppers: Stepper[] } {
  const between = (from: number, to: number): number => from + (to - from) * random();
  const low = between(0, 0.7);
  const kilometres = 10 ** between(-2, 1.5);
  const scenario = scenarioOf(
    {
      orbits: [
        { name: "only", semiMajorAxisKm: 26600, eccentricity: { from: low, to: low + between(0.01, 0.05) } },
      ],
      duration: { orbits: between(4, 14) },
      limits: [
        { alongTrackKm: kilometres },
        ...(random() < 0.5 ? [{ semiMajorAxisM: 1000 * kilometres }] : []),
        ...(random() < 0.3 ? [{ positionKm: kilometres, withinDays: 1 }] : []),
      ],
      designFactor: random() < 0.5 ? 2 : 1 + random(),
      ...(random() < 0.4 ? { step: { maxSeconds: between(60, 900), multipleOfSeconds: 5 } } : {}),
    },
    0,
  );
  const ids = new Set<string>();
  while (ids.size < 3) ids.add(FIELD[Math.floor(random() * FIELD.length)] as string);
  return { scenario, steppers: [...ids].map(stepper) };
}

it(`${SCENARIOS} random scenarios: any cell inside the chosen band holds every limit, and the cliff is one`, {
  timeout: 600_000,
}, async () => {
  const random = seededRandom(20260101);
  let chosen = 0;
  for (let n = 0; n < SCENARIOS; n++) {
    const { scenario, steppers } = randomScenario(random);
    const run = await chooseStepper(scenario, {
      pool,
      steppers,
      seed: n + 1,
      version: "test",
      command: "test",
      now: () => 0,
    });
    const winner = run.choice.ranking[0];
    const entry = run.tried.find(({ candidate }) => candidate.stepper.id === run.choice.choice);
    if (winner === undefined || entry === undefined) {
      expect(run.choice.whatWouldHaveToGive.length).toBeGreaterThan(0);
      continue;
    }
    chosen += 1;
    const { context } = run;
    const { candidate } = entry;
    const { knob } = candidate;
    const input = JSON.stringify({ n, scenario, steppers: steppers.map(({ id }) => id) });
    expect(winner.margin, input).toBeGreaterThanOrEqual(scenario.designFactor as number);
    expect(winner.evidence, input).toBe("run");
    expect(winner.band, input).not.toBeNull();
    const fineness = winner.tolerance === null ? (winner.stepsPerOrbit as number) : 1 / winner.tolerance;
    const finest =
      winner.tolerance === null
        ? (fineness * (winner.band?.from as number)) / (winner.band?.to as number)
        : 1 / (winner.band?.to as number);
    for (let i = 0; i < CELLS_EACH; i++) {
      const point = pointAt(context.fleet, 0, random(), 0);
      const startAnomalyDeg = Math.round(360 * random());
      const at = fineness * (finest / fineness) ** random();
      const cell = knob.cellAt(point, startAnomalyDeg, at, context.measurer.durationSeconds);
      const [reading] = await context.measurer.measure([{ sample: { point, startAnomalyDeg }, cell }]);
      expect(reading?.ratio, `${input} at ${JSON.stringify(cell)}`).toBeLessThanOrEqual(1);
    }
    if (winner.cliff?.reason === "fails beyond") {
      const beyond = knob.move(fineness / winner.cliff.ratio, 1 / knob.notch);
      const found = worst(await runFull(context, candidate, candidate.samples, beyond));
      expect(found.ratio, input).toBeGreaterThan(1);
    } else {
      expect(fineness / (winner.cliff?.ratio as number), input).toBeLessThanOrEqual(knob.coarsest * 1.0001);
    }
  }
  // Most random cases must qualify, or the test would say little.
  expect(chosen).toBeGreaterThan(SCENARIOS / 2);
});
