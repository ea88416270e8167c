/** A value of a program: the index of the operation that makes it. */
export type Value = number;

/**
 * One operation on doubles. `variable` reads loop variable `index` as it stands at the start of the step; `acceleration` calls a force
 * that the caller supplies (`jerk` its derivative, from position and velocity) and `component` takes one of its results; `less-equal` gives 1 or 0 and `select` takes its second argument
 * where the first is not 0, else its third.
 */
export type Operation =
  | { readonly kind: "step"; readonly args: readonly [] }
  | { readonly kind: "variable"; readonly index: number; readonly args: readonly [] }
  | {
      readonly kind: "constant";
      readonly value: number;
      /** Exact value minus `value`, rounded: for proofs in double-double arithmetic. */
      readonly tail: number;
      readonly args: readonly [];
    }
  | { readonly kind: BinaryKind; readonly args: readonly [Value, Value] }
  | { readonly kind: "sqrt" | "abs"; readonly args: readonly [Value] }
  | { readonly kind: "select"; readonly args: readonly [Value, Value, Value] }
  | { readonly kind: "acceleration" | "jerk"; readonly args: readonly Value[] }
  | { readonly kind: "component"; readonly index: number; readonly args: readonly [Value] };

export type BinaryKind = "add" | "sub" | "mul" | "div" | "max" | "less-equal";

export type Dimension = 2 | 3;

/**
 * A straight-line program: operations in order, each using earlier ones only. A step reads its loop variables (positions, velocities,
 * then what the method carries from step to step) and yields the next value of each; every other use simply maps inputs to outputs.
 */
export interface Program {
  readonly dimension: Dimension;
  readonly inputs: number;
  readonly operations: readonly Operation[];
  readonly outputs: readonly Value[];
  /** Last operation of each force evaluation, in order: the cuts between stages. */
  readonly stageEnds: readonly Value[];
  /** Which of the loop variables hold the time reached (hi, lo); only where steps are uneven. */
  readonly time: readonly [hi: number, lo: number] | null;
}

/** A fixed step: what fills the carried variables from the state once, and what advances all variables by one step. */
export interface StepProgram {
  /** Inputs: the state. Outputs: the state and the carried variables. */
  readonly start: Program;
  readonly step: Program;
}

/** True for the operations that call a force which the caller supplies. */
export function isCall(operation: Operation): boolean {
  return operation.kind === "acceleration" || operation.kind === "jerk";
}
