import { writeFileSync } from "node:fs";
import { keplerBench } from "./kepler.ts";
import { kernelsBench } from "./kernels.ts";
import { machine } from "./machine.ts";
import { memoryBench } from "./memory.ts";
import { describePerformance, type Performance } from "./performance.ts";
import { scoringBench } from "./scoring.ts";
import { steppersBench } from "./steppers.ts";
import { sweepBench } from "./sweep.ts";
import { variableStepBench } from "./variable-step.ts";

// Every part in turn, then reports/performance.json and reports/performance.md. Choosing has a bench of its own: choose.ts.

const part = async <T>(name: string, run: () => Promise<T> | T): Promise<T> => {
  process.stderr.write(`${name}\n`);
  return run();
};

const figures: Performance = {
  format: "perigauge-performance/1",
  machine: machine(),
  kernels: await part("kernels", kernelsBench),
  scoring: await part("scoring", scoringBench),
  variableStep: await part("variable step", variableStepBench),
  steppers: await part("emitted steps", () => steppersBench()),
  kepler: await part("exact orbits", () => keplerBench()),
  sweep: await part("sweep", sweepBench),
  memory: await part("memory", memoryBench),
};
const place = (name: string): URL => new URL(`../reports/${name}`, import.meta.url);
writeFileSync(place("performance.json"), `${JSON.stringify(figures, null, 2)}\n`);
writeFileSync(place("performance.md"), describePerformance(figures));
process.stdout.write(describePerformance(figures));
