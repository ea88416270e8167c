import { expect, it } from "vitest";
import { runCell } from "../../src/run/run-cell.ts";
import { FULL_PLAN } from "../../src/score/run-scorer.ts";
import { score, stepper } from "../support.ts";

it("rms weighs steps by the time around them: a fixed step, against a sum written out", () => {
  const cell = {
    stepper: "rk4",
    eccentricity: 0.4,
    stepsPerOrbit: 50.3,
    orbits: 3,
    startAnomalyDeg: 70,
    summation: "plain" as const,
  };
  const errors: number[] = [];
  const result = runCell(cell, stepper("rk4"), {
    ...FULL_PLAN,
    observe: ({ from, to, errors: found }) => errors.push(...found.energy.subarray(from, to)),
  });
  expect(errors).toHaveLength(result.steps);
  // Weights (t[k+1] - t[k-1])/2: h for every step but the last, which has half.
  const weights = errors.map((_, k) => (k === errors.length - 1 ? 0.5 : 1));
  const square = errors.reduce((sum, error, k) => sum + (weights[k] as number) * error * error, 0);
  const expected = Math.sqrt(square / weights.reduce((a, b) => a + b, 0));
  // Sums of 150 terms: 150 roundings at most.
  expect(Math.abs((result.energy.rms as number) / expected - 1)).toBeLessThan(150 * 2 ** -52);
});

it("the rms of a sampled sine is its amplitude over the square root of two", () => {
  // Leapfrog's energy error on a nearly circular orbit is a sine of the anomaly about its mean, from 0 at the start.
  const { energy } = score({ stepper: "leapfrog", eccentricity: 0.01, stepsPerOrbit: 400, orbits: 50 });
  // E(t) = A (1 - cos)/2 from periapsis: maximum A, mean square 3/8 A^2; the next harmonics are of relative size e.
  expect((energy.rms as number) / (energy.max as number) / Math.sqrt(3 / 8)).toBeCloseTo(1, 1);
});

it("a body late from periapsis still has a growth exponent of timing", () => {
  const { timing } = score({ stepper: "leapfrog", eccentricity: 0.3, stepsPerOrbit: 200.3, orbits: 256 });
  expect(timing.final as number).toBeGreaterThan(0);
  expect(Math.abs((timing.growthExponent as number) - 1)).toBeLessThan(0.15);
});

it("a passage that cannot be timed makes timing undefined instead of vanishing from its maximum", () => {
  const result = score({
    stepper: "gauss-legendre-2",
    eccentricity: 0.88,
    stepsPerOrbit: 225.607,
    orbits: 6,
    startAnomalyDeg: 100,
  });
  expect(result.timing.max).toBeNull();
  expect(result.phase.max as number).toBeGreaterThan(1);
});

it("a horizon shorter than one step keeps nothing, and later ones their own maxima", () => {
  const cell = {
    stepper: "rk4",
    eccentricity: 0.3,
    stepsPerOrbit: 100,
    orbits: 20,
    startAnomalyDeg: 0,
    summation: "plain" as const,
  };
  const { horizons } = runCell(cell, stepper("rk4"), { ...FULL_PLAN, horizons: [0.005, 1] });
  expect(horizons?.[0]?.maxima.phase?.max).toBeNull();
  expect(horizons?.[1]?.maxima.phase?.max).toBe(score({ ...cell, orbits: 1 }).phase.max);
});
