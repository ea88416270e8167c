import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { logAxis } from "../../src/report/axes/log-axis.ts";

describe("logarithmic axis", () => {
  it("has every value inside and labels whole decades only", () => {
    const positive = fc.double({ min: 1e-16, max: 1e12, noNaN: true });
    fc.assert(
      fc.property(fc.array(positive, { minLength: 1, maxLength: 20 }), (values) => {
        const { domain, values: ticks } = logAxis(values);
        expect(Math.min(...values)).toBeGreaterThanOrEqual(domain[0]);
        expect(Math.max(...values)).toBeLessThanOrEqual(domain[1]);
        expect(ticks.length).toBeGreaterThanOrEqual(2);
        expect(ticks.length).toBeLessThanOrEqual(9);
        for (const tick of ticks) {
          expect(Math.log10(tick)).toBeCloseTo(Math.round(Math.log10(tick)), 12);
          // Decades computed as powers may differ from the domain's ends in the last bits.
          expect(tick).toBeGreaterThanOrEqual(domain[0] * (1 - 1e-8));
          expect(tick).toBeLessThanOrEqual(domain[1] * (1 + 1e-8));
        }
      }),
      { seed: 60, numRuns: 500 },
    );
  });

  it("leaves out what a logarithm cannot show", () => {
    const { domain } = logAxis([0, -1, null, Number.NaN, Number.POSITIVE_INFINITY, 50, 2000]);
    expect(domain[0]).toBeGreaterThan(10);
    expect(domain[1]).toBeLessThan(10_000);
  });

  it("labels near 1 in plain figures, far from it by powers", () => {
    expect(logAxis([0.02, 300]).labelExpr).toContain('["0.1","1","10","100"]');
    expect(logAxis([2e-9, 3e-7]).labelExpr).toContain('["10⁻⁸","10⁻⁷"]');
  });
});
