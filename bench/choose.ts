import { mkdtemp, rm } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { performance } from "node:perf_hooks";
import { fileURLToPath } from "node:url";
import { catalogue } from "@perigauge/steppers";
import { CellPool, chooseStepper, gatherEvidence, MEASURES, readScenario, writeReport } from "perigauge";

/** Time of the demo by phase; `scoring` is the share of a full-length run spent on scoring and not on stepping, for the chosen stepper. */
export interface ChooseBench {
  readonly seconds: Readonly<
    Record<"screening" | "search" | "verification" | "sensitivity" | "survey" | "report" | "total", number>
  >;
  readonly cells: number;
  readonly scoringShare: number;
}

export async function chooseBench(): Promise<ChooseBench> {
  const scenario = await readScenario(
    fileURLToPath(new URL("../packages/harness/scenarios/survey-satellites.json", import.meta.url)),
  );
  const pool = new CellPool();
  const folder = await mkdtemp(join(tmpdir(), "perigauge-bench-"));
  try {
    const began = performance.now();
    const run = await chooseStepper(scenario, {
      pool,
      steppers: catalogue,
      seed: 1,
      version: "bench",
      command: "bench",
      now: () => performance.now(),
    });
    const chosen = performance.now();
    const evidence = await gatherEvidence(run, pool, catalogue);
    const surveyed = performance.now();
    await writeReport(folder, evidence);
    const ended = performance.now();
    const { screening, search, verification, sensitivity } = run.choice.provenance.seconds;
    return {
      seconds: {
        screening,
        search,
        verification,
        sensitivity,
        survey: (surveyed - chosen) / 1000,
        report: (ended - surveyed) / 1000,
        total: (ended - began) / 1000,
      },
      cells: pool.cellsRun,
      scoringShare: await scoringShare(run.choice.choice ?? "rk4"),
    };
  } finally {
    await pool.close();
    await rm(folder, { recursive: true, force: true });
  }
}

/** One minus stepping alone over stepping with every measure, the least of five rounds of sixteen cells each. */
async function scoringShare(stepper: string): Promise<number> {
  const pool = new CellPool({ workers: 1 });
  const jobs = Array.from({ length: 16 }, (_, i) => ({
    cell: {
      stepper,
      eccentricity: 0.3 + 0.02 * i,
      stepsPerOrbit: 336.6,
      orbits: 100,
      startAnomalyDeg: 20 * i,
      summation: "plain" as const,
    },
    horizons: [],
  }));
  const time = async (measures: readonly (typeof MEASURES)[number][]): Promise<number> => {
    let least = Number.POSITIVE_INFINITY;
    for (let round = 0; round < 5; round++) {
      const from = performance.now();
      await pool.run(jobs, { measures, summaries: "maxima" });
      least = Math.min(least, performance.now() - from);
    }
    return least;
  };
  const scored = await time(MEASURES);
  const alone = await time([]);
  return 1 - alone / scored;
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const { seconds, cells, scoringShare: share } = await chooseBench();
  for (const [phase, value] of Object.entries(seconds)) {
    process.stdout.write(
      `${phase.padEnd(14)} ${value.toFixed(1).padStart(7)} s  ${((100 * value) / seconds.total).toFixed(0).padStart(3)} %\n`,
    );
  }
  process.stdout.write(
    `${cells} runs; scoring takes ${(100 * share).toFixed(0)} % of a run of the chosen stepper\n`,
  );
}
