import { describe, expect, it } from "vitest";
import { fitSlope } from "../../src/analyse/fit.ts";

describe("fitSlope", () => {
  // F.J. Anscombe, Am. Stat. 27 (1973) 17, first set: slope 0.500, standard error of the slope 0.118.
  const x = [10, 8, 13, 9, 11, 14, 6, 4, 12, 7, 5];
  const y = [8.04, 6.95, 7.58, 8.81, 8.33, 9.96, 7.24, 4.26, 10.84, 4.82, 5.68];
  const points = x.map((value, i) => [value, y[i]!] as const).toSorted((a, b) => a[0] - b[0]);

  it("gives the slope and standard error of a published regression", () => {
    const fit = fitSlope(points);
    expect(fit.points).toBe(11);
    expect(Math.abs(fit.value - 0.5)).toBeLessThan(5e-4);
    expect(Math.abs(fit.scatter - 0.118)).toBeLessThan(5e-4);
    expect(fit.standardError).toBeGreaterThanOrEqual(fit.scatter);
  });

  it("sees a bend that scatter does not: half the difference of the slopes of the halves", () => {
    const bent = Array.from({ length: 101 }, (_, i) => [i, i < 50 ? i : 50 + 2 * (i - 50)] as const);
    const fit = fitSlope(bent);
    expect(fit.standardError).toBeCloseTo(0.5, 12);
    expect(fit.scatter).toBeLessThan(0.05);
  });
});
