import { describe, expect, test } from "vitest";
import { anomalyCorrection } from "../../src/equation/anomaly-correction.ts";
import { anomalyOfCubic, roughCubeRoot, startAnomaly } from "../../src/equation/starter.ts";
import { Decimal, precise } from "../support/precise.ts";
import { seeded } from "../support/random.ts";

describe("parts of the solution of Kepler's equation keep what they promise", () => {
  test("starter: a relative 5e-4 over e to 1 - 1e-15 and E from 1e-6 to pi", () => {
    let worst = 0;
    for (let i = 0; i <= 120; i++) {
      const complement = i === 0 ? 1 : 10 ** (-15 * (i / 120));
      const e = 1 - complement;
      for (let j = 0; j <= 120; j++) {
        const anomaly = Math.PI * 10 ** ((-6 * j) / 120);
        // E - e sin E without cancellation, enough digits for this purpose.
        const z = anomaly * anomaly;
        const lag =
          anomaly > 0.1 ? anomaly - Math.sin(anomaly) : anomaly * z * (1 / 6 - z / 120 + (z * z) / 5040);
        const mean = (1 - e) * anomaly + e * lag;
        worst = Math.max(worst, Math.abs(startAnomaly(e, 1 - e, mean) / anomaly - 1));
      }
    }
    expect(worst).toBeLessThan(5e-4);
  });

  test("cube root: a relative 3e-5 from 1e-300 to 1e300", () => {
    const random = seeded(111);
    for (let k = 0; k < 500; k++) {
      const root = 10 ** (200 * random() - 100);
      expect(Math.abs(roughCubeRoot(root * root * root) / root - 1), `${root}`).toBeLessThan(3e-5);
    }
  });

  test("root of the cubic: a relative 1e-4", () => {
    const random = seeded(112);
    for (let k = 0; k < 500; k++) {
      const complement = 10 ** (-15 * random());
      const e = 1 - complement;
      const root = 10 ** (-12 * random());
      const mean = complement * root + (e * root * root * root) / 6;
      expect(Math.abs(anomalyOfCubic(e, complement, mean) / root - 1), `${complement} ${root}`).toBeLessThan(
        1e-4,
      );
    }
    expect(anomalyOfCubic(0.5, 0.5, 5e-324)).toBe(1e-323);
  });

  test("correction about a node: 4 u + 5e-16 over the stated ranges (60 digits)", () => {
    const random = seeded(113);
    for (let k = 0; k < 500; k++) {
      const delta = 0.03 * (2 * random() - 1);
      const a = (0.02 / Math.abs(delta)) * (2 * random() - 1);
      const b = (3e-4 / (delta * delta)) * (2 * random() - 1);
      const exact = precise(delta);
      const versine = new Decimal(1).sub(Decimal.cos(exact));
      const q = exact
        .add(precise(a).mul(versine))
        .add(precise(b).mul(exact.sub(Decimal.sin(exact))))
        .toNumber();
      const error = Math.abs(anomalyCorrection(q, a, b) / delta - 1);
      expect(error, `delta = ${delta}, A = ${a}, B = ${b}`).toBeLessThan(4 * 2 ** -53 + 5e-16);
    }
  });
});
