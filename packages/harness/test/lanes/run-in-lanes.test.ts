import { catalogue, findStepper, type Stepper } from "@perigauge/steppers";
import { describe, expect, it } from "vitest";
import { runsInLanes } from "../../src/lanes/lane-machine.ts";
import { runInLanes } from "../../src/lanes/run-in-lanes.ts";
import { CellPool } from "../../src/run/cell-pool.ts";
import type { CellJob } from "../../src/run/cell-task.ts";
import { runCell } from "../../src/run/run-cell.ts";
import { MEASURES, type MeasureName, type Score } from "../../src/score/score.ts";

const stepperOf = ({ cell }: CellJob): Stepper => findStepper(cell.stepper) as Stepper;
const every = new Set(MEASURES);

function scalar(job: CellJob, measures: ReadonlySet<MeasureName>): Score {
  return runCell(job.cell, stepperOf(job), { measures, summaries: "maxima", horizons: job.horizons });
}

/** Runs of one stepper that differ in everything: eccentricity, start, step, length, horizons, summation; coarse ones diverge. */
function jobsOf(stepper: string, finest: number): CellJob[] {
  const jobs: CellJob[] = [];
  for (const eccentricity of [0, 1e-3, 0.3, 0.56, 0.9, 0.99]) {
    for (const startAnomalyDeg of [0, 30, 180, -77.7]) {
      for (const stepsPerOrbit of [6.3, 20, 41.7, finest]) {
        jobs.push({
          cell: {
            stepper,
            eccentricity,
            stepsPerOrbit,
            orbits: 5 + startAnomalyDeg / 90,
            startAnomalyDeg,
            summation: startAnomalyDeg === 30 ? "compensated" : "plain",
          },
          horizons: eccentricity === 0.3 ? [] : [1.5, 3],
        });
      }
    }
  }
  return jobs;
}

/** The same for steps of unequal times; horizons close together, and one before the first step. */
function unevenJobsOf(stepper: Stepper): CellJob[] {
  const knobs =
    stepper.knob === "step"
      ? [{ stepsPerOrbit: 20 }, { stepsPerOrbit: 300.3 }, { stepsPerOrbit: 1201 }]
      : [{ tolerance: 1e-3 }, { tolerance: 1e-6, maxStep: 0.03 }, { tolerance: 3e-8 }];
  return [0, 1e-3, 0.3, 0.56, 0.9, 0.99].flatMap((eccentricity) =>
    [0, 30, 180, -77.7].flatMap((startAnomalyDeg) =>
      knobs.map((knob) => ({
        cell: {
          stepper: stepper.id,
          eccentricity,
          ...knob,
          orbits: 7 + startAnomalyDeg / 90,
          startAnomalyDeg,
          summation: "plain" as const,
        },
        horizons: eccentricity === 0.56 ? [] : [0.001, 1.5, 1.5001, 3],
      })),
    ),
  );
}

const inLanes = catalogue.filter(runsInLanes);
const fixed = inLanes.filter(({ uneven }) => !uneven);
const uneven = inLanes.filter((stepper) => stepper.uneven);

describe("cells in lanes", () => {
  it.each(fixed.map(({ id }) => [id]))("%s: digit for digit the scores of cells run alone", (id) => {
    const jobs = jobsOf(id, 700);
    const measures = every;
    const scores: Score[] = [];
    const left = runInLanes(jobs, stepperOf, measures, scores);
    expect(left.length).toBeLessThan(jobs.length / 2);
    // A cell alone takes long: each stepper is checked on every third, another third each time.
    const offset = fixed.findIndex((stepper) => stepper.id === id) % 3;
    jobs.forEach((job, i) => {
      if (left.includes(i) || i % 3 !== offset) return;
      expect(JSON.stringify(scores[i]), JSON.stringify(job)).toBe(JSON.stringify(scalar(job, measures)));
    });
  });

  it.each(uneven.map((stepper) => [stepper.id, stepper] as const))(
    "%s: digit for digit the scores of cells run alone, diverged ones left",
    (_, stepper) => {
      const jobs = unevenJobsOf(stepper);
      // Twice, so that the group is worth compiling for.
      const scores: Score[] = [];
      const left = runInLanes([...jobs, ...jobs], stepperOf, every, scores);
      expect(left.length).toBeLessThan(jobs.length / 2);
      jobs.forEach((job, i) => {
        if (i % 3 !== 1 && !left.includes(i)) return;
        const alone = scalar(job, every);
        if (left.includes(i)) expect(alone.ended.status).toBe("diverged");
        else expect(JSON.stringify(scores[i]), JSON.stringify(job)).toBe(JSON.stringify(alone));
      });
    },
  );

  it.each(MEASURES.map((name) => [name]))("%s by itself", (name) => {
    const measures = new Set([name]);
    const jobs = jobsOf("leapfrog", 900);
    const scores: Score[] = [];
    const left = runInLanes(jobs, stepperOf, measures, scores);
    jobs.forEach((job, i) => {
      if (!left.includes(i)) expect(JSON.stringify(scores[i])).toBe(JSON.stringify(scalar(job, measures)));
    });
  });

  it("ends of every kind are met, and met as by cells alone", () => {
    const jobs = jobsOf("rk4", 700);
    const scores: Score[] = [];
    const left = runInLanes(jobs, stepperOf, every, scores);
    const reasons = new Set(
      scores.map(({ ended }) => (ended.status === "diverged" ? ended.reason : ended.status)),
    );
    expect([...reasons]).toEqual(expect.arrayContaining(["completed", "escaped"]));
    expect(left.every((i) => !(i in scores))).toBe(true);
    const collisions: CellJob[] = Array.from({ length: 40 }, (_, i) => ({
      cell: {
        stepper: "explicit-midpoint",
        eccentricity: 0.9 + 0.0024 * i,
        stepsPerOrbit: 1000,
        orbits: 40,
        startAnomalyDeg: 180,
        summation: "plain",
      },
      horizons: [],
    }));
    const ends: Score[] = [];
    expect(runInLanes(collisions, stepperOf, every, ends)).toEqual([]);
    collisions.forEach((job, i) => {
      expect(JSON.stringify(ends[i])).toBe(JSON.stringify(scalar(job, every)));
    });
  });

  it("the order and the company of cells change nothing", () => {
    const jobs = jobsOf("yoshida-6", 700);
    const alone: Score[] = [];
    runInLanes(jobs, stepperOf, every, alone);
    const turned = jobs.toReversed();
    const scores: Score[] = [];
    runInLanes(turned, stepperOf, every, scores);
    const few: Score[] = [];
    runInLanes(jobs.slice(0, 5), stepperOf, every, few);
    jobs.forEach((_, i) => {
      expect(JSON.stringify(scores[jobs.length - 1 - i])).toBe(JSON.stringify(alone[i]));
    });
    few.forEach((score, i) => {
      expect(JSON.stringify(score)).toBe(JSON.stringify(alone[i]));
    });
  });

  it("a horizon shorter than a step is left to a run alone", () => {
    const [first] = jobsOf("rk4", 700);
    const job = { cell: (first as CellJob).cell, horizons: [0.01] };
    expect(runInLanes([job], stepperOf, every, [])).toEqual([0]);
  });
});

describe("the pool", () => {
  const jobs = ["leapfrog", "rk4", "dormand-prince-54", "sundman-rk4"].flatMap((id): CellJob[] =>
    Array.from({ length: 21 }, (_, i) => ({
      cell: {
        stepper: id,
        eccentricity: 0.04 * i,
        ...(id === "dormand-prince-54" ? { tolerance: 1e-7 } : { stepsPerOrbit: 300 + 7.3 * i }),
        orbits: 12,
        startAnomalyDeg: 17 * i,
        summation: "plain",
      },
      horizons: [2.5],
    })),
  );

  it("any number of workers gives the same scores in the order of the cells", async () => {
    const expected = jobs.map((job) => JSON.stringify(scalar(job, every)));
    for (const workers of [1, 2, 3]) {
      const pool = new CellPool({ workers });
      const scores = await pool.run(jobs, { measures: [...MEASURES], summaries: "maxima" });
      await pool.close();
      expect(scores.map((score) => JSON.stringify(score))).toEqual(expected);
    }
  });
});
