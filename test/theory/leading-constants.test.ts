import { describe, expect, it } from "vitest";
import { score } from "./support.ts";

/*
 * Leading constants of the secular errors of symplectic methods from periapsis, between passages 1 and 2 (measured at 45 digits, to the
 * digits that two extrapolations share; technique of E. Hairer, C. Lubich, G. Wanner, Geometric Numerical Integration, 2nd ed., ch. IX):
 * turn of the apsis per orbit Cw h^p, and change of the radial period CT h^p. Order p, then Cw and CT at e = 0.2 and at e = 0.5.
 */
const constants: readonly (readonly [
  string,
  number,
  readonly [number, number],
  readonly [number, number],
])[] = [
  ["gauss-legendre-2", 2, [3.5863903, -0.58279117], [7.912159, -4.8716999]],
  ["gauss-legendre-6", 6, [0.019917504, 0.0014470643], [0.9544379, -0.212844]],
  ["velocity-verlet", 2, [-1.7931951, 0.38294832], [-3.9560796, 3.93585]],
  ["mclachlan-atela-2", 2, [-0.8702, 0.14141], [-1.9198, 1.1821]],
  ["forest-ruth-4-kdk", 4, [18.5306, 0.5491633], [149.51, -24.6337]],
  ["calvo-sanz-serna-4", 4, [-0.1559, -0.00237], [-1.115, 0.107]],
  ["mclachlan-4-five", 4, [-0.073315852, 0.0056632997], [-0.52877692, 0.5969575]],
  ["blanes-moan-4", 4, [-0.02357331, -0.0012216935], [-0.16807873, -0.05301294]],
  ["blanes-moan-6", 6, [-0.02946634, -0.001526126], [-0.9334179, 0.153809]],
  ["forest-ruth-4", 4, [-8.39555, 0.292494], [-45.9329, 13.3427]],
  ["suzuki-4", 4, [-0.11800698, 0.0032401996], [-0.6456274, 0.2606136]],
  ["yoshida-6", 6, [-1.49746, -0.027106], [-31.927, 5.0565]],
  ["yoshida-8", 8, [-17.946, -0.79008], [-1451.0, 252.71]],
  ["kahan-li-6", 6, [-0.0712061, -0.00134824], [-1.63425, 0.02018]],
  ["suzuki-umeno-8", 8, [-0.0041103, -0.00109065], [-0.9094103, -0.48327]],
];
const STEPS: Readonly<Record<number, number>> = { 2: 300, 4: 160, 6: 64, 8: 40 };

/** Half a unit of the last digit printed, relative. */
function halfDigit(value: number): number {
  const digits = String(Math.abs(value))
    .replace(/^0\.0*/, "")
    .replace(".", "").length;
  return 0.5 * 10 ** (1 - digits);
}

describe("leading constants of apsidal precession and radial period", () => {
  it.each(
    constants.flatMap(([id, p, low, high]) => [
      [id, 0.2, p, ...low] as const,
      [id, 0.5, p, ...high] as const,
    ]),
  )("%s at e = %s: (h^%d)", (id, e, p, apsisConstant, periodConstant) => {
    const coarse = Math.round(STEPS[p]! * Math.sqrt((1 + e) / (1 - e) ** 3));
    const fine = Math.floor(1.5 * coarse);
    const at = (stepsPerOrbit: number) => {
      const run = (orbits: number) =>
        score({ stepper: id, eccentricity: e, stepsPerOrbit, orbits, summation: "compensated" });
      const h = (2 * Math.PI) / stepsPerOrbit;
      return {
        apsis: ((run(2).apsis.final as number) - (run(1).apsis.final as number)) / h ** p,
        period: (run(2.25).period.final as number) / h ** p,
      };
    };
    const [first, second] = [at(coarse), at(fine)];
    const gain = (fine / coarse) ** 2;
    // Compensated runs leave the rounding of the measures themselves: some tens of u against C h^p, enlarged by the extrapolation.
    const rounding = (constant: number) =>
      ((40 * 2 ** -53) / (Math.abs(constant) * ((2 * Math.PI) / fine) ** p)) * (gain / (gain - 1));
    for (const [name, constant] of [
      ["apsis", apsisConstant],
      ["period", periodConstant],
    ] as const) {
      const extrapolated = (gain * second[name] - first[name]) / (gain - 1);
      // What extrapolation leaves is of the next order of what it took away.
      const taken = Math.abs(second[name] / extrapolated - 1);
      const tolerance = halfDigit(constant) + Math.max(taken, 1e-4) + rounding(constant);
      expect(tolerance, name).toBeLessThan(0.06);
      expect(Math.abs(extrapolated / constant - 1), `${name} ${extrapolated}`).toBeLessThan(tolerance);
    }
  });
});

/*
 * Implicit midpoint along the unperturbed orbit, from its modified energy H2 = -1/(12 r^3) + 1/(8 r^4) - eta^2/(8 r^5) (derived; verified in 45
 * digits); leapfrog and velocity Verlet are checked likewise beside the scores.
 */
describe("implicit midpoint: closed forms of order h^2", () => {
  it.each([0.1, 0.3, 0.6])("e = %s", (e) => {
    const eta2 = 1 - e * e;
    const h2 = (r: number) => -1 / (12 * r ** 3) + 1 / (8 * r ** 4) - eta2 / (8 * r ** 5);
    const wanted = {
      apsis: ((Math.PI / 4) * (4 + e * e)) / eta2 ** 3,
      period: 3 * h2(1 - e) + 1 / (12 * eta2 ** 1.5),
      // Relative to |E0| = 1/2, from periapsis to apoapsis.
      energy: -2 * (h2(1 + e) - h2(1 - e)),
    };
    const n = Math.round(400 / (1 - e) ** 1.5);
    const at = (stepsPerOrbit: number) => {
      const run = (orbits: number) =>
        score({ stepper: "gauss-legendre-2", eccentricity: e, stepsPerOrbit, orbits });
      const h = (2 * Math.PI) / stepsPerOrbit;
      return {
        apsis: ((run(2).apsis.final as number) - (run(1).apsis.final as number)) / h ** 2,
        period: (run(2.25).period.final as number) / h ** 2,
        energy: (run(0.5).energy.final as number) / h ** 2,
      };
    };
    const [coarse, fine] = [at(2 * n), at(4 * n)];
    for (const name of ["apsis", "period", "energy"] as const) {
      const extrapolated = (4 * fine[name] - coarse[name]) / 3;
      // The next term is (h c)^4, c = (1 - e)^(-3/2), times a constant of some tens; beside it rounding, u sqrt(steps) over h^2.
      const h = (2 * Math.PI) / (2 * n);
      const tolerance = 50 * (h / (1 - e) ** 1.5) ** 4 + (20 * 2 ** -53 * Math.sqrt(8 * n)) / h ** 2;
      expect(Math.abs(extrapolated / wanted[name] - 1), name).toBeLessThan(tolerance);
    }
  });
});
