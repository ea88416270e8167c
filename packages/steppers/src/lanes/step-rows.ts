import type { Program, Value } from "../program/program.ts";
import { ROW_BYTES } from "./lane-layout.ts";
import { valueRows } from "./value-rows.ts";

/** Where a step program keeps what outlives a stage. Offsets are in bytes; the working rows begin at address 0. */
export interface StepRows {
  /** Loop variables written to the stream, in its order: the state, then hi and lo of the time where steps are uneven. */
  readonly streamed: readonly number[];
  /** The other loop variables. */
  readonly carried: readonly number[];
  /** The two buffers of the carried variables. */
  readonly carriedAt: readonly [number, number];
  readonly rowOf: ReadonlyMap<Value, number>;
  /** Offset of the row of step sizes. */
  readonly stepAt: number;
  /** Bytes in use from address 0. */
  readonly bytes: number;
}

export function stepRows(program: Program): StepRows {
  const { inputs, time } = program;
  const width = 2 * program.dimension;
  const streamed = [...Array.from({ length: width }, (_, k) => k), ...(time ?? [])];
  const carried = Array.from({ length: inputs }, (_, k) => k).filter((k) => !streamed.includes(k));
  const { rowOf, end } = valueRows(program, ROW_BYTES);
  const carriedBytes = carried.length * ROW_BYTES;
  return {
    streamed,
    carried,
    carriedAt: [end, end + carriedBytes],
    rowOf,
    stepAt: 0,
    bytes: end + 2 * carriedBytes,
  };
}
