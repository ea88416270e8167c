import { expect } from "vitest";
import {
  findStepper,
  type ProgramStepper,
  type Start,
  type Stepper,
  type Trajectory,
} from "../../src/index.ts";

/** Periapsis start, normalised units; in space the orbit is tilted about the x axis by the angle of cosine 0.6 and sine 0.8. */
export function periapsis(e: number, dimension: 2 | 3 = 2): Float64Array {
  const v = Math.sqrt((1 + e) / (1 - e));
  return dimension === 2
    ? Float64Array.of(1 - e, 0, 0, v)
    : Float64Array.of(1 - e, 0, 0, 0, v * 0.6, v * 0.8);
}

export function stepper(id: string): Stepper {
  const found = findStepper(id);
  expect(found, id).toBeDefined();
  return found!;
}

export function programStepper(id: string): ProgramStepper {
  const found = stepper(id);
  expect("program" in found, `${id} is a program`).toBe(true);
  return found as ProgramStepper;
}

/** State after `steps` steps. */
export function stateAfter(id: string, steps: number, start: Start): Float64Array {
  return advanceTo(stepper(id).begin(start), steps, start.state.length);
}

export function advanceTo(run: Trajectory, steps: number, width: number): Float64Array {
  const rows = new Float64Array(width * steps);
  const times = new Float64Array(2 * steps);
  expect(run.advance(steps, rows, times)).toBe(steps);
  return rows.slice(width * (steps - 1));
}

/** Runs a variable-step trajectory to its end: last state, last time, steps. */
export function runToEnd(
  run: Trajectory,
  width: number,
): { state: Float64Array; time: [number, number]; steps: number } {
  const rows = new Float64Array(width);
  const times = new Float64Array(2);
  let steps = 0;
  while (run.advance(1, rows, times) === 1) steps += 1;
  return { state: rows, time: [times[0]!, times[1]!], steps };
}

export const energy = (s: ArrayLike<number>): number => {
  const d = s.length / 2;
  let r2 = 0;
  let v2 = 0;
  for (let k = 0; k < d; k += 1) {
    r2 += s[k]! * s[k]!;
    v2 += s[d + k]! * s[d + k]!;
  }
  return v2 / 2 - 1 / Math.sqrt(r2);
};

/** Exact planar orbit from periapsis at time t: Kepler's equation by Newton's method; error about 1e-16 (2 + t). */
export function exactState(e: number, t: number): Float64Array {
  let E = t + e * Math.sin(t);
  for (let i = 0; i < 50; i += 1) E -= (E - e * Math.sin(E) - t) / (1 - e * Math.cos(E));
  const b = Math.sqrt((1 - e) * (1 + e));
  const rate = 1 / (1 - e * Math.cos(E));
  return Float64Array.of(Math.cos(E) - e, b * Math.sin(E), -Math.sin(E) * rate, b * Math.cos(E) * rate);
}

export function distance(a: ArrayLike<number>, b: ArrayLike<number>): number {
  let sum = 0;
  for (let k = 0; k < a.length; k += 1) sum += (a[k]! - b[k]!) ** 2;
  return Math.sqrt(sum);
}
