import {
  ddOf,
  ddScale,
  exactState,
  InvalidInputError,
  orbitThrough,
  type PlanarState,
  periapsisState,
  referenceTrack,
  stateAtTrueAnomalyDegrees,
  twoSum,
} from "@perigauge/kepler";
import { describe, expect, test } from "vitest";
import { precise, precisePair } from "../support/precise.ts";
import { preciseOrbit, precisePosition } from "../support/precise-orbit.ts";
import { seeded } from "../support/random.ts";

const unit = 2 ** -52;

/** Largest error of position (in 2^-52 a), of velocity (in 2^-52 of the largest speed), and of the polar angle (rad). */
function worstErrors(
  start: PlanarState,
  h: number,
  firstStep: number,
  count: number,
  stride: number,
): number[] {
  const orbit = orbitThrough(start);
  const rows = new Float64Array(4 * count);
  referenceTrack(orbit).statesAtSteps(firstStep, count, h, rows);
  const e = orbit.eccentricity.hi;
  const fastest = Math.sqrt((1 + e) / (1 - e) / orbit.semiMajorAxis.hi);
  let position = 0;
  let velocity = 0;
  let angle = 0;
  for (let k = 0; k < count; k += stride) {
    const exact = exactState(orbit, ddScale(ddOf(h), firstStep + k));
    const dx = rows[4 * k]! - exact.x.hi - exact.x.lo;
    const dy = rows[4 * k + 1]! - exact.y.hi - exact.y.lo;
    const dvx = rows[4 * k + 2]! - exact.vx.hi - exact.vx.lo;
    const dvy = rows[4 * k + 3]! - exact.vy.hi - exact.vy.lo;
    position = Math.max(position, Math.sqrt(dx * dx + dy * dy) / orbit.semiMajorAxis.hi);
    velocity = Math.max(velocity, Math.sqrt(dvx * dvx + dvy * dvy) / fastest);
    const r2 = exact.x.hi ** 2 + exact.y.hi ** 2;
    angle = Math.max(angle, Math.abs(exact.x.hi * dy - exact.y.hi * dx) / r2);
  }
  return [position / unit, velocity / unit, angle];
}

describe("reference track", () => {
  test.each([0, 1e-16, 1e-9, 0.01, 0.1, 0.3, 0.5, 0.7, 0.9, 0.97, 0.99, 0.999])(
    "e = %d: position within 4 x 2^-52 a, velocity 6 x 2^-52, polar angle 1e-15 rad, at the start, 1e6 orbits and 1e9 steps",
    (e) => {
      for (const degrees of [0, 77, 180]) {
        const start = stateAtTrueAnomalyDegrees(e, degrees);
        // 97.3 steps an orbit: every phase is met; and a dense arc around periapsis.
        for (const [h, firstStep, count] of [
          [(2 * Math.PI) / 97.3, -500, 1000],
          [(2 * Math.PI) / 97.3, 97_300_000, 1000],
          [(2 * Math.PI) / 60.5, 1_000_000_000, 1000],
          [((1 - e) ** 1.5 * 2 * Math.PI) / 150, -300, 600],
        ] as const) {
          const [position, velocity, angle] = worstErrors(start, h, firstStep, count, 4) as [
            number,
            number,
            number,
          ];
          expect(position, `position, start ${degrees}, h ${h}, from ${firstStep}`).toBeLessThan(4);
          expect(velocity, `velocity, start ${degrees}, h ${h}, from ${firstStep}`).toBeLessThan(6);
          expect(angle, `angle, start ${degrees}, h ${h}, from ${firstStep}`).toBeLessThan(1e-15);
        }
      }
    },
  );

  test("against 60 digits: 1e6 orbits, 1e9 and 1e10 steps, both signs, any size and sense", () => {
    const random = seeded(81);
    const starts = [
      periapsisState(0.9),
      stateAtTrueAnomalyDegrees(0.6, 211),
      { x: 1.3, y: -0.4, vx: 0.3, vy: -0.8 },
      { x: 0.02, y: 0.01, vx: -2, vy: 7 },
    ];
    const row = new Float64Array(4);
    for (const start of starts) {
      const exact = preciseOrbit(start);
      const track = referenceTrack(orbitThrough(start));
      for (const steps of [1, 365, -12_345, 60_500_000, 1_000_000_007, 1e10, -1e10]) {
        const h = (0.09 + 0.02 * random()) * exact.a.toNumber() ** 1.5;
        track.statesAtSteps(steps, 1, h, row);
        const at = precisePosition(exact, precise(steps).mul(precise(h)));
        const dx = precise(row[0]!).sub(at.x).toNumber();
        const dy = precise(row[1]!).sub(at.y).toNumber();
        const error = Math.sqrt(dx * dx + dy * dy) / exact.a.toNumber() / unit;
        expect(error, `start ${JSON.stringify(start)}, step ${steps} of ${h}`).toBeLessThan(4);
        const r2 = at.x.mul(at.x).add(at.y.mul(at.y)).toNumber();
        const angle = Math.abs(at.x.toNumber() * dy - at.y.toNumber() * dx) / r2;
        expect(angle, `angle, start ${JSON.stringify(start)}, step ${steps} of ${h}`).toBeLessThan(1e-15);
      }
    }
  });

  test("times in two words: the same states as steps, and 1e8 periods away", () => {
    const start = stateAtTrueAnomalyDegrees(0.8, 100);
    const orbit = orbitThrough(start);
    const track = referenceTrack(orbit);
    const h = 0.0731;
    const count = 700;
    const steps = new Float64Array(4 * count);
    const times = new Float64Array(2 * count);
    const rows = new Float64Array(4 * count);
    track.statesAtSteps(8_500_000_000, count, h, steps);
    for (let k = 0; k < count; k++) {
      const t = ddScale(ddOf(h), 8_500_000_000 + k);
      times[2 * k] = t.hi;
      times[2 * k + 1] = t.lo;
    }
    track.statesAtTimes(times, count, rows);
    for (let k = 0; k < 4 * count; k++) expect(Math.abs(rows[k]! - steps[k]!)).toBeLessThan(4 * 3 * unit);
    const exact = exactState(orbit, twoSum(times[2 * 500]!, times[2 * 500 + 1]!));
    expect(Math.abs(rows[4 * 500]! - exact.x.hi)).toBeLessThan(4 * unit);
    const out = new Float64Array(4);
    track.stateAt(times[2 * 500]!, times[2 * 500 + 1]!, out);
    expect([...out]).toEqual([...rows.subarray(2000, 2004)]);
  });

  test("does not depend on how steps are grouped into calls", () => {
    const track = referenceTrack(orbitThrough(stateAtTrueAnomalyDegrees(0.95, 10)));
    const all = new Float64Array(4 * 1500);
    const part = new Float64Array(4 * 7);
    track.statesAtSteps(1e8, 1500, 0.013, all);
    for (const from of [0, 250, 255, 256, 1000, 1493]) {
      track.statesAtSteps(1e8 + from, 7, 0.013, part);
      expect([...part]).toEqual([...all.subarray(4 * from, 4 * from + 28)]);
    }
  });

  test("time reversal: a start at periapsis is symmetric to the bit", () => {
    const track = referenceTrack(orbitThrough(periapsisState(0.7)));
    const rows = new Float64Array(4 * 201);
    track.statesAtSteps(-100, 201, 0.037, rows);
    for (let k = 0; k <= 100; k++) {
      const before = rows.subarray(4 * (100 - k), 4 * (100 - k) + 4);
      const after = rows.subarray(4 * (100 + k), 4 * (100 + k) + 4);
      expect([before[0], 0 - before[1]!, 0 - before[2]!, before[3]]).toEqual([
        after[0],
        after[1]! + 0,
        after[2]! + 0,
        after[3],
      ]);
    }
  });

  // Computed at 40 digits for a = 1 and decimal e.
  test.each([
    [0.1, 1, 0.36372818224058107, 0.8815365059178707, -0.9290606863040317, 0.48384077591244223],
    [0.1, 6.25, 0.8993203182634153, -0.03667850175303313, 0.040956108396624134, 1.1047067526856436],
    [0.1, 100, 0.7329976332308223, -0.5505032185205913, 0.6035523172119532, 0.9041365399977819],
    [0.6, 1, -0.6289481768266242, 0.7996647309700393, -0.9825156909388113, -0.02276317009743042],
    [0.6, 6.25, 0.39657227686339663, -0.06618131210451722, 0.20575867467202114, 1.9829490532042324],
    [0.6, 100, -0.10418320443418061, -0.6947417155679506, 1.2361777626870762, 0.5646232510858645],
    [0.9, 1, -1.1871884663458634, 0.41752763873976423, -0.7611420105214913, -0.09947204787027349],
    [0.9, 6.25, 0.057113475875512174, -0.12628309830109538, 2.09031562421009, 3.010119035240512],
    [0.9, 100, -0.7506333330296452, -0.4310000275773213, 1.1423476744354137, 0.07521912809626714],
  ])("e = %d, t = %d, computed at 40 digits", (e, time, x, y, vx, vy) => {
    const orbit = orbitThrough(periapsisState(e));
    const row = new Float64Array(4);
    referenceTrack(orbit).stateAt(time, 0, row);
    // The start is rounded, so a is not quite 1: the phase moves by 3/2 t da, and e by as much as a.
    const axis = Math.abs(precisePair(orbit.semiMajorAxis).sub(1).toNumber());
    const shift = 1.5 * time * axis + 4 * axis + 2 ** -52;
    const r = Math.sqrt(x * x + y * y);
    const speed = Math.sqrt(vx * vx + vy * vy);
    expect(Math.abs(row[0]! - x)).toBeLessThan(shift * (speed + 2) + 4 * unit);
    expect(Math.abs(row[1]! - y)).toBeLessThan(shift * (speed + 2) + 4 * unit);
    expect(Math.abs(row[2]! - vx)).toBeLessThan(
      shift * (1 / (r * r) + speed / r) + 6 * unit * speed + 4 * unit,
    );
    expect(Math.abs(row[3]! - vy)).toBeLessThan(
      shift * (1 / (r * r) + speed / r) + 6 * unit * speed + 4 * unit,
    );
  });

  test("bad input", () => {
    const track = referenceTrack(orbitThrough(periapsisState(0.5)));
    const rows = new Float64Array(8);
    expect(() => track.statesAtSteps(0.5, 1, 0.1, rows)).toThrow(InvalidInputError);
    expect(() => track.statesAtSteps(2 ** 40, 1, 0.1, rows)).toThrow(
      "statesAtSteps.firstStep: must be an integer of magnitude at most 2^34, got 1099511627776",
    );
    expect(() => track.statesAtSteps(0, 3, 0.1, rows)).toThrow(
      "statesAtSteps.rows: must have room for four numbers a row, got 8",
    );
    expect(() => track.statesAtSteps(0, 1, Number.NaN, rows)).toThrow(
      "statesAtSteps.h: must be a finite number, got NaN",
    );
    expect(() => track.stateAt(Number.NaN, 0, rows)).toThrow(
      "stateAt.timeHi: must be a finite number, got NaN",
    );
    expect(() => track.statesAtTimes(new Float64Array(2), 2, rows)).toThrow(
      "statesAtTimes.times: must hold a high and a low word a time",
    );
  });
});
