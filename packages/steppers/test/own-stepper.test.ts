import { describe, expect, it } from "vitest";
import { InvalidInputError, type OwnStepper, ownStepper } from "../src/index.ts";
import { periapsis, stateAfter } from "./support/runs.ts";

/** Velocity Verlet as a user would write it, without carrying the acceleration. */
const mine: OwnStepper = {
  id: "mine",
  step(q, v, h, acceleration) {
    const a = new Float64Array(q.length);
    acceleration(q, a);
    for (let k = 0; k < q.length; k += 1) {
      v[k] = v[k]! + 0.5 * h * a[k]!;
      q[k] = q[k]! + h * v[k]!;
    }
    acceleration(q, a);
    for (let k = 0; k < q.length; k += 1) v[k] = v[k]! + 0.5 * h * a[k]!;
  },
};

describe("a stepper of one's own", () => {
  it.each([2, 3] as const)(
    "in %d dimensions gives the bits of the built-in one, its evaluations counted",
    (dimension) => {
      const state = periapsis(0.3, dimension);
      const before = state.slice();
      const run = ownStepper(mine).begin({ state, step: 0.01 });
      const width = 2 * dimension;
      const rows = new Float64Array(width * 50);
      expect(run.advance(50, rows)).toBe(50);
      expect(run.evaluations).toBe(100);
      expect(state).toEqual(before);
      const builtIn = stateAfter("velocity-verlet", 50, { state, step: 0.01 });
      expect([...rows.slice(-width)]).toEqual([...builtIn]);
    },
  );
  it("takes a force of the caller's", () => {
    const run = ownStepper(mine).begin({
      state: Float64Array.of(1, 0, 0, 1),
      step: 0.1,
      acceleration: (_, out) => {
        out.fill(0);
      },
    });
    const rows = new Float64Array(4);
    run.advance(1, rows);
    expect([...rows]).toEqual([1, 0.1, 0, 1]);
  });
  it("refuses what it cannot do", () => {
    const state = periapsis(0);
    expect(() => ownStepper({ ...mine, id: "" })).toThrow(InvalidInputError);
    expect(() => ownStepper({ id: "x" } as unknown as OwnStepper)).toThrow(
      "own.step: must be a function, got undefined",
    );
    expect(() => ownStepper(mine).begin({ state, step: 0 })).toThrow(
      "start.step: must be finite and not zero, got 0",
    );
    expect(() => ownStepper(mine).begin({ state, step: 0.1, summation: "compensated" })).toThrow(
      InvalidInputError,
    );
    expect(() => ownStepper(mine).begin({ state: new Float64Array(3), step: 0.1 })).toThrow("start.state");
  });
});
