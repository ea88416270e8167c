import type { Summation } from "../score/score.ts";

/** Values listed one by one, or `count` of them from `from` to `to`, both included; spaced evenly, or evenly in their logarithms. */
export type Values =
  | readonly number[]
  | {
      readonly from: number;
      readonly to: number;
      readonly count: number;
      readonly spacing?: "linear" | "log" | undefined;
    };

/** A grid of cells, as written in a study file (format 1). Everything is normalised; starts are true anomalies. */
export interface Study {
  readonly format: "perigauge-study/1";
  readonly title?: string | undefined;
  /** Ids of steppers. */
  readonly steppers: readonly string[];
  readonly eccentricities: Values;
  /** For steppers of fixed step. */
  readonly stepsPerOrbit?: Values | undefined;
  /** For steppers of variable step. */
  readonly tolerances?: Values | undefined;
  /** Default: 10. */
  readonly orbits?: number | undefined;
  /** Default: periapsis. */
  readonly starts?: readonly ("periapsis" | "apoapsis" | number)[] | undefined;
  /** Default: plain. */
  readonly summations?: readonly Summation[] | undefined;
}

/** The values of a range carry twelve significant digits, so that 0:0.9:10 gives 0.3 and not its neighbour. */
const DIGITS = 12;

export function listValues(values: Values): readonly number[] {
  if (!("from" in values)) return values;
  const { from, to, count, spacing } = values;
  return Array.from({ length: count }, (_, i) => {
    if (i === 0 || count === 1) return from;
    if (i === count - 1) return to;
    const part = i / (count - 1);
    const value = spacing === "log" ? from * (to / from) ** part : from + (to - from) * part;
    return Number(value.toPrecision(DIGITS));
  });
}
