import type { Setting } from "../build/step-program.ts";
import type { Program } from "../program/program.ts";

/**
 * The state inside a step, from the state before it and the step's slopes as its program left them. Error: that of the continuous
 * formula's order.
 */
export type Interpolate = (
  theta: number,
  h: number,
  before: Float64Array,
  slopes: Float64Array,
  out: Float64Array,
) => void;

export interface Dense {
  readonly order: number;
  readonly interpolate: Interpolate;
  /** Stages that only interpolation needs: made, and counted, when a step is first interpolated. */
  readonly stages: ((setting: Setting) => Program) | null;
}

/** Ends of a step as they may look after rounding. */
const margin = 1e-12;

/** Whether theta lies in a step, rounding of the time allowed for. */
export const insideStep = (theta: number): boolean => theta >= -margin && theta <= 1 + margin;

type Rows = readonly (readonly number[])[];

/**
 * y(theta) = y0 + h sum_i b_i(theta) k_i, b_i(theta) = sum_k rows[i][k] theta^(k+1); `slopes` holds the velocities of all stages, then
 * their accelerations.
 */
export function rungeKuttaInterpolant(rows: Rows): Interpolate {
  return (theta, h, before, slopes, out) => {
    const d = before.length / 2;
    out.set(before);
    rows.forEach((row, i) => {
      const weight = h * theta * horner(row, theta);
      for (let k = 0; k < d; k += 1) {
        out[k] = out[k]! + weight * slopes[i * d + k]!;
        out[d + k] = out[d + k]! + weight * slopes[(rows.length + i) * d + k]!;
      }
    });
  };
}

/** q + theta h v + (theta h)^2 sum_i p_i(theta) a_i and v + theta h sum_i w_i(theta) a_i; `slopes` holds the accelerations. */
export function nystromInterpolant(position: Rows, velocity: Rows): Interpolate {
  return (theta, h, before, slopes, out) => {
    const d = before.length / 2;
    const s = theta * h;
    for (let k = 0; k < d; k += 1) {
      let q = 0;
      let v = 0;
      for (let i = 0; i < position.length; i += 1) {
        q += horner(position[i]!, theta) * slopes[i * d + k]!;
        v += horner(velocity[i]!, theta) * slopes[i * d + k]!;
      }
      out[k] = before[k]! + s * (before[d + k]! + s * q);
      out[d + k] = before[d + k]! + s * v;
    }
  };
}

function horner(row: readonly number[], x: number): number {
  let value = 0;
  for (let k = row.length - 1; k >= 0; k -= 1) value = value * x + row[k]!;
  return value;
}
