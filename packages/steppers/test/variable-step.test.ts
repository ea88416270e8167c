import { describe, expect, it } from "vitest";
import { type Acceleration, catalogue, InvalidInputError } from "../src/index.ts";
import { makeController, power64 } from "../src/run/controller.ts";
import { distance, energy, exactState, periapsis, runToEnd, stepper } from "./support/runs.ts";

const variable = catalogue
  .filter(({ knob }) => knob === "tolerance")
  .map((found) => [found.id, found] as const);

describe("every variable-step stepper", () => {
  it.each(variable)("%s lands on the end time exactly, its error following the tolerance", (id, found) => {
    const errors = [1e-8, 1e-10, 1e-12].map((tolerance) => {
      const run = found.begin({ state: periapsis(0.6), step: 0, tolerance, endTime: [6.25, 1e-17] });
      const { state, time } = runToEnd(run, 4);
      expect(time).toEqual([6.25, 1e-17]);
      return distance(state, exactState(0.6, 6.25));
    });
    // One orbit: local errors of the tolerance at tens to thousands of steps, through a periapsis that stretches them tenfold or more.
    [1e-8, 1e-10, 1e-12].forEach((tolerance, i) => {
      expect(errors[i]!, `${id} at ${tolerance}`).toBeLessThan(1e4 * tolerance);
    });
    // A hundredfold tolerance buys at least a fivefold error (order 2 of 3(2) gives the power 2/3 and more), down to rounding.
    expect(errors[2]!).toBeLessThan(Math.max(errors[0]! / 25, 1e-12));
  });

  it.each(variable)(
    "%s counts its evaluations, rejected trials included, for a supplied force",
    (_, found) => {
      let calls = 0;
      const acceleration: Acceleration = (q, out) => {
        calls += 1;
        const r2 = q[0]! * q[0]! + q[1]! * q[1]! + q[2]! * q[2]!;
        const w = -1 / (r2 * Math.sqrt(r2));
        for (let k = 0; k < 3; k += 1) out[k] = q[k]! * w;
      };
      const options = { state: periapsis(0.9, 3), step: 0, tolerance: 1e-3, endTime: [20, 0] as const };
      const supplied = found.begin({ ...options, acceleration });
      const end = runToEnd(supplied, 6);
      expect(supplied.evaluations).toBe(calls);
      const own = found.begin(options);
      const same = runToEnd(own, 6);
      expect([...end.state], "the supplied point mass is the built-in one").toEqual([...same.state]);
      expect(own.evaluations).toBe(calls);
      expect(own.rejectedSteps).toBe(supplied.rejectedSteps);
      expect(own.rejectedSteps).toBeGreaterThan(0);
      expect(own.smallestStep).toBeGreaterThan(0);
      expect(own.smallestStep).toBeLessThan(20 / same.steps);
    },
  );

  it.each(variable)("%s writes what is not finite as it comes, and ends", (_, found) => {
    const state = periapsis(0.5);
    state[0] = Number.NaN;
    const run = found.begin({ state, step: 0, tolerance: 1e-6, endTime: [1, 0] });
    const rows = new Float64Array(40);
    const steps = run.advance(10, rows, new Float64Array(20));
    expect(steps).toBeGreaterThan(0);
    expect(rows[0]).toBeNaN();
  });

  it.each(variable)("%s makes one step where the end is nearer than a first step", (_, found) => {
    const run = found.begin({ state: periapsis(0), step: 0, tolerance: 1e-6, endTime: [1e-6, 0] });
    expect(runToEnd(run, 4).steps).toBe(1);
    expect(run.smallestStep).toBe(1e-6);
  });
});

describe("a longest step", () => {
  it.each(variable)("%s makes none longer, and still lands on the end", (_, found) => {
    const maxStep = 0.01;
    const start = { state: periapsis(0.3), step: 0, tolerance: 1e-4, endTime: [0.995, 0] as const, maxStep };
    const run = found.begin(start);
    const rows = new Float64Array(4 * 1000);
    const times = new Float64Array(2000);
    const steps = run.advance(1000, rows, times);
    expect(steps).toBeGreaterThanOrEqual(100);
    expect(times[2 * steps - 2]).toBe(0.995);
    let before = 0;
    for (let n = 0; n < steps; n += 1) {
      // Differences of times near 1 are rounded in their last place.
      expect(times[2 * n]! - before).toBeLessThanOrEqual(maxStep + 2 ** -52);
      before = times[2 * n]!;
    }
    expect(() => found.begin({ ...start, maxStep: 0 })).toThrow("start.maxStep");
  });
});

describe("dense output", () => {
  const dense = variable.filter(([, found]) => found.denseOutput);
  it.each(dense)(
    "%s: inside its steps about as good as at their ends, continuous, nowhere else",
    (id, found) => {
      const tolerance = 1e-9;
      const run = found.begin({ state: periapsis(0.5), step: 0, tolerance, endTime: [7, 0] });
      const rows = new Float64Array(4);
      const times = new Float64Array(2);
      const out = new Float64Array(4);
      let before = 0;
      let worst = 0;
      while (run.advance(1, rows, times) === 1) {
        for (const theta of [0.1, 0.35, 0.5, 0.8]) {
          const t = before + theta * (times[0]! - before);
          run.interpolate!(t, 0, out);
          worst = Math.max(worst, distance(out, exactState(0.5, t)));
        }
        run.interpolate!(times[0]!, times[1]!, out);
        expect(distance(out, rows)).toBeLessThan(1e-12);
        const outside = times[0]! + 1;
        expect(() => run.interpolate!(outside, 0, out)).toThrow(InvalidInputError);
        before = times[0]!;
      }
      // Between steps the order is lower than at their ends: the fourth root of the tolerance may go.
      expect(worst, id).toBeLessThan(1e-4);
    },
  );
});

describe("step control", () => {
  it("power64 is x^(m/64) to 2^-48", () => {
    for (const x of [1e-12, 0.003, 0.5, 1, 7, 1e9]) {
      for (let m = 0; m <= 64; m += 1) {
        const exact = x ** (m / 64);
        expect(Math.abs(power64(x, m) - exact)).toBeLessThanOrEqual(2 ** -48 * exact);
      }
    }
  });
  it("keeps its factors within bounds and does not grow after a rejection", () => {
    const control = makeController(4);
    expect(control.accepted(0, false)).toBe(5);
    expect(control.accepted(1, true)).toBeLessThanOrEqual(1);
    expect(control.accepted(1e-9, true)).toBe(1);
    expect(control.rejected(Number.POSITIVE_INFINITY)).toBe(0.2);
    expect(control.rejected(2)).toBeLessThan(0.9);
  });
});

describe("wrong use", () => {
  const pair = stepper("dormand-prince-54");
  const good = { state: periapsis(0.1), step: 0, tolerance: 1e-6, endTime: [1, 0] as const };
  it.each([
    ["no tolerance", { ...good, tolerance: 0 }],
    ["tolerance not a number", { ...good, tolerance: Number.NaN }],
    ["tolerance of 1", { ...good, tolerance: 1 }],
    ["end in the past", { ...good, endTime: [-1, 0] as const }],
    ["no end", { ...good, endTime: [Number.POSITIVE_INFINITY, 0] as const }],
    ["compensated summation", { ...good, summation: "compensated" as const }],
    ["state of five numbers", { ...good, state: new Float64Array(5) }],
  ])("%s", (_, start) => {
    expect(() => pair.begin(start)).toThrow(InvalidInputError);
  });
  it("rows or times too short", () => {
    const run = pair.begin(good);
    expect(() => run.advance(2, new Float64Array(4), new Float64Array(4))).toThrow("advance.rows");
    expect(() => run.advance(2, new Float64Array(8))).toThrow("advance.times");
  });
});

it("a circular orbit is as round as its tolerance", () => {
  const run = stepper("dormand-nystrom-1210").begin({
    state: periapsis(0),
    step: 0,
    tolerance: 1e-12,
    endTime: [100, 0],
  });
  expect(Math.abs(energy(runToEnd(run, 4).state) + 0.5)).toBeLessThan(1e-10);
});
