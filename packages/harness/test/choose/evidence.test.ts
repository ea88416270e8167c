import { describe, expect, it } from "vitest";
import { makeCandidate } from "../../src/choose/candidate.ts";
import type { ChoiceRun } from "../../src/choose/choose-stepper.ts";
import { OrbitByOrbit } from "../../src/choose/evidence/orbit-by-orbit.ts";
import { survey } from "../../src/choose/evidence/survey.ts";
import { CellPool } from "../../src/run/cell-pool.ts";
import { runCell } from "../../src/run/run-cell.ts";
import { FULL_PLAN } from "../../src/score/run-scorer.ts";
import type { Cell } from "../../src/score/score.ts";
import { stepper } from "../support.ts";
import { contextOf, scenarioOf } from "./context.ts";

const LIMIT_RAD = 1e-4;
const CELL: Cell = {
  stepper: "rk4",
  eccentricity: 0.4,
  stepsPerOrbit: 150.5,
  orbits: 40,
  startAnomalyDeg: 30,
  summation: "plain",
};

/** As much of a search as the survey reads: two candidates, none ranked. */
function runOf(orbits: number): ChoiceRun {
  const context = contextOf(scenarioOf({ limits: [{ phaseRad: LIMIT_RAD }], duration: { orbits } }, 0.4));
  const tried = ["rk4", "dormand-prince-54"].map((id) => ({
    candidate: makeCandidate(stepper(id), context),
    screening: { tried: [], estimate: null, order: 0 },
  }));
  const choice = { choice: null, current: null, ranking: [], excluded: [] };
  return { context, tried, choice } as unknown as ChoiceRun;
}

const surveyOf = (orbits: number): ReturnType<typeof survey> =>
  survey(runOf(orbits), new CellPool({ workers: 1 }), [stepper("rk4"), stepper("dormand-prince-54")]);

describe("evidence of single orbits", () => {
  it("has the same largest period error as the score, and the energy of the first orbit only", () => {
    const single = new OrbitByOrbit(CELL.orbits);
    const score = runCell(CELL, stepper("rk4"), {
      ...FULL_PLAN,
      observePassage: (passage) => single.acceptPassage(passage),
      observe: ({ chunk, from, to, errors }) => {
        for (let i = from; i < to; i++) {
          const orbit = (chunk.firstStep + i) / 150.5;
          if (orbit <= 1) single.acceptEnergy(orbit, errors.energy[i]!);
        }
      },
    });
    const sizes = single.periods.map(({ periodRelative }) => Math.abs(periodRelative));
    expect(Math.max(...sizes)).toBe(score.period.max);
    // Forty orbits from 30 degrees past periapsis pass it forty times: 39 periods.
    expect(single.periods).toHaveLength(39);
    const { points, periapsisAtOrbit } = single.oscillation();
    expect(points).toHaveLength(150);
    expect(periapsisAtOrbit).toBeGreaterThan(0.9);
    expect(periapsisAtOrbit).toBeLessThan(1);
  });

  it("is thinned over long runs", () => {
    const single = new OrbitByOrbit(4000);
    for (let k = 1; k <= 4000; k++) single.acceptPassage({ atOrbit: k, timing: 1e-6 * k });
    expect(single.periods.length).toBeLessThanOrEqual(400);
    expect(single.periods.length).toBeGreaterThan(390);
    // Differences of neighbouring passages though only every tenth is kept; timings near 4e-3 are rounded to 5e-19.
    for (const { periodRelative } of single.periods)
      expect(Math.abs(periodRelative - 1e-6)).toBeLessThan(1e-18);
  });
});

describe("survey", () => {
  it("gives variable-step runs the steps per orbit that they took", async () => {
    const { againstStep } = await surveyOf(10);
    const point = againstStep.find(({ tolerance }) => tolerance === 1e-8)!;
    const { eccentricity, tolerance } = point;
    const cell: Cell = {
      stepper: point.stepper,
      eccentricity,
      tolerance: tolerance!,
      orbits: 10,
      startAnomalyDeg: 30,
      summation: "plain",
    };
    expect(point.meanStepsPerOrbit).toBe(runCell(cell, stepper(point.stepper), FULL_PLAN).steps / 10);
    expect(againstStep.find(({ stepper: id }) => id === "rk4")!.meanStepsPerOrbit).toBeUndefined();
  }, 60_000);

  it("covers the plane with steps only; over ten orbits the ratio is the run's own error over the limit", async () => {
    const { plane } = await surveyOf(10);
    expect(plane!.steppers).toEqual(["rk4"]);
    expect(plane!.cells).toHaveLength(81);
    const cell = plane!.cells.find(
      ({ eccentricity, stepsPerOrbit }) => eccentricity === 0.3 && stepsPerOrbit === 160.3,
    )!;
    const { phase } = runCell(
      { ...CELL, eccentricity: 0.3, stepsPerOrbit: 160.3, orbits: 10 },
      stepper("rk4"),
      FULL_PLAN,
    );
    expect(cell.phase).toBe(phase.max);
    expect(cell.ratio).toBe(phase.max! / LIMIT_RAD);
    expect(cell.command).toContain("--steps-per-orbit 160.3");
  }, 60_000);

  it("carries the ratio on to longer durations by a power between 0 and 2", async () => {
    const [short, long] = [(await surveyOf(10)).plane!, (await surveyOf(100)).plane!];
    long.cells.forEach((cell, i) => {
      const before = short.cells[i]!.ratio;
      if (before === null || cell.ratio === null) return;
      // 100 times at most; a rounding of the power and of the product beyond.
      expect(cell.ratio / before).toBeGreaterThanOrEqual(1 - 1e-14);
      expect(cell.ratio / before).toBeLessThanOrEqual(100 * (1 + 1e-14));
    });
    expect(long.cells.filter(({ ratio }) => ratio !== null).length).toBeGreaterThan(40);
  }, 60_000);
});
