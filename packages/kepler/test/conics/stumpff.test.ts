import { ddOf, stumpff } from "@perigauge/kepler";
import { describe, expect, test } from "vitest";
import { Decimal, type Precise, precise, precisePair } from "../support/precise.ts";

describe("Stumpff's functions", () => {
  // Computed at 40 digits.
  test.each([
    [0.5, 0.4795108058487397, 0.16254926026886313],
    [-0.5, 0.5211836730427123, 0.170883282545214],
    [1e-6, 0.4999999583333347, 0.16666665833333352],
    [10, 0.1999786072879326, 0.10065407069689386],
    [-10, 1.0833336070820503, 0.27286437556433524],
  ])("z = %d", (z, c2, c3) => {
    const own = stumpff(ddOf(z));
    expect(Math.abs(own.c2.hi / c2 - 1)).toBeLessThan(3e-16);
    expect(Math.abs(own.c3.hi / c3 - 1)).toBeLessThan(3e-16);
  });

  test("c0 and c1 are cosine and sine, circular and hyperbolic, to 2^-102 max(1, |z|) (60 digits)", () => {
    for (const z of [100, 30, 3, 0.3, -0.3, -3, -30, -300, -1e4, -3e5]) {
      const root = precise(Math.abs(z)).sqrt();
      const own = stumpff(ddOf(z));
      const c0 = z > 0 ? Decimal.cos(root) : Decimal.cosh(root);
      const c1 = (z > 0 ? Decimal.sin(root) : Decimal.sinh(root)).div(root);
      const bound = 2 ** -102 * Math.max(1, Math.abs(z));
      const error = (value: { readonly hi: number; readonly lo: number }, exact: Precise): number =>
        precisePair(value).sub(exact).div(Decimal.max(1, exact.abs())).abs().toNumber();
      expect(error(own.c0, c0), `c0(${z})`).toBeLessThan(bound);
      expect(error(own.c1, c1), `c1(${z})`).toBeLessThan(bound);
    }
  });

  test("c_k(0) = 1/k!", () => {
    const own = stumpff(ddOf(0));
    expect([own.c0.hi, own.c1.hi, own.c2.hi, own.c3.hi]).toEqual([1, 1, 1 / 2, 1 / 6]);
  });
});
