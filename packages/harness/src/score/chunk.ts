/**
 * A run is scored chunk by chunk, so that memory stays flat whatever its length: the stepper fills `rows`, the reference fills `exact`,
 * and each measure then walks both in a loop of its own.
 */
export interface Chunk {
  /** Index of the first step after the start in this chunk, counted from 1. */
  firstStep: number;
  count: number;
  /** Numerical states x, y, vx, vy, four numbers a step. */
  readonly rows: Float64Array;
  /** Exact states at the same times. */
  readonly exact: Float64Array;
  /** Times reached as hi, lo pairs; used only where steps are uneven. */
  readonly times: Float64Array;
}

/** Steps in a chunk: rows, exact states and errors of it stay in the second-level cache. */
export const CHUNK_STEPS = 1024;

export function makeChunk(): Chunk {
  return {
    firstStep: 1,
    count: 0,
    rows: new Float64Array(4 * CHUNK_STEPS),
    exact: new Float64Array(4 * CHUNK_STEPS),
    times: new Float64Array(2 * CHUNK_STEPS),
  };
}
