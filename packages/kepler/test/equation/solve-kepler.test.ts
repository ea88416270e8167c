import {
  InvalidInputError,
  meanFromEccentricAnomaly,
  solveKepler,
  trueFromEccentricAnomaly,
} from "@perigauge/kepler";
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { Decimal, precise, ulp } from "../support/precise.ts";
import { seeded } from "../support/random.ts";

const degree = Math.PI / 180;

/** Error of E in ulp: the residual over the slope, in 60 digits (what it neglects is of the order of the error squared). */
function errorUlps(e: number, mean: number, anomaly: number): number {
  const pe = precise(e);
  const pa = precise(anomaly);
  const residual = pa.sub(pe.mul(Decimal.sin(pa))).sub(precise(mean));
  const slope = new Decimal(1).sub(pe.mul(Decimal.cos(pa)));
  return residual.div(slope).div(ulp(anomaly)).abs().toNumber();
}

// Printed values are recalled, or quoted at second hand, from the sources named; each was recomputed at 40 digits from its inputs.
describe("published values", () => {
  // Meeus, Astronomical Algorithms, 2nd ed. (1998), chapter 30: printed to 6 decimals of a degree.
  test.each([
    [0.1, 5, 5.554589],
    [0.2, 5, 6.246908],
    [0.3, 5, 7.13496],
    [0.4, 5, 8.313903],
    [0.5, 5, 9.950063],
    [0.6, 5, 12.356653],
    [0.7, 5, 16.16799],
    [0.8, 5, 22.656579],
    [0.9, 5, 33.344447],
    [0.99, 5, 45.361023],
    [0.99, 1, 24.725822],
    [0.99, 33, 89.722155],
    [0.99, 2, 32.361007],
  ])("Meeus 1998, chapter 30: e = %d, M = %d deg", (e, meanDeg, anomalyDeg) => {
    expect(Math.abs(solveKepler(e, meanDeg * degree) / degree - anomalyDeg)).toBeLessThanOrEqual(0.51e-6);
  });

  // Each within a unit of the last printed digit: two of them are cut rather than rounded.
  test.each([
    ["Meeus 1998, chapter 30", 0.99, 0.2, 1.066997365282, 1e-12],
    ["Meeus 1998, chapter 30", 0.999, 6 * degree, 49.5696248539 * degree, 1.1e-10 * degree],
    ["Meeus 1998, chapter 30", 0.999, 7 * degree, 52.270261528 * degree, 1.1e-10 * degree],
    ["Vallado, example 2-1", 0.4, 235.4 * degree - 2 * Math.PI, 3.84866174509717 - 2 * Math.PI, 1e-14],
    ["Montenbruck & Gill 2000, exercise 2.2", 0.72, 4 * degree, 0.24318719638, 1.1e-11],
    ["Montenbruck & Gill 2000, exercise 2.2", 0.72, 50 * degree, 1.59249513093, 1.1e-11],
    ["Curtis, example 3.2", 0.37255, 3.6029, 3.4794, 5e-5],
  ] as const)("%s: e = %d, M = %d", (_, e, mean, anomaly, printed) => {
    expect(Math.abs(solveKepler(e, mean) - anomaly)).toBeLessThanOrEqual(printed);
  });

  // Computed at 40 digits.
  test.each([
    [0.9999, 1e-4, 0.0819842185234614],
    [0.9999, 1, 1.9344942764024455],
    [0.999999, 1e-8, 0.0034072645977343274],
    [0.99, 31415926e-7, 3.1415926266602487],
    [0.5, -2.5, -2.7094216109276945],
    [0.3, 1000, 1000.2855424479194],
  ])("computed at 40 digits: e = %d, M = %d", (e, mean, anomaly) => {
    // The listed values hold for decimal e and M; their rounding is worth sin E/r of e and 1/r of M.
    const r = 1 - e * Math.cos(anomaly);
    const rounding = (2 ** -54 * Math.abs(Math.sin(anomaly)) + Math.abs(mean) * 2 ** -53) / r;
    expect(Math.abs(solveKepler(e, mean) - anomaly)).toBeLessThanOrEqual(2 * ulp(anomaly) + rounding);
  });

  test("true anomaly of Meeus's examples 30.a and 30.c, computed at 40 digits", () => {
    expect(trueFromEccentricAnomaly(0.1, solveKepler(0.1, 5 * degree)) / degree).toBeCloseTo(
      6.139761520840446,
      13,
    );
    expect(trueFromEccentricAnomaly(0.99, solveKepler(0.99, 2 * degree)) / degree).toBeCloseTo(
      152.54213389364477,
      11,
    );
  });
});

describe("against 60 digits", () => {
  const random = seeded(21);
  const nearParabolic = (): number => Math.min(1 - 10 ** (-16 * random()), 1 - 2 ** -53);
  const regions = {
    "the whole square": () => [random(), random() * Math.PI],
    "near e = 1": () => [nearParabolic(), random() * Math.PI],
    "both corners, M down to 1e-300": () => [nearParabolic(), Math.PI * 10 ** (-300 * random())],
    "the corner e -> 1, M -> 0": () => [1 - 10 ** (-14 * random()), 10 ** (-12 * random())],
    "e = 1 - 1e-12": () => [1 - 1e-12, 10 ** (-25 * random())],
    "near-circular": () => [10 ** (-20 * random()), random() * Math.PI],
    "where 2022 solvers lose digits": () => [0.99 + 0.01 * random(), 0.0045 * random()],
  };
  test.each(Object.entries(regions))("at most 0.53 ulp in 400 points of %s", (name, draw) => {
    let worst = 0;
    let at = "";
    for (let k = 0; k < 400; k++) {
      const [e, mean] = draw() as [number, number];
      const error = errorUlps(e, mean, solveKepler(e, mean));
      if (!(error <= worst)) {
        worst = error;
        at = `e = ${e}, M = ${mean}`;
      }
    }
    expect(worst, `${name}: ${at}`).toBeLessThan(0.53);
  });

  test("at most 0.53 ulp for anomalies spread evenly, M from E", () => {
    const draw = seeded(22);
    let worst = 0;
    for (let k = 0; k < 400; k++) {
      const e = draw();
      const anomaly = 0.04 + draw() * 3.1;
      const mean = meanFromEccentricAnomaly(e, anomaly);
      worst = Math.max(worst, errorUlps(e, mean, solveKepler(e, mean)));
    }
    expect(worst).toBeLessThan(0.53);
  });

  test("at most 1 ulp for M far outside a turn", () => {
    const draw = seeded(23);
    for (let k = 0; k < 200; k++) {
      const e = draw();
      const mean = (draw() - 0.5) * 10 ** (15 * draw());
      expect(errorUlps(e, mean, solveKepler(e, mean)), `e = ${e}, M = ${mean}`).toBeLessThan(1);
    }
  });

  test("M = 1e300 is reduced by the exact 2 pi", () => {
    // sin E and cos E of the reduced argument enter; e = 0 returns M itself, e > 0 stays within e of it.
    expect(solveKepler(0, 1e300)).toBe(1e300);
    expect(solveKepler(0.5, 1e300)).toBe(1e300);
  });
});

describe("properties", () => {
  const eccentricity = fc.double({ min: 0, max: 1 - 2 ** -53, noNaN: true });
  const finite = fc.double({ noNaN: true, noDefaultInfinity: true });

  test("odd in M to the bit, finite for every input", () => {
    fc.assert(
      fc.property(eccentricity, finite, (e, mean) => {
        const anomaly = solveKepler(e, mean);
        expect(Number.isFinite(anomaly)).toBe(true);
        expect(solveKepler(e, -mean)).toBe(-anomaly);
      }),
      { seed: 24, numRuns: 2000 },
    );
  });

  test("rises with M", () => {
    fc.assert(
      fc.property(eccentricity, fc.double({ min: 1e-300, max: 3.13, noNaN: true }), (e, mean) => {
        expect(solveKepler(e, mean * (1 + 4e-15))).toBeGreaterThanOrEqual(solveKepler(e, mean) * (1 - 4e-16));
        expect(solveKepler(e, mean)).toBeGreaterThanOrEqual(mean);
      }),
      { seed: 25, numRuns: 1000 },
    );
  });

  test("M of E and back", () => {
    fc.assert(
      fc.property(eccentricity, fc.double({ min: -3.14, max: 3.14, noNaN: true }), (e, anomaly) => {
        // Below, M would be subnormal and hold fewer digits than E.
        fc.pre(Math.abs(anomaly) > 1e-280);
        const back = solveKepler(e, meanFromEccentricAnomaly(e, anomaly));
        // M is rounded once, which E repeats at most (M/(E r) <= 1, and 2 for the change of binade).
        expect(Math.abs(back - anomaly)).toBeLessThanOrEqual(3 * ulp(anomaly));
      }),
      { seed: 26, numRuns: 1000 },
    );
  });

  test("M = 0 and M = pi are fixed points, e = 0 is the identity", () => {
    for (const e of [0, 0.1, 0.9, 1 - 2 ** -53]) {
      expect(solveKepler(e, 0)).toBe(0);
      expect(solveKepler(e, Math.PI)).toBe(Math.PI);
    }
    for (const mean of [1e-300, 1e-5, 0.3, 3, 50.25]) expect(solveKepler(0, mean)).toBe(mean);
  });
});

describe("bad input", () => {
  test.each([
    [-0.1, 1, "solveKepler.eccentricity: must be in [0, 1), got -0.1"],
    [1, 1, "solveKepler.eccentricity: must be in [0, 1), got 1"],
    [Number.NaN, 1, "solveKepler.eccentricity: must be in [0, 1), got NaN"],
    [0.5, Number.NaN, "solveKepler.meanAnomaly: must be a finite number, got NaN"],
    [0.5, Number.NEGATIVE_INFINITY, "solveKepler.meanAnomaly: must be a finite number, got -Infinity"],
  ])("e = %d, M = %d", (e, mean, message) => {
    expect(() => solveKepler(e, mean)).toThrow(InvalidInputError);
    expect(() => solveKepler(e, mean)).toThrow(RangeError);
    expect(() => solveKepler(e, mean)).toThrow(message);
  });
});
