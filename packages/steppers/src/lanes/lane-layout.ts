import type { Bytes } from "./encoder.ts";

/** Trajectories in a block: one row of memory holds one quantity of all of them. */
export const LANES = 16;
/** Bytes of a row. */
export const ROW_BYTES: number = 8 * LANES;
/** Bytes of a pair of lanes: what one vector instruction works on. */
export const PAIR_BYTES = 16;

/** Something to push onto the operand stack: a local, a constant, or a row read where it is used. */
export interface Operand {
  readonly push: Bytes;
}

/** A local that holds a 32-bit integer, such as a pointer. */
export interface Pointer extends Operand {
  readonly local: number;
}
