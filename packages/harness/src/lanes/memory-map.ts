import { ROW_BYTES } from "@perigauge/steppers";
import { STEP_MEASURES, type StepMeasure } from "../score/score.ts";

/** Steps between two looks from outside: numerical and exact states of a chunk stay in the second-level cache. */
export const CHUNK = 128;

/** Bytes from address 0 that step kernels may work in. */
export const WORK_BYTES: number = 256 * 1024;

type Offsets<Name extends string> = Readonly<Record<Name, number>>;

function rowsFrom<Name extends string>(base: number, names: readonly Name[]): Offsets<Name> {
  return Object.fromEntries(names.map((name, i) => [name, base + i * ROW_BYTES])) as Offsets<Name>;
}

const TRACK_ROWS = [
  "step",
  "w1",
  "w2",
  "w3",
  "w4",
  "rateHi",
  "rateLo",
  "rateUpper",
  "rateLower",
  "startHi",
  "startLo",
  "e",
  "axisRatio",
  "offset",
  "tableBias",
  "px",
  "py",
  "qx",
  "qy",
  "meanMotion",
  "meanHi",
  "meanLo",
  "side",
  "cosNode",
  "sinNode",
  "alongNode",
  "acrossNode",
  "radiusNode",
  "q",
  "sineTerm",
  "cosineTerm",
  "correction",
] as const;

const SCORE_ROWS = [
  "step",
  "alive",
  "lastAlive",
  "side",
  "energy0",
  "energyScale",
  "momentum0",
  "momentumScale",
  "apsisX",
  "apsisY",
  "collision2",
  "startX",
  "startY",
  "phase",
  "apsis",
  "uncertain",
  "inverse",
  "momentum",
] as const;

/** Rows of the exact track, per lane: its constants, and `step`, the steps made. */
export const trackRows: Offsets<(typeof TRACK_ROWS)[number]> = rowsFrom(WORK_BYTES, TRACK_ROWS);

const SCORE_BASE = WORK_BYTES + TRACK_ROWS.length * ROW_BYTES;

/** Rows of scoring, per lane: constants of the exact orbit, what is carried from step to step, and `step`, the steps scored. */
export const scoreRows: Offsets<(typeof SCORE_ROWS)[number]> = rowsFrom(SCORE_BASE, SCORE_ROWS);

const MAXIMA_BASE = SCORE_BASE + SCORE_ROWS.length * ROW_BYTES;

/** Largest absolute value of each measure so far, and the step it was met at. */
export const maximumRows: Offsets<StepMeasure> = rowsFrom(MAXIMA_BASE, STEP_MEASURES);
export const maximumAtRows: Offsets<StepMeasure> = rowsFrom(
  MAXIMA_BASE + STEP_MEASURES.length * ROW_BYTES,
  STEP_MEASURES,
);

/** First address after the rows of lanes. */
const ROWS_END = MAXIMA_BASE + 2 * STEP_MEASURES.length * ROW_BYTES;

/** Rows that belong to a lane and move with it, as indices of doubles. */
export const laneRows: readonly number[] = Array.from(
  { length: (ROWS_END - WORK_BYTES) / ROW_BYTES },
  (_, i) => (WORK_BYTES + i * ROW_BYTES) / 8,
);

/** arctan(k/32) in two words, k = 0 .. 32. */
export const NODES_AT: number = ROWS_END;
/** One 32-bit word a step: which lanes passed periapsis in it. */
export const EVENTS_AT: number = NODES_AT + 1024;

/** Bytes of four rows: a state of every lane. */
export const STATE_BYTES: number = 4 * ROW_BYTES;
/** Exact states: row 0 at the steps made, row n after n more steps. */
export const EXACT_AT: number = EVENTS_AT + 4 * CHUNK;
/** Numerical states likewise, with the time where steps are uneven. */
export const STREAM_AT: number = EXACT_AT + (CHUNK + 1) * STATE_BYTES;
/** Bytes of the stream per step where it holds times: a state, then hi and lo of the time. */
export const UNEVEN_STREAM_BYTES: number = 6 * ROW_BYTES;
/** Anomaly tables. */
export const TABLES_AT: number = STREAM_AT + (CHUNK + 1) * UNEVEN_STREAM_BYTES;
export const TABLES_BYTES: number = 8 * 1024 * 1024;
