import { describe, expect, it } from "vitest";
import { score } from "../support.ts";

/*
 * Leapfrog and velocity Verlet against the O(h^2) closed forms of their modified Hamiltonian along the unperturbed orbit (technique:
 * E. Hairer, C. Lubich, G. Wanner, Geometric Numerical Integration, 2nd ed., Springer 2006, ch. IX). The forms were verified by
 * computation in 45 digits. What is left is of relative size h^2 times a constant of the orbit; halving h shows it to fall fourfold, so
 * the Richardson value of two steps must agree to the next order.
 */
const apsisPerOrbit = (e: number): number => (-(Math.PI / 8) * (4 + e * e)) / (1 - e * e) ** 3;
const periodFrom = {
  leapfrog: (e: number): number => 1 / (8 * (1 - e) ** 3) - 1 / (24 * (1 - e * e) ** 1.5),
  "velocity-verlet": (e: number): number => (1 + 2 * e) / (8 * (1 - e) ** 4) - 1 / (24 * (1 - e * e) ** 1.5),
};
const energySpan = {
  leapfrog: (e: number): number => ((1 - e) ** -3 - (1 + e) ** -3) / 24,
  "velocity-verlet": (e: number): number => ((1 + 2 * e) / (1 - e) ** 4 - (1 - 2 * e) / (1 + e) ** 4) / 24,
};

/** Value at h -> 0 of a quantity with an error of order h^2, from steps h and h/2. */
function richardson(at: (stepsPerOrbit: number) => number, stepsPerOrbit: number): number {
  return (4 * at(2 * stepsPerOrbit) - at(stepsPerOrbit)) / 3;
}

describe.each(["leapfrog", "velocity-verlet"] as const)("%s on an eccentric orbit", (id) => {
  it.each([
    [0.1, 400],
    [0.3, 800],
    [0.6, 3200],
  ])("e = %s: apsidal precession, radial period and energy span meet their closed forms", (e, n) => {
    const h = (steps: number): number => (2 * Math.PI) / steps;
    // The relative error of a Richardson value is of order (h/(1-e)^(3/2))^4; 20 covers its constant for both schemes.
    const tolerance = 20 * (h(n) / (1 - e) ** 1.5) ** 4 + 1e-6;
    const run = (steps: number) => score({ stepper: id, eccentricity: e, stepsPerOrbit: steps, orbits: 2 });
    const apsis = richardson((steps) => (run(steps).apsis.final as number) / 2 / h(steps) ** 2, n);
    expect(Math.abs(apsis / apsisPerOrbit(e) - 1)).toBeLessThan(tolerance);
    const period = richardson((steps) => (run(steps).period.final as number) / h(steps) ** 2, n);
    expect(Math.abs(period / periodFrom[id](e) - 1)).toBeLessThan(tolerance);
    // Periapsis to apoapsis; energy is scored relative to |E0| = 1/2.
    const half = (steps: number) =>
      score({ stepper: id, eccentricity: e, stepsPerOrbit: steps, orbits: 0.5 });
    const span = richardson((steps) => (half(steps).energy.final as number) / 2 / h(steps) ** 2, n);
    expect(Math.abs(span / energySpan[id](e) - 1)).toBeLessThan(tolerance);
  });
});

describe("circular orbit", () => {
  // Started at speed 1 the mean longitude rate is 1 - h^2/3 for leapfrog in both forms, derived from the same closed forms at e = 0.
  it.each(["leapfrog", "velocity-verlet"])(
    "%s: phase drifts by -h^2/3 a unit time; passages are returns of the angle",
    (id) => {
      const n = 400;
      const h = (2 * Math.PI) / n;
      const { phase, timing, apsis } = score({ stepper: id, eccentricity: 0, stepsPerOrbit: n, orbits: 100 });
      // The longitude also oscillates, by 2 e = O(h^2) with the orbit: a fixed part beside a hundred orbits of drift.
      expect(phase.final as number).toBeCloseTo((-(h * h) / 3) * 200 * Math.PI, 3);
      expect((phase.driftPerOrbit as number) / ((-(h * h) / 3) * 2 * Math.PI)).toBeCloseTo(1, 3);
      expect((timing.driftPerOrbit as number) / ((h * h) / 3)).toBeCloseTo(1, 3);
      expect(apsis.max).toBeNull();
    },
  );

  // Secular energy change per step of rk4 on the exact circle: -h^6/72 (leading term, computed in 60 digits).
  it("rk4: energy falls by h^6/72 a step", () => {
    const n = 50;
    const h = (2 * Math.PI) / n;
    const { energy } = score({ stepper: "rk4", eccentricity: 0, stepsPerOrbit: n, orbits: 20 });
    const perOrbit = ((-(h ** 6) / 72) * n) / 0.5;
    // The next term is smaller by a constant times h^2 = 0.016.
    expect(Math.abs((energy.driftPerOrbit as number) / perOrbit - 1)).toBeLessThan(0.05);
  });
});
