import { describe, expect, it } from "vitest";
import { behaviour, exponentInStep, score } from "./support.ts";

/*
 * Growth of the errors of energy H, angular momentum L and solution on the Kepler problem: E. Hairer, C. Lubich, G. Wanner, Geometric
 * Numerical Integration, 2nd ed., Springer 2006, table I.2.1:
 *
 *   explicit Euler       H O(t h)    L O(t h)   solution O(t^2 h)
 *   symplectic Euler     H O(h)      L 0        solution O(t h)
 *   implicit midpoint    H O(h^2)    L 0        solution O(t h^2)
 *   Stormer-Verlet       H O(h^2)    L 0        solution O(t h^2)
 *
 * The phase error stands for the error of the solution: it goes on growing where a distance would saturate at the size of the orbit.
 */
const AT_FLOOR = "starts within 20 times the rounding floor";

describe("explicit Euler (table I.2.1)", () => {
  it("grows as t in energy and angular momentum and as t^2 in phase", () => {
    const run = behaviour({
      stepper: "explicit-euler",
      eccentricity: 0.1,
      stepsPerOrbit: 100_000,
      orbits: 64,
    });
    const { growth, score: found } = run;
    // On the circle H = -1/2 (1 + 6ht)^(-1/3): the relative error x grows with local exponent 1 - 2x to first order in x.
    const bend = 2 * (found.energy.max as number) + 0.02;
    expect(Math.abs((growth.energy.growthExponent as number) - 1)).toBeLessThan(bend);
    expect(Math.abs((growth.angularMomentum.growthExponent as number) - 1)).toBeLessThan(bend);
    expect(Math.abs((growth.phase.growthExponent as number) - 2)).toBeLessThan(bend);
  });

  it("errs in proportion to h, e = 0.6", () => {
    const run = (stepsPerOrbit: number) =>
      score({ stepper: "explicit-euler", eccentricity: 0.6, stepsPerOrbit, orbits: 1 });
    const [coarse, fine] = [run(200_000), run(400_000)];
    for (const name of ["energy", "angularMomentum", "phase"] as const) {
      // The next order is smaller by the relative energy error, times the square of the periapsis rate over the mean motion, 25 here.
      const rest = 25 * (coarse.energy.max as number);
      expect(rest).toBeLessThan(0.1);
      const exponent = exponentInStep(coarse[name].final as number, fine[name].final as number);
      expect(Math.abs(exponent - 1), name).toBeLessThan(rest);
    }
  });

  // Derived: dL/dt = h L^-5 on the circle, so L = (1 + 6ht)^(1/6) and the phase gained is ((1 + 6ht)^(1/2) - 1)/(3h).
  it("spirals outward on the circle by the closed form", () => {
    const h = 1 / 4000;
    const t = 800;
    const { finalState, phase } = score({
      stepper: "explicit-euler",
      eccentricity: 0,
      step: h,
      orbits: (t + h / 2) / (2 * Math.PI),
    });
    const { x, y, vx, vy } = finalState;
    expect(finalState.t).toBeCloseTo(t, 9);
    // The closed form is the limit of a differential equation: the map differs from it by a relative h.
    const L = (1 + 6 * h * t) ** (1 / 6);
    expect(Math.abs((x * vy - y * vx) / L - 1)).toBeLessThan(h);
    const angle = (Math.sqrt(1 + 6 * h * t) - 1) / (3 * h);
    expect(Math.abs(((phase.final as number) + t) / angle - 1)).toBeLessThan(h);
  });
});

describe("symplectic and symmetric methods (table I.2.1), e = 0.6", () => {
  it.each([
    // Started at an apsis, the first-order part of symplectic Euler's modified energy vanishes: see below.
    ["symplectic-euler", 1, 1000.37, 90],
    ["symplectic-euler-dk", 1, 1000.37, 90],
    ["gauss-legendre-2", 2, 400.37, 0],
    ["velocity-verlet", 2, 400.37, 0],
    ["leapfrog", 2, 400.37, 0],
  ] as const)(
    "%s: energy bounded, O(h^%d); momentum kept; phase O(t h^p)",
    (id, p, stepsPerOrbit, startAnomalyDeg) => {
      const run = (n: number) =>
        behaviour({ stepper: id, eccentricity: 0.6, stepsPerOrbit: n, orbits: 128, startAnomalyDeg });
      const [coarse, fine] = [run(stepsPerOrbit), run(2 * stepsPerOrbit)];
      for (const { energyTrend, growth } of [coarse, fine]) {
        expect(energyTrend).toBe("bounded");
        // An orbit's largest energy error differs from another's by where the steps fall: 1% at most here.
        expect(Math.abs(growth.energy.growthExponent as number)).toBeLessThan(0.01);
        expect(growth.angularMomentum.reason).toBe(AT_FLOOR);
        const { growthExponent, growthStandardError } = growth.phase;
        expect(Math.abs((growthExponent as number) - 1)).toBeLessThan(0.02 + (growthStandardError as number));
      }
      // The next order of h, on an orbit whose rate at periapsis is five times the mean motion.
      const rest = 0.1;
      const energy = exponentInStep(coarse.score.energy.max as number, fine.score.energy.max as number);
      expect(Math.abs(energy - p)).toBeLessThan(rest);
      const drift = exponentInStep(
        coarse.score.phase.driftPerOrbit as number,
        fine.score.phase.driftPerOrbit as number,
      );
      expect(Math.abs(drift - p)).toBeLessThan(rest);
    },
  );

  // The O(h) part of its modified energy is proportional to q.p, which vanishes at an apsis (derived; measured at 40 to 80 orbits: 2.00).
  it("symplectic Euler from periapsis: the secular error is of order h^2", () => {
    const drift = (n: number) =>
      behaviour({ stepper: "symplectic-euler", eccentricity: 0.6, stepsPerOrbit: n, orbits: 128 }).score.phase
        .driftPerOrbit as number;
    expect(Math.abs(exponentInStep(drift(1000.37), drift(2000.74)) - 2)).toBeLessThan(0.05);
  });
});

/*
 * Linear against quadratic growth: M.P. Calvo, J.M. Sanz-Serna, SIAM J. Sci. Comput. 14 (1993) 936; B. Cano, J.M. Sanz-Serna, SIAM J. Numer.
 * Anal. 34 (1997) 1391; D. Estep, A. Stuart, ZAMP 46 (1995) 407. Exponents fitted over a factor of 32 in time are within 0.15 of theory
 * where a linear part still counts beside the quadratic one; steps are chosen coarse enough for the latter to lead.
 */
describe("one-step and multistep methods without geometry, e = 0.3", () => {
  it.each([
    ["heun-3", 300.37],
    ["rk4", 150.37],
    ["dormand-prince-5", 80.37],
    ["nystrom-5", 80.37],
    ["dormand-prince-8", 40.37],
    ["adams-bashforth-moulton-4", 300.37],
    ["bulirsch-stoer-8", 30.37],
    ["dormand-prince-54", 1e-7],
  ] as const)("%s: energy drifts as t, phase as t^2", (id, knob) => {
    const { energyTrend, growth } = behaviour({
      stepper: id,
      eccentricity: 0.3,
      orbits: 256,
      ...(knob < 1 ? { tolerance: knob } : { stepsPerOrbit: knob }),
    });
    expect(energyTrend).toBe("drifting");
    expect(Math.abs((growth.energy.growthExponent as number) - 1)).toBeLessThan(0.15);
    expect(Math.abs((growth.phase.growthExponent as number) - 2)).toBeLessThan(0.15);
  });
});

describe("symplectic methods of higher order, e = 0.3", () => {
  it.each([
    ["ruth-3", 100.37],
    ["forest-ruth-4", 200.37],
    ["mclachlan-4-five", 100.37],
    ["yoshida-6", 100.37],
    ["kahan-li-8", 60.37],
    ["gauss-legendre-4", 100.37],
    ["gauss-legendre-6", 40.37],
  ] as const)("%s: energy bounded, phase grows as t", (id, stepsPerOrbit) => {
    const { energyTrend, growth } = behaviour({ stepper: id, eccentricity: 0.3, stepsPerOrbit, orbits: 256 });
    expect(energyTrend).toBe("bounded");
    expect(Math.abs(growth.energy.growthExponent as number)).toBeLessThan(0.01);
    expect(Math.abs((growth.phase.growthExponent as number) - 1)).toBeLessThan(0.02);
  });
});
