import { describe, expect, it } from "vitest";
import { score } from "./support.ts";

/*
 * Passage times by the Kepler flow of the last step before periapsis. At whole N the passages of a symmetric method fall on steps by
 * symmetry, which hides the interpolation; at N + 1/2 they fall between. The expected orders are those of the methods: the exact flow
 * must not limit them, where a cubic would limit order 4 and a quintic order 6.
 */
const timing = (id: string, n: number): number =>
  score({ stepper: id, eccentricity: 0.3, stepsPerOrbit: n + 0.5, orbits: 2.25, summation: "compensated" })
    .timing.max as number;

describe("timing at N + 1/2, e = 0.3", () => {
  it.each([
    ["leapfrog", 2, 400],
    ["velocity-verlet", 2, 400],
    ["gauss-legendre-2", 2, 400],
    ["forest-ruth-4", 4, 200],
    ["suzuki-4", 4, 100],
    ["gauss-legendre-4", 4, 100],
    ["yoshida-6", 6, 120],
    ["yoshida-6-kdk", 6, 120],
    ["gauss-legendre-6", 6, 60],
    ["yoshida-8", 8, 160],
    ["kahan-li-8-kdk", 8, 60],
    ["suzuki-umeno-8", 8, 30],
  ] as const)("%s: order %d", (id, p, n) => {
    const [coarse, fine] = [timing(id, n), timing(id, 2 * n)];
    const order = Math.log(coarse / fine) / Math.log((2 * n + 0.5) / (n + 0.5));
    // Next order h^2 in a symmetric method; 5% of the order is what yoshida-8, the slowest to settle, still bends by at these steps.
    expect(Math.abs(order - p)).toBeLessThan(0.05 * p);
    expect(fine).toBeGreaterThan(1e-14);
  });

  it.each([
    ["heun-3", 3, 200],
    ["rk4", 4, 200],
    ["dormand-prince-5", 5, 150],
    ["verner-6-1978", 6, 150],
    ["stormer-extrapolation-8", 8, 26],
    ["bulirsch-stoer-10", 10, 18],
    ["bulirsch-stoer-12", 12, 14],
    ["stormer-extrapolation-12", 12, 16],
    ["dormand-nystrom-12", 12, 12],
  ] as const)("%s, not symmetric: at least order %d", (id, p, n) => {
    const [coarse, fine] = [timing(id, n), timing(id, 1.5 * n)];
    const order = Math.log(coarse / fine) / Math.log((1.5 * n + 0.5) / (n + 0.5));
    // From p to p + 1: the secular energy change is of the higher order, with half an order of bend on either side at steps so coarse.
    expect(order).toBeGreaterThan(p - 0.5);
    expect(order).toBeLessThan(p + 1.5);
  });
});

describe("timing of the logarithmic leapfrog", () => {
  /*
   * S. Mikkola, K. Tanikawa, Celest. Mech. Dyn. Astron. 74 (1999) 287; M. Preto, S. Tremaine, Astron. J. 118 (1999) 2532: exactly on the
   * conic. Derived: the eccentric anomaly advances by 2 atan(s/2) a step and the mean anomaly lags by s - 2 atan(s/2), at any e.
   */
  it.each([0.1, 0.5, 0.9])("e = %s: path exact to rounding, lag s - 2 atan(s/2) a step, of order 2", (e) => {
    const run = (n: number) =>
      score({ stepper: "logarithmic-leapfrog", eccentricity: e, stepsPerOrbit: n, orbits: 20 });
    const order = (name: "timing" | "position") => {
      const [coarse, fine] = [run(100)[name].max as number, run(200)[name].max as number];
      return Math.log2(coarse / fine);
    };
    const n = 100;
    const found = run(n);
    const s = (2 * Math.PI) / n;
    // Three times the rounding walk of 2000 steps and of one evaluation of the energy, both where the kinetic energy is (1 + e)/(1 - e) of |E0|.
    expect(found.energy.max as number).toBeLessThan(
      (3 * 1.5e-16 * Math.sqrt(2000) * (1 + e)) / (1 - e) + (4 * 2 ** -53 * (3 + e)) / (1 - e),
    );
    expect(found.apsis.max as number).toBeLessThan(1e-13 / e);
    // Passage 19 of the run follows after floor(19 pi / atan(s/2)) whole steps; from there the exact flow leads to it without lag.
    const lag = s - 2 * Math.atan(s / 2);
    const steps = Math.floor((19 * Math.PI) / Math.atan(s / 2));
    // Three times the rounding budget of the longitude, 2 u t sqrt(steps), in periods.
    const rounding = 3 * 2 * 2 ** -53 * 20 * Math.sqrt(2000);
    const lateness = (steps * lag) / (2 * Math.PI);
    expect(Math.abs((found.timing.final as number) / lateness - 1)).toBeLessThan(rounding / lateness);
    expect(Math.abs(order("timing") - 2)).toBeLessThan(s ** 2);
  });
});
