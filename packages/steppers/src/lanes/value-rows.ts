import { lower } from "../program/lower.ts";
import type { Program, Value } from "../program/program.ts";
import { ROW_BYTES } from "./lane-layout.ts";

/** Rows for the values of a program that outlive a stage and are no outputs; a row is used again once its value has been read last. */
export interface ValueRows {
  /** Offset in bytes of a value made before the loop, or made in one stage and used in a later one. */
  readonly rowOf: ReadonlyMap<Value, number>;
  /** First offset after these rows. */
  readonly end: number;
}

/** `first`: offset of the first row that is free. */
export function valueRows(program: Program, first: number): ValueRows {
  const { operations, outputs } = program;
  const { prologue, segments, rows } = lower(program);
  const rowOf = new Map<Value, number>();
  let end = first;
  const fresh = (): number => {
    end += ROW_BYTES;
    return end - ROW_BYTES;
  };
  for (const id of prologue) rowOf.set(id, fresh());
  const isOutput = new Set(outputs);
  const crossing = new Set(rows.filter((id) => !isOutput.has(id) && operations[id]!.kind !== "variable"));
  const lastUse = new Map<Value, number>();
  segments.forEach((segment, s) => {
    for (const id of segment) {
      for (const arg of operations[id]!.args) if (crossing.has(arg)) lastUse.set(arg, s);
    }
  });
  const lastIn: Value[][] = segments.map(() => []);
  for (const [id, s] of lastUse) lastIn[s]!.push(id);
  const free: number[] = [];
  segments.forEach((segment, s) => {
    for (const id of segment) if (crossing.has(id)) rowOf.set(id, free.pop() ?? fresh());
    // Not before the stage is over: its lanes take turns.
    for (const id of lastIn[s]!) free.push(rowOf.get(id)!);
  });
  return { rowOf, end };
}
