import fc from "fast-check";
import { expect, it } from "vitest";
import { angleOf, nearestTurn } from "../../src/score/angle-difference.ts";

it("is within 2 ulp of the engine's arctangent on both sides of its branch", () => {
  fc.assert(
    fc.property(
      fc.double({ min: -0.2, max: 0.2, noNaN: true }),
      fc.double({ min: 0.1, max: 10, noNaN: true }),
      (t, dot) => {
        const cross = t * dot;
        const expected = Math.atan2(cross, dot);
        // 2 ulp of the polynomial, 1 of the engine's own function, half of the division.
        expect(Math.abs(angleOf(cross, dot) - expected)).toBeLessThanOrEqual(
          4 * 2 ** -52 * Math.abs(expected),
        );
      },
    ),
    { numRuns: 3000, seed: 5 },
  );
});

it("covers all quadrants", () => {
  for (let degrees = -179; degrees <= 180; degrees++) {
    const angle = (degrees * Math.PI) / 180;
    expect(angleOf(Math.sin(angle), Math.cos(angle))).toBeCloseTo(angle, 14);
  }
});

it("adds the turns that bring an angle nearest to the one before", () => {
  expect(nearestTurn(-3.1, 3.1)).toBeCloseTo(-3.1 + 2 * Math.PI, 15);
  expect(nearestTurn(0.1, 100)).toBeCloseTo(0.1 + 16 * 2 * Math.PI, 12);
  expect(nearestTurn(0.25, 0.3)).toBe(0.25);
});
