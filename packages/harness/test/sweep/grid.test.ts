import { describe, expect, it } from "vitest";
import { gridCells, shardOf } from "../../src/sweep/grid.ts";
import { parseStudy } from "../../src/sweep/parse-study.ts";
import { listValues, type Study } from "../../src/sweep/study.ts";
import { stepper } from "../support.ts";

const study: Study = {
  format: "perigauge-study/1",
  steppers: ["rk4", "dormand-prince-54"],
  eccentricities: [0, 0.5],
  stepsPerOrbit: [100, 200, 400],
  tolerances: [1e-6],
  starts: ["periapsis", "apoapsis", 30],
  summations: ["plain", "compensated"],
};
const steppers = study.steppers.map(stepper);

describe("values", () => {
  it("a range holds both ends, evenly spaced, without stray digits", () => {
    expect(listValues({ from: 0, to: 0.9, count: 10 })).toEqual([
      0, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9,
    ]);
    expect(listValues({ from: 1e-4, to: 1e-8, count: 5, spacing: "log" })).toEqual([
      1e-4, 1e-5, 1e-6, 1e-7, 1e-8,
    ]);
    expect(listValues([0.3, 0.1])).toEqual([0.3, 0.1]);
  });
});

describe("grid", () => {
  it("gives each stepper its own knob: 2 e x 3 starts x 2 summations x (3 steps + 1 tolerance)", () => {
    const cells = gridCells(study, steppers);
    expect(cells.length).toBe(2 * 3 * 2 * (3 + 1));
    expect(cells.slice(0, 2)).toEqual([
      {
        stepper: "rk4",
        eccentricity: 0,
        stepsPerOrbit: 100,
        orbits: 10,
        startAnomalyDeg: 0,
        summation: "plain",
      },
      {
        stepper: "rk4",
        eccentricity: 0,
        stepsPerOrbit: 200,
        orbits: 10,
        startAnomalyDeg: 0,
        summation: "plain",
      },
    ]);
    expect(new Set(cells.map((cell) => JSON.stringify(cell))).size).toBe(cells.length);
    expect(new Set(cells.map(({ startAnomalyDeg }) => startAnomalyDeg))).toEqual(new Set([0, 180, 30]));
  });

  it("shards share no cell and leave none out", () => {
    const cells = gridCells(study, steppers);
    const parts = [1, 2, 3, 4, 5].map((index) => shardOf(cells, { index, of: 5 }));
    expect(parts.flat().length).toBe(cells.length);
    expect(new Set(parts.flat())).toEqual(new Set(cells));
    expect(parts[1]?.[0]).toBe(cells[1]);
  });

  it("names a stepper that has no knob to take", () => {
    expect(() => gridCells({ ...study, tolerances: undefined }, steppers)).toThrow(
      "dormand-prince-54: takes a tolerance, and the grid gives none",
    );
    expect(() => gridCells({ ...study, stepsPerOrbit: undefined }, steppers)).toThrow(
      "rk4: takes steps per orbit, and the grid gives none",
    );
  });
});

describe("study file", () => {
  it("is read as written", () => expect(parseStudy(JSON.parse(JSON.stringify(study)))).toEqual(study));

  it.each([
    [{ ...study, format: "other" }, 'study.format: must be "perigauge-study/1", got "other"'],
    [{ ...study, steppers: [] }, "study.steppers: must not be empty, got []"],
    [{ ...study, steppers: ["rk4", "rk4"] }, "study.steppers: names a stepper twice"],
    [{ ...study, eccentricity: 0.1 }, 'study: unknown field "eccentricity"'],
    [{ ...study, orbits: -1 }, "study.orbits: must be greater than 0, got -1"],
    [{ format: study.format, steppers: ["rk4"] }, /^study\.eccentricities: is missing/],
    [{ ...study, eccentricities: [1.2] }, "study.eccentricities[0]: must be less than 1, got 1.2"],
    [
      { ...study, tolerances: { from: 0.1, to: 1e-9, count: 1 } },
      "study.tolerances.count: must be at least 2, got 1",
    ],
    [
      { ...study, tolerances: "1e-6" },
      /^study\.tolerances: must be a list of numbers or \{ from, to, count, spacing \}/,
    ],
    [
      { ...study, eccentricities: { from: 0, to: 0.5, count: 3, spacing: "log" } },
      "study.eccentricities: must be above 0 at both ends where spacing is log, got 0",
    ],
  ])("refuses %j", (value, message) => {
    expect(() => parseStudy(value)).toThrow(message);
  });
});
