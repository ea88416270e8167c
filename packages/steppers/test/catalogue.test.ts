import { describe, expect, it } from "vitest";
import {
  catalogue,
  countEvaluations,
  countFlops,
  findStepper,
  InvalidInputError,
  pointMass,
} from "../src/index.ts";
import { periapsis, programStepper, stepper } from "./support/runs.ts";

describe("catalogue", () => {
  it("has every id once, with title, source and a known family", () => {
    const ids = catalogue.map(({ id }) => id);
    expect(new Set(ids).size).toBe(ids.length);
    for (const { id, title, source, order } of catalogue) {
      expect(id).toMatch(/^[a-z]+[a-z0-9]*(-[a-z0-9]+)*$/);
      expect(title.length).toBeGreaterThan(3);
      expect(source).toMatch(/\d{4}/);
      expect(order).toBeGreaterThan(0);
      expect(findStepper(id)?.id).toBe(id);
    }
  });
  it("knows other usual names, and nothing else", () => {
    expect(findStepper("yoshida-4")?.id).toBe("forest-ruth-4");
    expect(findStepper("implicit-midpoint")?.id).toBe("gauss-legendre-2");
    expect(findStepper("verner-65-efficient")).toBeUndefined();
    expect(findStepper("no-such")).toBeUndefined();
  });
  it("is plain data when written as JSON", () => {
    for (const found of catalogue) {
      const data = JSON.parse(JSON.stringify(found)) as Record<string, unknown>;
      expect(data.stages, found.id).toBeTypeOf("number");
      expect(Object.keys(data)).toContain("evaluationsPerStep");
    }
  });
});

/** New evaluations of a step as the literature counts them (an acceleration that serves two steps once), from the sources cited. */
const published: Readonly<Record<string, number>> = {
  "explicit-euler": 1,
  "explicit-midpoint": 2,
  "heun-2": 2,
  "ralston-2": 2,
  "heun-3": 3,
  rk4: 4,
  "kutta-38": 4,
  "bogacki-shampine-3": 3,
  "cash-karp-5": 6,
  "fehlberg-5": 6,
  "dormand-prince-5": 6,
  "bogacki-shampine-5": 7,
  "tsitouras-5": 6,
  "verner-6-robust": 8,
  "dormand-prince-8": 12,
  "nystrom-4": 3,
  "nystrom-5": 4,
  "dormand-nystrom-4": 3,
  "bettis-nystrom-5": 5,
  "dormand-nystrom-6": 5,
  "dormand-nystrom-6-dense": 5,
  "dormand-nystrom-8": 8,
  "dormand-nystrom-12": 17,
  "symplectic-euler": 1,
  "symplectic-euler-dk": 1,
  leapfrog: 1,
  "velocity-verlet": 1,
  "mclachlan-atela-2": 2,
  "ruth-3": 3,
  "mclachlan-atela-3": 3,
  "forest-ruth-4": 3,
  "forest-ruth-4-kdk": 3,
  "mclachlan-atela-4": 4,
  "calvo-sanz-serna-4": 4,
  "mclachlan-4-four": 4,
  "mclachlan-4-five": 5,
  "omelyan-4": 4,
  "blanes-moan-4": 6,
  "blanes-moan-nystrom-4": 6,
  "mclachlan-atela-5": 6,
  "blanes-moan-6": 10,
  "blanes-moan-nystrom-6": 11,
  "blanes-moan-nystrom-6-fine": 14,
  "suzuki-4": 5,
  "yoshida-6": 7,
  "yoshida-8": 15,
  "kahan-li-6": 9,
  "kahan-li-8": 17,
  "suzuki-umeno-8": 15,
  "sofroniou-spaletta-10": 35,
  "sofroniou-spaletta-10-kdk": 35,
  "adams-bashforth-moulton-8": 2,
  "gauss-jackson-8": 2,
  // 1 + sum (n_j - 1), and 1 + sum n_j.
  "bulirsch-stoer-8": 17,
  "bulirsch-stoer-10": 28,
  "stormer-extrapolation-8": 11,
  "hermite-4": 1,
  "logarithmic-leapfrog": 1,
};

describe("evaluations per step, counted from the program, are the published ones", () => {
  it.each(Object.entries(published))("%s: %d", (id, evaluations) => {
    expect(stepper(id).evaluationsPerStep).toBe(evaluations);
  });
  it("verner-6-1978 needs seven of its eight stages at fixed step: the last serves the error estimate", () => {
    expect(stepper("verner-6-1978").evaluationsPerStep).toBe(7);
  });
});

it("operations of a planar leapfrog step: three times two additions and products, and eight for the force", () => {
  const { step } = programStepper("leapfrog").program({ dimension: 2, summation: "plain", force: pointMass });
  expect(countFlops(step)).toBe(3 * 4 + 8);
  expect(countEvaluations(step)).toBe(1);
});

describe("wrong use of a fixed step", () => {
  const fixed = stepper("rk4");
  it.each([
    ["state of five numbers", { state: new Float64Array(5), step: 0.1 }, "start.state"],
    ["step of zero", { state: periapsis(0), step: 0 }, "start.step"],
    ["step not a number", { state: periapsis(0), step: Number.NaN }, "start.step"],
  ])("%s", (_, start, where) => {
    expect(() => fixed.begin(start)).toThrow(InvalidInputError);
    expect(() => fixed.begin(start)).toThrow(where);
  });
  it("a number of steps that is not whole, or rows too short", () => {
    const run = fixed.begin({ state: periapsis(0), step: 0.1 });
    expect(() => run.advance(1.5, new Float64Array(8))).toThrow("advance.maxSteps");
    expect(() => run.advance(-1, new Float64Array(8))).toThrow("advance.maxSteps");
    expect(() => run.advance(3, new Float64Array(8))).toThrow(
      "advance.rows: must hold at least 12 numbers, got 8",
    );
    expect(run.evaluations).toBe(0);
  });
  it("an acceleration without its jerk for the one method that needs it", () => {
    const acceleration = (): void => {};
    expect(() => stepper("hermite-4").begin({ state: periapsis(0), step: 0.1, acceleration })).toThrow(
      "start.jerk",
    );
  });
});

it("goes on where it stopped: one call of many steps or many calls of one", () => {
  for (const id of ["rk4", "velocity-verlet", "gauss-jackson-8", "gauss-legendre-4"]) {
    const start = { state: periapsis(0.3), step: 0.05 };
    const whole = new Float64Array(40);
    stepper(id).begin(start).advance(10, whole);
    const run = stepper(id).begin(start);
    const row = new Float64Array(4);
    for (let n = 0; n < 10; n += 1) run.advance(1, row);
    expect([...row], id).toEqual([...whole.slice(-4)]);
  }
});
