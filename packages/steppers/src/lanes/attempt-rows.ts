import type { Program } from "../program/program.ts";
import { ROW_BYTES } from "./lane-layout.ts";
import { type ValueRows, valueRows } from "./value-rows.ts";

const NAMES = [
  /** The step tried. */
  "h",
  /** The step to try next. */
  "step",
  "remaining",
  "endHi",
  "endLo",
  "tolerance",
  "longest",
  /** A step as short as this is accepted as it comes. */
  "smallest",
  /** The last accepted error to the power that the controller wants. */
  "previousPower",
  /** Mask: the last trial was rejected. */
  "afterRejection",
  "acceptedCount",
  "rejectedCount",
  "smallestStep",
  "ax",
  "ay",
  "newX",
  "newY",
  "newVx",
  "newVy",
  "error",
  "newAx",
  "newAy",
] as const;

export type AttemptRow = (typeof NAMES)[number];

/** Where a variable-step kernel keeps what outlives a stage: offsets in bytes from address 0. */
export interface AttemptRows {
  readonly at: Readonly<Record<AttemptRow, number>>;
  readonly trial: ValueRows;
  readonly first: ValueRows;
  readonly bytes: number;
}

export function attemptRows(trial: Program, first: Program): AttemptRows {
  const at = Object.fromEntries(NAMES.map((name, i) => [name, i * ROW_BYTES])) as Record<AttemptRow, number>;
  const ofTrial = valueRows(trial, NAMES.length * ROW_BYTES);
  const ofFirst = valueRows(first, ofTrial.end);
  return { at, trial: ofTrial, first: ofFirst, bytes: ofFirst.end };
}
