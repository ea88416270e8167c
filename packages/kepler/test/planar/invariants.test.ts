import {
  angularMomentum,
  eccentricityVector,
  invariantPlaces,
  invariantsInto,
  orbitThrough,
  osculatingElements,
  periapsisState,
  propagate,
  specificEnergy,
  stateAtTrueAnomalyDegrees,
  timeSincePeriapsis,
} from "@perigauge/kepler";
import { describe, expect, test } from "vitest";
import { type Precise, precise, ulp } from "../support/precise.ts";
import { seeded } from "../support/random.ts";

/** Energy, momentum and eccentricity vector from their definitions in 60 digits. */
function exactInvariants(x: number, y: number, vx: number, vy: number): Precise[] {
  const [px, py, pu, pv] = [precise(x), precise(y), precise(vx), precise(vy)];
  const r = px.mul(px).add(py.mul(py)).sqrt();
  const l = px.mul(pv).sub(py.mul(pu));
  const energy = pu.mul(pu).add(pv.mul(pv)).div(2).sub(r.pow(-1));
  return [energy, l, pv.mul(l).sub(px.div(r)), pu.neg().mul(l).sub(py.div(r))];
}

describe("invariants without avoidable cancellation", () => {
  test("1 ulp plus 2^-98 of what cancels, from e = 1e-12 to 0.999999 and any point (60 digits)", () => {
    const random = seeded(71);
    const out = new Float64Array(4);
    for (let k = 0; k < 250; k++) {
      const e = k % 2 === 0 ? 10 ** (-12 * random()) : 1 - 10 ** (-6 * random());
      const { x, y, vx, vy } = stateAtTrueAnomalyDegrees(Math.min(e, 0.999999), 360 * random());
      invariantsInto(x, y, vx, vy, out);
      const exact = exactInvariants(x, y, vx, vy);
      const r = Math.sqrt(x * x + y * y);
      const cancels = [1 / r, Math.abs(x * vy) + Math.abs(y * vx), 2 + e, 2 + e];
      for (let j = 0; j < 4; j++) {
        const error = precise(out[j]!).sub(exact[j]!).abs().toNumber();
        expect(error, `${j} of ${[x, y, vx, vy]}`).toBeLessThanOrEqual(ulp(out[j]!) + 2 ** -98 * cancels[j]!);
      }
    }
  });

  test("the single functions are the same numbers", () => {
    const out = new Float64Array(4);
    const { x, y, vx, vy } = stateAtTrueAnomalyDegrees(0.7, 130);
    invariantsInto(x, y, vx, vy, out);
    expect(specificEnergy(x, y, vx, vy)).toBe(out[invariantPlaces.energy]);
    expect(angularMomentum(x, y, vx, vy)).toBe(out[invariantPlaces.angularMomentum]);
    expect(eccentricityVector(x, y, vx, vy)).toEqual({
      x: out[invariantPlaces.eccentricityX],
      y: out[invariantPlaces.eccentricityY],
    });
  });

  test("osculating elements of every conic", () => {
    const ellipse = osculatingElements(0.4, 0, 0, 2);
    expect(ellipse.energy).toBeCloseTo(-0.5, 15);
    expect(ellipse.period).toBeCloseTo(2 * Math.PI, 14);
    expect(ellipse.eccentricity).toBeCloseTo(0.6, 15);
    const parabola = osculatingElements(2, 0, 0, 1);
    expect([parabola.energy, parabola.eccentricity, parabola.period]).toEqual([
      0,
      1,
      Number.POSITIVE_INFINITY,
    ]);
    expect(osculatingElements(1, 0, 0, 2).semiMajorAxis).toBe(-0.5);
  });
});

describe("time since periapsis", () => {
  test("counts from the passage, in (-P/2, P/2], within 2^-51 periods and the rounding of the state", () => {
    for (const e of [0.01, 0.3, 0.9, 0.99]) {
      const { x, vy } = periapsisState(e);
      const start = { position: [x, 0], velocity: [0, vy] };
      const period = 2 * Math.PI;
      for (const share of [-0.49, -0.2, -0.01, 0.001, 0.1, 0.37, 0.499]) {
        const { position, velocity } = propagate(start, share * period);
        const time = timeSincePeriapsis(position[0]!, position[1]!, velocity[0]!, velocity[1]!);
        // A rounded state: its error over its speed, and that of the energy times 3/2 of the time.
        const speed = Math.sqrt(velocity[0]! ** 2 + velocity[1]! ** 2);
        const state = 2 ** -51 * (1 / speed + speed + 3 * Math.abs(share) * period * (speed + 1) ** 2);
        expect(Math.abs(time - share * period), `e = ${e}, ${share} P`).toBeLessThan(
          2 ** -51 * period + state / Math.min(e, 0.3),
        );
      }
    }
  });

  test("agrees with the exact orbit's mean anomaly over its mean motion", () => {
    for (const degrees of [1, 60, 179, 181, 355]) {
      const state = stateAtTrueAnomalyDegrees(0.6, degrees);
      const orbit = orbitThrough(state);
      const exact = orbit.meanAnomaly.hi / orbit.meanMotion.hi;
      expect(Math.abs(timeSincePeriapsis(state.x, state.y, state.vx, state.vy) - exact)).toBeLessThan(
        2 ** -49,
      );
    }
  });

  test("not a number where the state is not bound", () => {
    expect(timeSincePeriapsis(1, 0, 0, 2)).toBeNaN();
  });
});
