import { describe, expect, it } from "vitest";
import { advanceTo, distance, energy, exactState, periapsis, runToEnd, stepper } from "./support/runs.ts";

describe("variable step", () => {
  it("lands on the end time exactly and keeps near its tolerance", () => {
    const run = stepper("dormand-prince-54").begin({
      state: periapsis(0.6),
      step: 0,
      tolerance: 1e-9,
      endTime: [6.25, 1e-17],
    });
    const { state, time, steps } = runToEnd(run, 4);
    expect(time).toEqual([6.25, 1e-17]);
    expect(run.evaluations).toBe(1 + 6 * (steps + run.rejectedSteps));
    expect(distance(state, exactState(0.6, 6.25))).toBeLessThan(1e-6);
    expect(run.smallestStep).toBeGreaterThan(0);
  });
  it("interpolates inside each step about as well as it steps", () => {
    const run = stepper("dormand-prince-54").begin({
      state: periapsis(0.3),
      step: 0,
      tolerance: 1e-8,
      endTime: [2, 0],
    });
    const rows = new Float64Array(4);
    const times = new Float64Array(2);
    let before = 0;
    const out = new Float64Array(4);
    while (run.advance(1, rows, times) === 1) {
      const t = (before + times[0]!) / 2;
      run.interpolate!(t, 0, out);
      expect(distance(out, exactState(0.3, t))).toBeLessThan(1e-6);
      before = times[0]!;
    }
  });
});

it("velocity Verlet makes one new evaluation a step, one at the start", () => {
  const run = stepper("velocity-verlet").begin({ state: periapsis(0.2), step: 0.01 });
  expect(run.evaluations).toBe(1);
  const end = advanceTo(run, 100, 4);
  expect(run.evaluations).toBe(101);
  expect(Math.abs(energy(end) + 0.5)).toBeLessThan(1e-4);
});
