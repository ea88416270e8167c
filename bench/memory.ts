import { execFileSync } from "node:child_process";
import { fileURLToPath } from "node:url";
import { findStepper, type Stepper } from "@perigauge/steppers";
import { FULL_PLAN, runCell } from "perigauge";

/** Peak memory of a process that runs and scores one cell, for two lengths. */
export interface MemoryUse {
  readonly stepper: string;
  readonly stepsPerOrbit: number;
  readonly runs: readonly {
    readonly orbits: number;
    readonly peakMegabytes: number;
    readonly seconds: number;
  }[];
}

const STEPPER = "velocity-verlet";
const STEPS_PER_ORBIT = 30.3;

export function memoryBench(): MemoryUse {
  return {
    stepper: STEPPER,
    stepsPerOrbit: STEPS_PER_ORBIT,
    runs: [1e4, 1e6].map((orbits) => {
      const file = fileURLToPath(import.meta.url);
      const output = execFileSync(process.execPath, [...process.execArgv, file, "run", `${orbits}`], {
        encoding: "utf8",
      });
      return { orbits, ...(JSON.parse(output) as { peakMegabytes: number; seconds: number }) };
    }),
  };
}

function runOne(orbits: number): { peakMegabytes: number; seconds: number } {
  const from = performance.now();
  const cell = {
    ...{ stepper: STEPPER, eccentricity: 0.1, stepsPerOrbit: STEPS_PER_ORBIT, orbits },
    ...{ startAnomalyDeg: 0, summation: "plain" as const },
  };
  runCell(cell, findStepper(STEPPER) as Stepper, FULL_PLAN);
  return {
    peakMegabytes: process.resourceUsage().maxRSS / 1024,
    seconds: (performance.now() - from) / 1000,
  };
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const result = process.argv[2] === "run" ? runOne(Number(process.argv[3])) : memoryBench();
  process.stdout.write(`${JSON.stringify(result)}\n`);
}
