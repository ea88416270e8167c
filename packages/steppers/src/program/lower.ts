import { isCall, type Program, type Value } from "./program.ts";

/** A program arranged for an emitter; each list holds values in an order in which they can be computed. */
export interface Lowered {
  readonly constants: readonly Value[];
  /** What depends on constants and h alone: computed once before a loop over steps. */
  readonly prologue: readonly Value[];
  /** The rest, cut after each force evaluation. */
  readonly segments: readonly (readonly Value[])[];
  /** Values made in one segment and needed in a later one or as an output: what a loop over lanes keeps in memory. */
  readonly rows: readonly Value[];
}

export function lower(program: Program): Lowered {
  const constants: Value[] = [];
  const prologue: Value[] = [];
  const segments: Value[][] = [[]];
  const segmentOf = new Map<Value, number>();
  const rows = new Set<Value>();
  const fixed = new Set<Value>();
  program.operations.forEach((operation, id) => {
    if (operation.kind === "constant") constants.push(id);
    const invariant = operation.args.every((arg) => fixed.has(arg));
    if (operation.kind === "constant" || operation.kind === "step") fixed.add(id);
    else if (operation.kind !== "variable" && !isCall(operation) && invariant) {
      fixed.add(id);
      prologue.push(id);
    } else {
      segments.at(-1)!.push(id);
      segmentOf.set(id, segments.length - 1);
      for (const arg of operation.args) {
        const from = segmentOf.get(arg);
        if (from !== undefined && from < segments.length - 1) rows.add(arg);
      }
    }
    if (program.stageEnds.includes(id)) segments.push([]);
  });
  for (const id of program.outputs) if (segmentOf.has(id)) rows.add(id);
  return {
    constants,
    prologue,
    segments: segments.filter((segment) => segment.length > 0),
    rows: [...rows].sort((a, b) => a - b),
  };
}
