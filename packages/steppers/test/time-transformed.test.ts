import { describe, expect, it } from "vitest";
import { arcs } from "./support/exact-arc.ts";
import { evaluateExactly, force, pairs } from "./support/interpret-double-double.ts";
import { stateError } from "./support/observed-order.ts";
import { distance, exactState, periapsis, programStepper, stepper } from "./support/runs.ts";

describe("logarithmic leapfrog (Mikkola & Tanikawa 1999; closed form derived and computed to 40 digits)", () => {
  it.each([0.1, 0.6, 0.9])("e = %d: on the exact ellipse, eccentric anomaly by 2 atan(s/2) a step", (e) => {
    const s = 0.1;
    const steps = 200;
    const rows = new Float64Array(4 * steps);
    const times = new Float64Array(2 * steps);
    stepper("logarithmic-leapfrog")
      .begin({ state: periapsis(e), step: s })
      .advance(steps, rows, times);
    for (let n = 1; n <= steps; n += 1) {
      const E = 2 * n * Math.atan(s / 2);
      const exact = [Math.cos(E) - e, Math.sqrt(1 - e * e) * Math.sin(E)];
      const state = rows.subarray(4 * n - 4, 4 * n);
      // Rounding: some ulps of the state a step, its error along the orbit growing with n^1.5 and larger by 1 / (1 - e) near periapsis.
      expect(distance(state.subarray(0, 2), exact)).toBeLessThan((1e-15 * n ** 1.5) / (1 - e));
      const time = times[2 * n - 2]! + times[2 * n - 1]!;
      expect(Math.abs(time - (n * s - e * Math.sin(E)))).toBeLessThan((1e-15 * n ** 1.5) / (1 - e));
    }
  });
  it("lags by s^2/12 of the time, whatever the eccentricity", () => {
    for (const e of [0.2, 0.95]) {
      const s = (2 * Math.PI) / 500;
      const rows = new Float64Array(4 * 500);
      const times = new Float64Array(1000);
      stepper("logarithmic-leapfrog")
        .begin({ state: periapsis(e), step: s })
        .advance(500, rows, times);
      const E = 2 * 500 * Math.atan(s / 2);
      const mean = E - e * Math.sin(E);
      const lag = (times[998]! - mean) / times[998]!;
      expect(Math.abs(lag / ((s * s) / 12) - 1)).toBeLessThan(1e-3);
    }
  });
});

it("logarithmic leapfrog goes back over its own steps, time included, in double-double arithmetic", () => {
  const { step, start } = programStepper("logarithmic-leapfrog").program({
    dimension: 2,
    summation: "plain",
    force,
  });
  let now = pairs(step.inputs);
  let next = pairs(step.inputs);
  evaluateExactly(start, [0.25, 0], arcs[1]!.start, now);
  const began = now.hi.slice();
  for (const h of [0.25, 0.25, 0.25, -0.25, -0.25, -0.25]) {
    evaluateExactly(step, [h, 0], now, next);
    [now, next] = [next, now];
  }
  now.hi.forEach((value, k) => {
    expect(Math.abs(value - began[k]!)).toBeLessThan(1e-28);
  });
  expect(stateError(now, arcs[1]!.start)).toBeLessThan(1e-28);
});

describe("Sundman steps", () => {
  it.each(["sundman-rk4", "sundman-dormand-prince-5", "sundman-dormand-prince-8"])(
    "%s serves eccentric orbits with even steps of eccentric anomaly",
    (id) => {
      const steps = 400;
      const rows = new Float64Array(4 * steps);
      const times = new Float64Array(2 * steps);
      stepper(id)
        .begin({ state: periapsis(0.9), step: (2 * Math.PI) / steps })
        .advance(steps, rows, times);
      const plainId = id.replace("sundman-", "");
      const plain = new Float64Array(4 * steps);
      const h = (2 * Math.PI) / steps;
      stepper(plainId)
        .begin({ state: periapsis(0.9), step: h })
        .advance(steps, plain);
      const at = steps / 2;
      const uneven = distance(rows.subarray(4 * at - 4, 4 * at), exactState(0.9, times[2 * at - 2]!));
      const even = distance(plain.subarray(4 * at - 4, 4 * at), exactState(0.9, at * h));
      expect(uneven).toBeLessThan(even / 20);
      // ds = dt / r is dE on an ellipse: time at the end of one turn is one period, to the method's error.
      expect(Math.abs(times[2 * steps - 2]! - 2 * Math.PI)).toBeLessThan(1e-4);
    },
  );
});

it("time-transformed steps are uneven, time reached and written to full precision", () => {
  const run = stepper("sundman-dormand-prince-8").begin({ state: periapsis(0.5), step: 0.01 });
  const rows = new Float64Array(4 * 1000);
  const times = new Float64Array(2000);
  run.advance(1000, rows, times);
  let largest = 0;
  for (let n = 0; n < 1000; n += 1) largest = Math.max(largest, Math.abs(times[2 * n + 1]!));
  expect(largest).toBeGreaterThan(0);
  const t = times[1998]! + times[1999]!;
  expect(distance(rows.subarray(3996), exactState(0.5, t))).toBeLessThan(1e-12);
});
