import {
  fromPeriapsisUnits,
  InvalidInputError,
  normalisation,
  osculatingElements,
  periapsisConvention,
  periapsisState,
  toPeriapsisUnits,
} from "@perigauge/kepler";
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { precise, ulp, ulpsFrom } from "../support/precise.ts";

const positive = fc.double({ min: 1e-6, max: 1e9, noNaN: true });

describe("kilometres and seconds", () => {
  test("there and back within 1 ulp", () => {
    fc.assert(
      fc.property(positive, positive, positive, (gravitationalParameterKm3S2, semiMajorAxisKm, value) => {
        const units = normalisation({ gravitationalParameterKm3S2, semiMajorAxisKm });
        for (const back of [
          units.lengthToKm(units.lengthFromKm(value)),
          units.timeToSeconds(units.timeFromSeconds(value)),
          units.speedToKmS(units.speedFromKmS(value)),
        ]) {
          expect(Math.abs(back - value)).toBeLessThanOrEqual(ulp(value));
        }
      }),
      { seed: 91, numRuns: 500 },
    );
  });

  test("scales are rounded once: time a sqrt(a/GM), speed sqrt(GM/a) (60 digits)", () => {
    for (const axis of [6678.137, 16400, 42164.17, 149597870.7]) {
      const units = normalisation({ gravitationalParameterKm3S2: 398600.4418, semiMajorAxisKm: axis });
      const a = precise(axis);
      const parameter = precise(398600.4418);
      expect(ulpsFrom(units.timeSeconds, a.mul(a.div(parameter).sqrt()))).toBeLessThanOrEqual(0.51);
      expect(ulpsFrom(units.speedKmS, parameter.div(a).sqrt())).toBeLessThanOrEqual(0.51);
    }
  });

  test("bad input", () => {
    expect(() => normalisation({ gravitationalParameterKm3S2: -1, semiMajorAxisKm: 1 })).toThrow(
      InvalidInputError,
    );
    expect(() => normalisation({ gravitationalParameterKm3S2: 1, semiMajorAxisKm: Number.NaN })).toThrow(
      "normalisation.semiMajorAxisKm: must be finite and positive, got NaN",
    );
  });
});

describe("periapsis distance 1", () => {
  test("speed sqrt(1 + e), period 2 pi/(1 - e)^(3/2)", () => {
    for (const e of [0, 0.3, 0.6, 0.9, 0.999]) {
      const convention = periapsisConvention(e);
      const start = toPeriapsisUnits(periapsisState(e), convention);
      expect(start.x).toBe(1);
      expect(Math.abs(start.vy - Math.sqrt(1 + e))).toBeLessThanOrEqual(ulp(start.vy));
      expect(convention.periapsisSpeed).toBe(Math.sqrt(1 + e));
      expect(Math.abs(convention.period / ((2 * Math.PI) / (1 - e) ** 1.5) - 1)).toBeLessThan(2 ** -50);
      const elements = osculatingElements(1, 0, 0, convention.periapsisSpeed);
      // Rounding of the speed, over 1 - e.
      expect(Math.abs(elements.period / convention.period - 1)).toBeLessThan(2 ** -50 / (1 - e));
      expect(Math.abs(convention.timeScale * 2 * Math.PI - convention.period)).toBeLessThan(
        2 * ulp(convention.period),
      );
    }
  });

  test("there and back within 1 ulp", () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 0.999, noNaN: true }), positive, positive, (e, length, speed) => {
        const convention = periapsisConvention(e);
        const state = { x: length, y: -length, vx: speed, vy: -speed };
        const back = fromPeriapsisUnits(toPeriapsisUnits(state, convention), convention);
        expect(Math.abs(back.x - length)).toBeLessThanOrEqual(ulp(length));
        expect(Math.abs(back.vx - speed)).toBeLessThanOrEqual(ulp(speed));
      }),
      { seed: 92, numRuns: 300 },
    );
  });
});
