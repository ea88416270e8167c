import { afterEach, describe, expect, it, vi } from "vitest";
import type { CellJob } from "../../src/run/cell-task.ts";

const job: CellJob = {
  cell: {
    stepper: "rk4",
    eccentricity: 0.3,
    stepsPerOrbit: 600.3,
    orbits: 100,
    startAnomalyDeg: 20,
    summation: "plain",
  },
  horizons: [3],
};

afterEach(() => {
  vi.unstubAllGlobals();
  vi.restoreAllMocks();
  vi.resetModules();
});

describe("a host without vectors", () => {
  it("runs cells one by one, with the same scores, and says so once", async () => {
    const plan = { measures: ["energy", "phase", "timing"], summaries: "maxima" } as const;
    const withLanes = await import("../../src/run/cell-pool.ts");
    const expected = await new withLanes.CellPool({ workers: 1 }).run([job], plan);
    vi.resetModules();
    vi.stubGlobal("WebAssembly", undefined);
    const written: string[] = [];
    vi.spyOn(process.stderr, "write").mockImplementation((text) => {
      written.push(String(text));
      return true;
    });
    const { CellPool } = await import("../../src/run/cell-pool.ts");
    const { runInLanes } = await import("../../src/lanes/run-in-lanes.ts");
    const { findStepper } = await import("@perigauge/steppers");
    const scores = await new CellPool({ workers: 1 }).run([job], plan);
    await new CellPool({ workers: 1 }).run([job], plan);
    expect(written.filter((text) => text.startsWith("note: no WebAssembly vectors"))).toHaveLength(1);
    expect(scores).toEqual(expected);
    const stepper = findStepper("rk4");
    expect(stepper && runInLanes([job], () => stepper, new Set(plan.measures), [])).toEqual([0]);
  });
});
