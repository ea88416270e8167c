import { InvalidInputError, joinTwoBodies, propagateTwoBodies, splitTwoBodies } from "@perigauge/kepler";
import fc from "fast-check";
import { describe, expect, test } from "vitest";

const component = fc.double({ min: -10, max: 10, noNaN: true });
const vector = fc.tuple(component, component, component);
const motion = fc.record({ position: vector, velocity: vector });
const mass = fc.double({ min: 1e-6, max: 1e6, noNaN: true });
const u = 2 ** -53;

describe("two bodies and one", () => {
  test("split and join are inverse to the rounding of the larger term", () => {
    fc.assert(
      fc.property(motion, motion, mass, mass, (relative, barycentre, m1, m2) => {
        const back = joinTwoBodies(splitTwoBodies({ relative, barycentre }, m1, m2), m1, m2);
        for (let k = 0; k < 3; k++) {
          const size = Math.abs(relative.position[k]!) + Math.abs(barycentre.position[k]!);
          expect(Math.abs(back.relative.position[k]! - relative.position[k]!)).toBeLessThanOrEqual(
            8 * u * size,
          );
          expect(Math.abs(back.barycentre.position[k]! - barycentre.position[k]!)).toBeLessThanOrEqual(
            8 * u * size,
          );
          const speed = Math.abs(relative.velocity[k]!) + Math.abs(barycentre.velocity[k]!);
          expect(Math.abs(back.relative.velocity[k]! - relative.velocity[k]!)).toBeLessThanOrEqual(
            8 * u * speed,
          );
        }
      }),
      { seed: 101, numRuns: 300 },
    );
  });

  test("total momentum is that of the barycentre, to rounding, at the start and later", () => {
    fc.assert(
      fc.property(mass, fc.double({ min: -20, max: 20, noNaN: true }), vector, (ratio, dt, drift) => {
        const relative = { position: [1, 0.2, 0], velocity: [-0.1, 0.9, 0.3] };
        const barycentre = { position: [3, 1, -2], velocity: drift };
        const bodies = propagateTwoBodies(splitTwoBodies({ relative, barycentre }, 1, ratio), 1, ratio, dt);
        for (let k = 0; k < 3; k++) {
          const p1 = bodies.first.velocity[k]!;
          const p2 = ratio * bodies.second.velocity[k]!;
          const total = (1 + ratio) * drift[k]!;
          const size = Math.abs(p1) + Math.abs(p2) + Math.abs(total) + Math.min(1, ratio) * 10;
          expect(Math.abs(p1 + p2 - total), `ratio ${ratio}, dt ${dt}`).toBeLessThanOrEqual(24 * u * size);
        }
      }),
      { seed: 102, numRuns: 200 },
    );
  });

  test("a body a millionth of the other moves it by a millionth", () => {
    const barycentre = { position: [0, 0], velocity: [0, 0] };
    const { first, second } = splitTwoBodies(
      { relative: { position: [1, 0], velocity: [0, 1] }, barycentre },
      1,
      1e-6,
    );
    expect(first.position[0]).toBeCloseTo(-1e-6 / (1 + 1e-6), 20);
    expect(second.position[0]).toBeCloseTo(1 / (1 + 1e-6), 15);
  });

  test("equal masses on a circle stay opposite each other", () => {
    const bodies = splitTwoBodies(
      {
        relative: { position: [1, 0], velocity: [0, 1] },
        barycentre: { position: [0, 0], velocity: [0, 0] },
      },
      1,
      1,
    );
    const { first, second } = propagateTwoBodies(bodies, 1, 1, Math.PI);
    expect(first.position[0]).toBeCloseTo(0.5, 15);
    expect(second.position).toEqual(first.position.map((x) => 0 - x));
  });

  test("bad input", () => {
    const point = { position: [0, 0], velocity: [0, 0] };
    expect(() => splitTwoBodies({ relative: point, barycentre: point }, 0, 1)).toThrow(InvalidInputError);
    expect(() => joinTwoBodies({ first: point, second: point }, 1, Number.NaN)).toThrow(
      "joinTwoBodies.secondMass: must be finite and positive, got NaN",
    );
  });
});
