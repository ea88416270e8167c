import { describe, expect, it } from "vitest";
import { buildFleet, pointAt } from "../../src/choose/fleet.ts";
import { knobOf } from "../../src/choose/knob.ts";
import { runCell } from "../../src/run/run-cell.ts";
import type { Scenario } from "../../src/scenario/scenario.ts";
import { FULL_PLAN } from "../../src/score/run-scorer.ts";
import { stepper } from "../support.ts";
import { scenarioOf } from "./context.ts";

function knob(id: string, step?: Scenario["step"]) {
  const scenario = scenarioOf(
    { limits: [{ alongTrackKm: 1 }], ...(step === undefined ? {} : { step }) },
    0.3,
  );
  const fleet = buildFleet(scenario);
  return { knob: knobOf(stepper(id), scenario, fleet), fleet, period: fleet.shortestPeriodSeconds };
}

describe("a step knob", () => {
  it("keeps to the grid and the cap of the scenario", () => {
    const { knob: rk4, period } = knob("rk4", { maxSeconds: 62, multipleOfSeconds: 5 });
    expect(rk4.physical(rk4.coarsest).stepSeconds).toBe(60);
    expect(rk4.physical(rk4.finest).stepSeconds).toBe(5);
    let fineness = rk4.coarsest;
    const seen: (number | null)[] = [];
    for (let i = 0; i < 40; i++) {
      seen.push(rk4.physical(fineness).stepSeconds);
      fineness = rk4.move(fineness, 1.03);
    }
    expect([...new Set(seen)]).toEqual([60, 55, 50, 45, 40, 35, 30, 25, 20, 15, 10, 5]);
    expect(rk4.physical(rk4.snap(period / 33.4)).stepSeconds).toBe(30);
  });

  it("moves back to where it came from, and no further than its ends", () => {
    const { knob: rk4 } = knob("rk4");
    expect(rk4.move(rk4.move(200, 1.03), 1 / 1.03)).toBeCloseTo(200, 9);
    expect(rk4.move(rk4.coarsest, 0.5)).toBe(rk4.coarsest);
    expect(rk4.move(rk4.finest, 2)).toBe(rk4.finest);
  });

  it("rounds the step in seconds once to normalised units", () => {
    const { knob: rk4, fleet } = knob("rk4", { multipleOfSeconds: 5 });
    const point = pointAt(fleet, 0, 0, 0);
    const cell = rk4.cellAt(point, 0, rk4.snap(fleet.shortestPeriodSeconds / 30), 86400);
    expect(cell.step).toBe(30 * point.meanMotion);
    expect(cell.orbits).toBe((86400 * point.meanMotion) / (2 * Math.PI));
  });
});

describe("a step knob of uneven steps", () => {
  it("has no grid, is capped by its largest step, and its runs cover the duration from any start", () => {
    const { knob: sundman, fleet, period } = knob("sundman-rk4", { maxSeconds: 60, multipleOfSeconds: 5 });
    // The step at apoapsis is 1 + e times the mean one.
    expect(sundman.coarsest).toBeCloseTo((period / 60) * 1.3, 9);
    expect(sundman.physical(200).stepSeconds).toBeNull();
    for (const startAnomalyDeg of [0, 45, 90, 180, -90]) {
      const seconds = 3.4 * period;
      const cell = sundman.cellAt(pointAt(fleet, 0, 0, 0), startAnomalyDeg, sundman.coarsest, seconds);
      const { finalState } = runCell(cell, stepper("sundman-rk4"), FULL_PLAN);
      expect(finalState.t).toBeGreaterThanOrEqual(3.4 * 2 * Math.PI);
    }
  });
});

describe("a tolerance knob", () => {
  it("walks eighths of a decade that read well", () => {
    const { knob: pair } = knob("dormand-prince-54");
    let fineness = pair.snap(1e9);
    const seen: (number | null)[] = [];
    for (let i = 0; i < 9; i++) {
      seen.push(pair.physical(fineness).tolerance);
      fineness = pair.move(fineness, pair.notch);
    }
    expect(seen).toEqual([1e-9, 7.5e-10, 5.62e-10, 4.22e-10, 3.16e-10, 2.37e-10, 1.78e-10, 1.33e-10, 1e-10]);
    for (let i = 0; i < 9; i++) fineness = pair.move(fineness, 1 / pair.notch);
    expect(pair.physical(fineness).tolerance).toBe(1e-9);
  });

  it("holds the scenario's step cap against the pair's own steps", () => {
    const { knob: pair, fleet } = knob("dormand-prince-54", { maxSeconds: 60 });
    const point = pointAt(fleet, 0, 0, 0);
    expect(pair.cellAt(point, 0, 1e9, 86400).maxStep).toBe(60 * point.meanMotion);
  });
});
