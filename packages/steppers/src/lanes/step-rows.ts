import { lower } from "../program/lower.ts";
import type { Program, Value } from "../program/program.ts";
import { ROW_BYTES } from "./lane-code.ts";

/** Where a step program keeps what outlives a stage. Offsets are in bytes; the working rows begin at address 0. */
export interface StepRows {
  /** Loop variables written to the stream, in its order: the state, then hi and lo of the time where steps are uneven. */
  readonly streamed: readonly number[];
  /** The other loop variables. */
  readonly carried: readonly number[];
  /** The two buffers of the carried variables. */
  readonly carriedAt: readonly [number, number];
  /** Offset of a value made before the loop, or made in one stage and used in a later one (h included). */
  readonly rowOf: ReadonlyMap<Value, number>;
  /** Offset of the row of step sizes. */
  readonly stepAt: number;
  /** Bytes in use from address 0. */
  readonly bytes: number;
}

export function stepRows(program: Program): StepRows {
  const { operations, outputs, inputs, time } = program;
  const { prologue, segments, rows } = lower(program);
  const width = 2 * program.dimension;
  const streamed = [...Array.from({ length: width }, (_, k) => k), ...(time ?? [])];
  const carried = Array.from({ length: inputs }, (_, k) => k).filter((k) => !streamed.includes(k));

  const rowOf = new Map<Value, number>();
  let count = 1;
  for (const id of prologue) {
    rowOf.set(id, count * ROW_BYTES);
    count += 1;
  }
  // A row is free again after the stage that reads it last.
  const crossing = new Set(rows.filter((id) => !outputs.includes(id) && operations[id]!.kind !== "variable"));
  const lastUse = new Map<Value, number>();
  segments.forEach((segment, s) => {
    for (const id of segment)
      for (const arg of operations[id]!.args) if (crossing.has(arg)) lastUse.set(arg, s);
  });
  const free: number[] = [];
  segments.forEach((segment, s) => {
    for (const id of segment) {
      if (!crossing.has(id)) continue;
      const row = free.pop() ?? count++;
      rowOf.set(id, row * ROW_BYTES);
    }
    for (const [id, last] of lastUse) if (last === s) free.push(rowOf.get(id)! / ROW_BYTES);
  });
  const carriedBytes = carried.length * ROW_BYTES;
  const first = count * ROW_BYTES;
  return {
    streamed,
    carried,
    carriedAt: [first, first + carriedBytes],
    rowOf,
    stepAt: 0,
    bytes: first + 2 * carriedBytes,
  };
}
