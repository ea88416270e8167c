import { fileURLToPath } from "node:url";
import { catalogue } from "@perigauge/steppers";
import { type Cell, CellPool, MEASURES } from "perigauge";
import { processorTime } from "./rounds.ts";

/** A whole sweep: steppers x eccentricities x step sizes, 100 orbits each, every measure at every step. */
export interface SweepSpeed {
  readonly steppers: number;
  readonly cells: number;
  readonly steps: number;
  readonly evaluations: number;
  readonly secondsOneWorker: number;
  readonly secondsTwoWorkers: number;
  readonly twoWorkersFaster: number;
  /** Processor time of all threads, which other work on the machine leaves alone: two workers cost as much as one where this is equal. */
  readonly processorSecondsOneWorker: number;
  readonly processorSecondsTwoWorkers: number;
}

interface SweepRun {
  readonly seconds: number;
  readonly processorSeconds: number;
  readonly steps: number;
  readonly evaluations: number;
}

const STEPPERS = 25;
const ECCENTRICITIES = Array.from({ length: 10 }, (_, i) => 0.09 * i + 0.05);
/** 24 to 1100 steps per orbit, none of them whole. */
const STEPS_PER_ORBIT = Array.from({ length: 12 }, (_, i) => Math.round(24 * 2 ** (i / 2)) + 0.3);

export async function sweepBench(): Promise<SweepSpeed> {
  const steppers = catalogue.filter(({ knob, uneven }) => knob === "step" && !uneven).slice(0, STEPPERS);
  const jobs = steppers.flatMap(({ id }) =>
    ECCENTRICITIES.flatMap((eccentricity) =>
      STEPS_PER_ORBIT.map((stepsPerOrbit) => ({
        cell: {
          ...{ stepper: id, eccentricity, stepsPerOrbit, orbits: 100, startAnomalyDeg: 0 },
          summation: "plain",
        } satisfies Cell,
        horizons: [],
      })),
    ),
  );
  const run = async (workers: number): Promise<SweepRun> => {
    const pool = new CellPool({ workers });
    // Workers are started and kernels compiled before the clock runs.
    await pool.run(jobs, { measures: MEASURES, summaries: "maxima" });
    const from = performance.now();
    const spent = processorTime();
    const scores = await pool.run(jobs, { measures: MEASURES, summaries: "maxima" });
    const seconds = (performance.now() - from) / 1000;
    const processorSeconds = (processorTime() - spent) / 1e9;
    await pool.close();
    const sum = (of: (score: (typeof scores)[number]) => number): number =>
      scores.reduce((total, score) => total + of(score), 0);
    return {
      seconds,
      processorSeconds,
      steps: sum(({ steps }) => steps),
      evaluations: sum(({ evaluations }) => evaluations),
    };
  };
  const one = await run(1);
  const two = await run(2);
  return {
    steppers: steppers.length,
    cells: jobs.length,
    steps: one.steps,
    evaluations: one.evaluations,
    secondsOneWorker: one.seconds,
    secondsTwoWorkers: two.seconds,
    twoWorkersFaster: one.seconds / two.seconds,
    processorSecondsOneWorker: one.processorSeconds,
    processorSecondsTwoWorkers: two.processorSeconds,
  };
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  process.stdout.write(`${JSON.stringify(await sweepBench())}\n`);
}
