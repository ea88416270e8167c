import { findStepper } from "@perigauge/steppers";
import { Solver } from "odex";
import { describe, expect, it } from "vitest";

/*
 * End states against a general-purpose library of another kind: `odex` (npm), Gragg-Bulirsch-Stoer extrapolation with tolerances of
 * 1e-13. On one and a half orbits of e = 0.5 its own error is some hundred times its tolerance at most, so differences above 1e-11 are
 * ours; they must fall with the order of the method.
 */
function endState(end: number): readonly number[] {
  const solver = new Solver(4);
  solver.absoluteTolerance = 1e-13;
  solver.relativeTolerance = 1e-13;
  const motion = (_t: number, state: number[]): number[] => {
    const [x, y, vx, vy] = state as [number, number, number, number];
    const r2 = x * x + y * y;
    const cube = r2 * Math.sqrt(r2);
    return [vx, vy, -x / cube, -y / cube];
  };
  return solver.solve(motion, 0, [0.5, 0, 0, Math.sqrt(3)], end).y;
}

function difference(id: string, steps: number, end: number): number {
  const trajectory = findStepper(id)?.begin({
    state: Float64Array.of(0.5, 0, 0, Math.sqrt(3)),
    step: end / steps,
  });
  const rows = new Float64Array(4 * steps);
  trajectory?.advance(steps, rows);
  const reference = endState(end);
  return Math.max(...reference.map((value, i) => Math.abs(value - (rows[4 * (steps - 1) + i] as number))));
}

describe.each([
  ["rk4", 4],
  ["dormand-prince-5", 5],
] as const)("%s against a general-purpose library", (id, order) => {
  it("differs by its own error, which falls with its order", () => {
    const coarse = difference(id, 600, 9.5);
    const fine = difference(id, 1200, 9.5);
    expect(fine).toBeGreaterThan(1e-11);
    // Far above both floors the slope is within 0.25 of the order.
    expect(Math.abs(Math.log2(coarse / fine) - order)).toBeLessThan(0.25);
  });
});
