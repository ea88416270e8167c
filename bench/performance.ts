import type { KeplerSpeed } from "./kepler.ts";
import type { KernelSpeed } from "./kernels.ts";
import type { Machine } from "./machine.ts";
import type { MemoryUse } from "./memory.ts";
import type { Timing } from "./rounds.ts";
import type { ScoringSpeed } from "./scoring.ts";
import type { StepperSpeed } from "./steppers.ts";
import type { SweepSpeed } from "./sweep.ts";
import type { VariableStepSpeed } from "./variable-step.ts";

/** All figures of one run of the bench. */
export interface Performance {
  readonly format: "perigauge-performance/1";
  readonly machine: Machine;
  readonly kernels: readonly KernelSpeed[];
  readonly scoring: readonly ScoringSpeed[];
  readonly variableStep: VariableStepSpeed;
  readonly sweep: SweepSpeed;
  readonly memory: MemoryUse;
  readonly kepler: KeplerSpeed;
  readonly steppers: readonly StepperSpeed[];
}

/** The figures as Markdown tables. */
export function describePerformance(performance: Performance): string {
  const { machine, kernels, scoring, variableStep, sweep, memory } = performance;
  const { library } = variableStep;
  return [
    "# Performance",
    "",
    `Measured in one run on ${machine.cores} cores of ${machine.processor}, Node ${machine.node}, ` +
      `${machine.compiler ?? "no C compiler"} (${machine.compilerFlags}); load average ${machine.load.toFixed(1)} as it began, so ` +
      "only ratios carry over. Times in nanoseconds; ± is half the distance between the best and the worst of five rounds.",
    "",
    "## One step of one planar trajectory",
    "",
    ...table(
      [
        "stepper",
        "C, scalar",
        "JavaScript",
        "16 lanes",
        "lanes against C",
        "JavaScript over C",
        "compensated over plain, lanes",
        "same bits",
      ],
      kernels.map((k) => [
        k.stepper,
        k.c === null ? "no compiler" : time(k.c),
        time(k.javaScript),
        time(k.lanes),
        k.lanesAgainstC === null ? "" : `${k.lanesAgainstC.toFixed(1)}x faster`,
        k.javaScriptAgainstC === null ? "" : k.javaScriptAgainstC.toFixed(2),
        k.compensatedAgainstPlain.toFixed(2),
        k.sameBits ? "yes" : "no",
      ]),
    ),
    "",
    "## Stepping and scoring at every step, 16 lanes, 100 orbits",
    "",
    ...table(
      [
        "stepper",
        "steps per orbit",
        "stepping",
        "three measures",
        "every measure",
        "every measure over stepping",
        "one by one",
        "lanes against one by one",
      ],
      scoring.map((s) => [
        s.stepper,
        `${s.stepsPerOrbit}`,
        time(s.stepping),
        time(s.threeMeasures),
        time(s.everyMeasure),
        s.everyAgainstStepping.toFixed(1),
        time(s.everyMeasureScalar),
        `${s.fasterThanScalar.toFixed(1)}x faster`,
      ]),
    ),
    "",
    "## Variable step",
    "",
    `${variableStep.cells} runs of ${variableStep.stepper}, e from 0 to 0.9, tolerances 1e-5 to 1e-10, 50 orbits, energy scored: ` +
      `${time(variableStep.lanes)} an accepted step in lanes, ${time(variableStep.scalar)} one by one: ${variableStep.fasterThanScalar.toFixed(1)}x faster.`,
    "",
    `Ten orbits of e = 0.3, end position: ${library.name} ${library.error.toExponential(1)} in ${library.microseconds.toFixed(0)} us; ` +
      `${library.stepper} ${library.stepperError.toExponential(1)} in ${library.scalarMicroseconds.toFixed(0)} us by itself ` +
      `(${library.scalarFaster.toFixed(1)}x faster) and ${library.lanesMicroseconds.toFixed(1)} us a trajectory in lanes (${library.lanesFaster.toFixed(0)}x faster).`,
    "",
    "## Whole sweep and memory",
    "",
    `${sweep.steppers} steppers, ${sweep.cells} cells, 100 orbits each, every measure at every step: ${(sweep.steps / 1e6).toFixed(1)} million steps, ` +
      `${(sweep.evaluations / 1e6).toFixed(0)} million force evaluations: ${sweep.secondsOneWorker.toFixed(1)} s in one thread, ` +
      `${sweep.secondsTwoWorkers.toFixed(1)} s in two (${sweep.twoWorkersFaster.toFixed(2)}x); ` +
      `processor time ${sweep.processorSecondsOneWorker.toFixed(1)} and ${sweep.processorSecondsTwoWorkers.toFixed(1)} s.`,
    "",
    ...table(
      ["orbits", "peak memory, MB", "seconds"],
      memory.runs.map((run) => [`${run.orbits}`, run.peakMegabytes.toFixed(0), run.seconds.toFixed(1)]),
    ),
    "",
    `(${memory.stepper}, ${memory.stepsPerOrbit} steps per orbit, every measure and summary, one process with its TypeScript loader.)`,
    "",
  ].join("\n");
}

function time({ nanoseconds, spread }: Timing): string {
  return `${nanoseconds.toFixed(1)} ± ${(50 * spread).toFixed(0)} %`;
}

function table(head: readonly string[], rows: readonly (readonly string[])[]): string[] {
  const line = (cells: readonly string[]): string => `| ${cells.join(" | ")} |`;
  return [line(head), line(head.map(() => "---")), ...rows.map(line)];
}
