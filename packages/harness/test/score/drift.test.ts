import fc from "fast-check";
import { expect, it } from "vitest";
import { BlockMeans, theilSenSlope } from "../../src/score/drift.ts";

it("Theil-Sen slope ignores wild points that would bend a least-squares line", () => {
  const x = Array.from({ length: 21 }, (_, i) => i);
  const y = x.map((value) => 3 - 0.25 * value);
  y[4] = 1e6;
  y[17] = -1e6;
  expect(theilSenSlope(x, y)).toBeCloseTo(-0.25, 12);
});

it("block means of any number of orbits keep the slope of a line", () => {
  fc.assert(
    fc.property(
      fc.integer({ min: 8, max: 3000 }),
      fc.double({ min: -1, max: 1, noNaN: true }),
      (orbits, slope) => {
        const blocks = new BlockMeans(orbits);
        for (let orbit = 1; orbit <= orbits; orbit++) blocks.accept(orbit, slope * orbit);
        // Means are sums of up to `orbits` terms: rounding of a relative 2^-53 each.
        expect(Math.abs((blocks.drift() as number) - slope)).toBeLessThanOrEqual(1e-9);
      },
    ),
    { numRuns: 30, seed: 3 },
  );
});

it("fewer than eight orbits have no drift", () => {
  const blocks = new BlockMeans(7);
  for (let orbit = 1; orbit <= 7; orbit++) blocks.accept(orbit, orbit);
  expect(blocks.drift()).toBeNull();
});
