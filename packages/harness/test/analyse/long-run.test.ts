import { setFlagsFromString } from "node:v8";
import { runInNewContext } from "node:vm";
import { describe, expect, it } from "vitest";
import { longRun } from "../../src/analyse/long-run.ts";
import type { Cell } from "../../src/score/score.ts";
import { cell, score, stepper } from "../support.ts";

const run = (fields: Partial<Cell> & Pick<Cell, "stepper" | "eccentricity">) =>
  longRun(cell(fields), stepper(fields.stepper));

describe("long run", () => {
  it("samples evenly in log time and ends with the last step", () => {
    const found = run({ stepper: "leapfrog", eccentricity: 0.4, stepsPerOrbit: 100.37, orbits: 1000 });
    const { series } = found;
    expect(series.length).toBeGreaterThan(190);
    expect(series.length).toBeLessThanOrEqual(200);
    const ratios = series.slice(60).map(({ orbit }, i) => Math.log(orbit / (series[59 + i]?.orbit ?? 1)));
    const even = Math.log(1000 / 0.125) / 199;
    // A sample falls on the first step at or after its time: up to a step late, of at least 9 orbits here.
    for (const ratio of ratios) expect(Math.abs(ratio - even)).toBeLessThan(0.01 / 1);
    const last = series.at(-1);
    expect(last?.energy).toBe(found.score.energy.final);
    expect(last?.phase).toBe(found.score.phase.final);
    expect(last?.timing).toBe(found.score.timing.final);
    expect(last?.apsis).toBe(found.score.apsis.final);
    expect(Math.max(...series.map(({ energyMax }) => energyMax))).toBe(found.score.energy.max);
  });

  it("its exponents are those of the score, with the orbits behind them", () => {
    const { growth, score: found } = run({
      stepper: "rk4",
      eccentricity: 0.3,
      stepsPerOrbit: 120.37,
      orbits: 512,
    });
    expect(growth.energy.growthExponent).toBe(found.energy.growthExponent);
    expect(growth.energy.points).toBe(25);
    // Orbit means are weighted by differences of times here and by the step there: equal to rounding.
    expect(growth.phase.growthExponent).toBeCloseTo(found.phase.growthExponent as number, 8);
    expect(growth.phase.growthStandardError).toBeCloseTo(found.phase.growthStandardError as number, 8);
  });

  // Precession of leapfrog per orbit: -(pi/8) h^2 (4 + e^2)/(1 - e^2)^3 (derived; verified in 45 digits), next term of relative size (h c)^2.
  it("apsidal precession per orbit with its standard error", () => {
    const e = 0.3;
    const stepsPerOrbit = 500.37;
    const { apsisPerOrbit } = run({ stepper: "leapfrog", eccentricity: e, stepsPerOrbit, orbits: 256 });
    const h = (2 * Math.PI) / stepsPerOrbit;
    const wanted = (-(Math.PI / 8) * h ** 2 * (4 + e * e)) / (1 - e * e) ** 3;
    expect(Math.abs((apsisPerOrbit?.value ?? 0) / wanted - 1)).toBeLessThan((2 * h) ** 2);
    expect(apsisPerOrbit?.points).toBe(64);
    expect(apsisPerOrbit?.standardError).toBeLessThan(1e-4 * Math.abs(wanted));
  });

  it("uneven steps, circular orbits and divergence", () => {
    const uneven = run({ stepper: "dormand-prince-54", eccentricity: 0.3, tolerance: 1e-7, orbits: 200 });
    expect(uneven.energyTrend).toBe("drifting");
    expect(uneven.series.at(-1)?.orbit).toBeCloseTo(200, 9);
    const circular = run({ stepper: "leapfrog", eccentricity: 0, stepsPerOrbit: 60.37, orbits: 200 });
    expect(circular.apsisPerOrbit).toBeNull();
    expect(circular.series.every(({ apsis }) => apsis === null)).toBe(true);
    const diverged = run({ stepper: "rk4", eccentricity: 0.9, stepsPerOrbit: 30, orbits: 500 });
    expect(diverged.energyTrend).toBeNull();
    expect(diverged.energyTrendNote).toBe("the run ended early");
    expect(diverged.notes[0]).toMatch(/^diverged \(escaped\)/);
    expect(diverged.growth.phase.reason).toBe("the run ended early");
  });

  it("takes as much memory for a hundred times the orbits", () => {
    setFlagsFromString("--expose-gc");
    const collect = runInNewContext("gc") as () => void;
    const held = (orbits: number): number => {
      collect();
      const before = process.memoryUsage();
      const result = run({ stepper: "leapfrog", eccentricity: 0.1, stepsPerOrbit: 12.37, orbits });
      collect();
      const after = process.memoryUsage();
      expect(result.series.length).toBeLessThanOrEqual(200);
      return after.heapUsed + after.arrayBuffers - before.heapUsed - before.arrayBuffers;
    };
    held(500);
    // A number kept per orbit would be 0.4 MB for the longer run.
    expect(held(50_000) - held(500)).toBeLessThan(2e5);
  });
});

describe("growth judged by the score", () => {
  it("agrees with a run that is not watched", () => {
    const fields = { stepper: "yoshida-6", eccentricity: 0.2, stepsPerOrbit: 50.37, orbits: 128 };
    expect(run(fields).score).toEqual(score(fields));
  });
});
