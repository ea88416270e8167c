import {
  ddOf,
  ddScale,
  exactState,
  InvalidInputError,
  orbitThrough,
  periapsisState,
  stateAtTrueAnomaly,
  stateAtTrueAnomalyDegrees,
} from "@perigauge/kepler";
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { precise, precisePair } from "../support/precise.ts";
import { preciseOrbit, precisePosition } from "../support/precise-orbit.ts";

describe("start states", () => {
  test("periapsis and apoapsis lie exactly on the axis", () => {
    for (const e of [0, 0.1, 0.5, 0.9, 0.999]) {
      expect(periapsisState(e)).toEqual({ x: 1 - e, y: 0, vx: 0, vy: stateAtTrueAnomalyDegrees(e, 360).vy });
      const apoapsis = stateAtTrueAnomalyDegrees(e, 180);
      expect([apoapsis.x, apoapsis.y + 0, apoapsis.vx + 0]).toEqual([-(1 + e), 0, 0]);
      expect(apoapsis.vy).toBeLessThan(0);
      expect(stateAtTrueAnomalyDegrees(e, 90).x).toBe(0);
    }
    expect(periapsisState(0.6)).toEqual({ x: 0.4, y: 0, vx: 0, vy: 2 });
  });

  test("degrees and radians agree to the rounding of the angle", () => {
    for (const degrees of [1, 37, 120, 211, 300]) {
      const a = stateAtTrueAnomalyDegrees(0.4, degrees);
      const b = stateAtTrueAnomaly(0.4, (degrees * Math.PI) / 180);
      expect(Math.abs(a.x - b.x) + Math.abs(a.y - b.y)).toBeLessThan(4e-15);
    }
  });

  test("bad input", () => {
    expect(() => periapsisState(1)).toThrow(InvalidInputError);
    expect(() => stateAtTrueAnomaly(0.5, Number.NaN)).toThrow(
      "stateAtTrueAnomaly.trueAnomaly: must be a finite number",
    );
    expect(() => stateAtTrueAnomalyDegrees(1.2, 0)).toThrow(
      "stateAtTrueAnomalyDegrees.eccentricity: must be in [0, 1), got 1.2",
    );
  });
});

describe("the exact orbit through a rounded start", () => {
  test.each([0.01, 0.3, 0.9, 0.999])("elements in 30 digits, e = %d (60 digits)", (e) => {
    for (const degrees of [0, 45, 180, 290]) {
      const state = stateAtTrueAnomalyDegrees(e, degrees);
      const orbit = orbitThrough(state);
      const exact = preciseOrbit(state);
      // Near e = 1 what cancels in a and e is 2/(1 - e) and 1/(1 - e) times larger.
      const bound = 2 ** -94 / (1 - e);
      expect(precisePair(orbit.semiMajorAxis).div(exact.a).sub(1).abs().toNumber()).toBeLessThan(bound);
      expect(precisePair(orbit.eccentricity).sub(exact.e).abs().toNumber()).toBeLessThan(bound);
      expect(precisePair(orbit.meanAnomaly).sub(exact.startMean).abs().toNumber()).toBeLessThan(bound / e);
      expect(precisePair(orbit.meanMotion).div(exact.meanMotion).sub(1).abs().toNumber()).toBeLessThan(bound);
    }
  });

  test("passes through its start at t = 0, however it is turned, both senses, circles too", () => {
    const coordinate = fc.double({ min: -1.2, max: 1.2, noNaN: true });
    fc.assert(
      fc.property(coordinate, coordinate, coordinate, coordinate, (x, y, vx, vy) => {
        const r = Math.sqrt(x * x + y * y);
        const momentum = Math.abs(x * vy - y * vx);
        fc.pre(r > 0.1 && momentum > 0.05 && 2 / r - vx * vx - vy * vy > 0.05);
        const at = exactState(orbitThrough({ x, y, vx, vy }), { hi: 0, lo: 0 });
        const size = 2 ** -85;
        expect(precisePair(at.x).sub(precise(x)).abs().toNumber()).toBeLessThan(size);
        expect(precisePair(at.y).sub(precise(y)).abs().toNumber()).toBeLessThan(size);
        expect(precisePair(at.vx).sub(precise(vx)).abs().toNumber()).toBeLessThan(size);
        expect(precisePair(at.vy).sub(precise(vy)).abs().toNumber()).toBeLessThan(size);
      }),
      { seed: 61, numRuns: 100, maxSkipsPerRun: 1000 },
    );
    for (const e of [0, 1e-17, 1e-16, 1e-12]) {
      const start = stateAtTrueAnomalyDegrees(e, 33);
      const at = exactState(orbitThrough(start), { hi: 0, lo: 0 });
      expect([at.x.hi, at.y.hi, at.vx.hi, at.vy.hi]).toEqual([start.x, start.y, start.vx, start.vy]);
    }
  });

  test("states in 30 digits: within 2^-88 a and 2^-99 of the way, e <= 0.999, to 1e8 periods (60 digits)", () => {
    for (const e of [0.01, 0.6, 0.9, 0.999]) {
      const start = stateAtTrueAnomalyDegrees(e, 200);
      const orbit = orbitThrough(start);
      const exact = preciseOrbit(start);
      for (const steps of [3, 1_000_000_007, 5_800_000_019]) {
        const at = exactState(orbit, ddScale(ddOf(0.1), steps));
        const expected = precisePosition(exact, precise(0.1).mul(steps));
        const error = precisePair(at.x)
          .sub(expected.x)
          .abs()
          .add(precisePair(at.y).sub(expected.y).abs())
          .toNumber();
        expect(error, `e = ${e}, step ${steps}`).toBeLessThan(
          2 ** -88 + 2 ** -99 * 0.1 * steps * Math.sqrt((1 + e) / (1 - e)),
        );
      }
    }
  });

  test("a circle has its periapsis on the +x axis by definition", () => {
    const orbit = orbitThrough({ x: 0, y: 1, vx: -1, vy: 0 });
    expect(orbit.eccentricity.hi).toBe(0);
    expect([orbit.periapsisX.hi, orbit.periapsisY.hi]).toEqual([1, 0]);
    expect(orbit.meanAnomaly.hi).toBe(Math.PI / 2);
    const retrograde = orbitThrough({ x: 0, y: 1, vx: 1, vy: 0 });
    expect(retrograde.meanAnomaly.hi).toBe(-Math.PI / 2);
    expect(exactState(retrograde, { hi: 0.1, lo: 0 }).x.hi).toBeCloseTo(Math.sin(0.1), 15);
  });

  test.each([
    [{ x: 0, y: 0, vx: 0, vy: 1 }, "orbitThrough: must be at a distance from the centre"],
    [{ x: 1, y: 0, vx: 1, vy: 0 }, "orbitThrough: must have an angular momentum other than zero"],
    [{ x: 1, y: 0, vx: 0, vy: 1.5 }, "orbitThrough: must be bound (an energy below zero)"],
    [{ x: Number.NaN, y: 0, vx: 0, vy: 1 }, "orbitThrough.x: must be a finite number, got NaN"],
  ])("refuses %o", (state, message) => {
    expect(() => orbitThrough(state)).toThrow(InvalidInputError);
    expect(() => orbitThrough(state)).toThrow(message);
  });
});
