import { LANES } from "@perigauge/steppers";
import { describe, expect, it } from "vitest";
import type { CellJob } from "../../src/run/cell-task.ts";
import { taskIndices } from "../../src/run/task-indices.ts";

const job = (stepper: string, stepsPerOrbit: number): CellJob => ({
  cell: { stepper, eccentricity: 0.3, stepsPerOrbit, orbits: 1000, startAnomalyDeg: 0, summation: "plain" },
  horizons: [],
});

describe("tasks", () => {
  it("hold every cell once, one stepper each, in whole blocks, the largest first", () => {
    const jobs = Array.from({ length: 150 }, (_, i) => job(i % 3 === 0 ? "rk4" : "leapfrog", 100 + i));
    const tasks = taskIndices(jobs, 2);
    expect(tasks.flat().toSorted((a, b) => a - b)).toEqual(jobs.map((_, i) => i));
    for (const task of tasks) expect(new Set(task.map((i) => jobs[i]?.cell.stepper)).size).toBe(1);
    expect(tasks.filter((task) => task.length % LANES !== 0).length).toBeLessThanOrEqual(2);
    const steps = tasks.map((task) =>
      task.reduce((sum, i) => sum + 1000 * (jobs[i]?.cell.stepsPerOrbit ?? 0), 0),
    );
    expect(steps).toEqual(steps.toSorted((a, b) => b - a));
  });

  it("a lone long task is dealt out among the threads", () => {
    const jobs = [job("rk4", 900), job("rk4", 901), job("rk4", 902)];
    expect(taskIndices(jobs, 2).map((task) => task.length)).toEqual([2, 1]);
    expect(taskIndices(jobs, 8).map((task) => task.length)).toEqual([1, 1, 1]);
  });
});
