import { propagate, solveBarker, solveHyperbolicKepler, stateAtTrueAnomalyDegrees } from "@perigauge/kepler";
import { describe, expect, test } from "vitest";
import { Decimal, type Precise, precise } from "../support/precise.ts";
import { preciseOrbit, precisePosition } from "../support/precise-orbit.ts";

/** Distance of a position from the exact one, in ulp of its length (between 2^-53 and 2^-52 of it). */
function ulpsOfLength(position: readonly number[], x: Precise, y: Precise): number {
  const dx = precise(position[0]!).sub(x);
  const dy = precise(position[1]!).sub(y);
  const length = x.mul(x).add(y.mul(y)).sqrt();
  return dx.mul(dx).add(dy.mul(dy)).sqrt().div(length).toNumber() / 2 ** -52;
}

describe("position within 1 ulp of its length (60 digits)", () => {
  test("ellipses, forward and backward, up to 1e8 periods", () => {
    for (const e of [0.01, 0.5, 0.9, 0.999]) {
      const start = stateAtTrueAnomalyDegrees(e, 115);
      const exact = preciseOrbit(start);
      const state = { position: [start.x, start.y], velocity: [start.vx, start.vy] };
      for (const dt of [1e-6, 1, -3.1, 100.7, -12345.6, 6e8]) {
        const { x, y } = precisePosition(exact, precise(dt));
        expect(ulpsOfLength(propagate(state, dt).position, x, y), `e = ${e}, dt = ${dt}`).toBeLessThan(1);
      }
    }
  });

  test("hyperbolas from periapsis, near the parabola to far above", () => {
    for (const speed of [1.41422, 1.42, 1.6, 3, 40]) {
      const state = { position: [1, 0], velocity: [0, speed] };
      const v = precise(speed);
      // -1/a = v^2 - 2, e = v^2 - 1, n = (-a)^(-3/2).
      const inverse = v.mul(v).sub(2);
      const a = new Decimal(1).div(inverse);
      const e = v.mul(v).sub(1);
      const n = inverse.mul(inverse.sqrt());
      for (const dt of [1e-6, 0.3, -7, 1000, 1e8]) {
        const mean = n.mul(precise(dt));
        let h: Precise = new Decimal(solveHyperbolicKepler(e.toNumber(), mean.toNumber()));
        for (let k = 0; k < 4; k++) {
          const f = e.mul(Decimal.sinh(h)).sub(h).sub(mean);
          h = h.sub(f.div(e.mul(Decimal.cosh(h)).sub(1)));
        }
        const x = a.mul(e.sub(Decimal.cosh(h)));
        const y = a.mul(e.mul(e).sub(1).sqrt()).mul(Decimal.sinh(h));
        expect(ulpsOfLength(propagate(state, dt).position, x, y), `v = ${speed}, dt = ${dt}`).toBeLessThan(1);
      }
    }
  });

  test("a parabola whose speed of escape is a double: r = 2, v = 1", () => {
    const state = { position: [2, 0], velocity: [0, 1] };
    for (const dt of [1e-3, 5, -400, 1e9]) {
      // p = 4: W = 2 t/8, x = 2 (1 - B^2), y = 4 B.
      let b: Precise = new Decimal(solveBarker(dt / 4));
      for (let k = 0; k < 3; k++) {
        const f = b.add(b.mul(b).mul(b).div(3)).sub(precise(dt).div(4));
        b = b.sub(f.div(b.mul(b).add(1)));
      }
      const x = new Decimal(2).sub(b.mul(b).mul(2));
      expect(ulpsOfLength(propagate(state, dt).position, x, b.mul(4)), `dt = ${dt}`).toBeLessThan(1);
    }
  });
});
