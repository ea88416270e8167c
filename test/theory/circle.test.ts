import { describe, expect, it } from "vitest";
import { score, stepper } from "./support.ts";

describe("velocity Verlet on its discrete circle", () => {
  /*
   * Derived: a body started at r = 1 with speed sqrt(1 - h^2/4) stays on the circle exactly and turns by theta with sin(theta/2) = h/2 each
   * step, the angle of the recursion x[k+1] - 2 x[k] + x[k-1] = -h^2 x[k]. At h = 0.1 theta is 0.1000417136115400293255 (computed at 40
   * digits).
   */
  it.each([0.01, 0.1, 0.5, 1])("h = %s: sin(theta/2) = h/2 and r = 1, over a thousand steps", (h) => {
    const rows = new Float64Array(4000);
    const state = Float64Array.of(1, 0, 0, Math.sqrt(1 - (h * h) / 4));
    stepper("velocity-verlet").begin({ state, step: h }).advance(1000, rows);
    let [px, py] = [1, 0];
    for (let k = 0; k < 1000; k++) {
      const [x, y] = [rows[4 * k]!, rows[4 * k + 1]!];
      // Rounding walks by an ulp a step or so and the angle adds it up: some k^(3/2) u.
      const tolerance = 8 * 2 ** -53 * (k + 4) ** 1.5;
      expect(Math.abs(Math.sqrt(x * x + y * y) - 1)).toBeLessThan(tolerance);
      // Chord of one step: 2 sin(theta/2) = h.
      expect(Math.abs(Math.sqrt((x - px) ** 2 + (y - py) ** 2) - h)).toBeLessThan(tolerance);
      [px, py] = [x, y];
    }
  });

  it("h = 0.1: theta as computed at 40 digits", () => {
    const rows = new Float64Array(4);
    const state = Float64Array.of(1, 0, 0, Math.sqrt(1 - 0.01 / 4));
    stepper("velocity-verlet").begin({ state, step: 0.1 }).advance(1, rows);
    expect(Math.atan2(rows[1]!, rows[0]!)).toBeCloseTo(0.10004171361154003, 15);
  });
});

/*
 * Secular energy change C h^q a step on the circle r = 1 (computed at 60 to 150 digits; the fractions are exact), seen through the scores:
 * the drift per orbit, relative to |E0| = 1/2, is 2 N C h^q. Started at speed 1 the numerical orbit is eccentric by some h^p, which changes
 * the drift by a relative h^2 or so, as the next term of the method does: two steps and one extrapolation leave h^3.
 */
describe("secular energy change on the circle", () => {
  it.each([
    ["explicit-midpoint", 1 / 16, 4, 400],
    ["heun-2", 1 / 4, 4, 400],
    ["ralston-2", 1 / 12, 4, 400],
    ["rk4", -1 / 72, 6, 100],
    ["kutta-38", -1 / 24, 6, 100],
    ["cash-karp-5", -121 / 115200, 6, 100],
    ["dormand-prince-5", 1 / 3600, 6, 100],
    ["nystrom-4", -1 / 288, 6, 100],
    ["nystrom-5", 1 / 1800, 6, 100],
    ["dormand-nystrom-4", -277 / 466560, 6, 100],
    ["verner-6-1978", 0.000393850488085, 8, 50],
  ] as const)("%s: %d h^%d", (id, constant, q, n) => {
    const at = (stepsPerOrbit: number) => {
      const h = (2 * Math.PI) / stepsPerOrbit;
      const { energy } = score({
        stepper: id,
        eccentricity: 0,
        stepsPerOrbit,
        orbits: 16,
        summation: "compensated",
      });
      return (energy.driftPerOrbit as number) / (2 * stepsPerOrbit * h ** q);
    };
    const [coarse, fine] = [at(n), at(2 * n)];
    const h = (2 * Math.PI) / n;
    const extrapolated = (4 * fine - coarse) / 3;
    expect(Math.abs(extrapolated / constant - 1), `${coarse} ${fine}`).toBeLessThan(4 * h ** 2);
  });
});
