import { twoPi } from "../arithmetic/constants.ts";
import {
  type DoubleDouble,
  ddAdd,
  ddDivide,
  ddMultiply,
  ddOf,
  ddScale,
  ddSqrt,
  ddSubtract,
} from "../arithmetic/double-double.ts";
import { anomalyNode } from "../equation/anomaly-node.ts";
import { solveKepler } from "../equation/solve-kepler.ts";

/** Cells an octave of (mean anomaly + offset): 2^7. */
const cellBits = 7;
/** Bits of the high word below the cell number. */
export const cellShift: number = 20 - cellBits;
/** Doubles a cell. */
export const cellSize = 8;

/**
 * Half an orbit of one eccentricity: mean anomalies mu in turns, 0 <= mu <= 1/2, in cells of equal width in log2(mu + offset), 128
 * an octave. The offset follows the time scale (1 - e)^(3/2) of the periapsis passage, so the cells thin out from there and what a
 * cell leaves to the fourth-order step of `anomalyCorrection` is as small at e = 0.9999 as at e = 0.
 *
 * A row: mean anomaly of the node in two words (turns), cos E, sin E, cos E - e, sqrt(1 - e^2) sin E, r = 1 - e cos E, 1/r; each
 * rounded once from double-double. The number of a cell is the upper part of the bits of mu + offset, minus `firstCell`.
 */
export interface AnomalyTable {
  readonly eccentricity: DoubleDouble;
  readonly offset: number;
  readonly firstCell: number;
  readonly rows: Float64Array;
}

const bits: Float64Array = new Float64Array(1);
const words: Uint32Array = new Uint32Array(bits.buffer);
const one = ddOf(1);
const perTurn = ddDivide(one, twoPi);

/** Number of the cell of a positive double, counted from 0. */
function cellOf(value: number): number {
  bits[0] = value;
  return words[1]! >>> cellShift;
}

/** Middle of a cell. */
function middleOf(cell: number): number {
  words[0] = 0;
  words[1] = (cell << cellShift) | (1 << (cellShift - 1));
  return bits[0]!;
}

/** Nearest anomaly with at most 7 bits, and no finer than 2^-6 of the power of two below the scale of the passage. */
function nodeNear(anomaly: number, scale: number): number {
  bits[0] = Math.max(anomaly, scale);
  words[0] = 0;
  words[1] = words[1]! & 0x7ff00000;
  const quantum = bits[0]! / 64;
  return Math.round(anomaly / quantum) * quantum;
}

/** The table of an eccentricity in [0, 1). */
export function buildAnomalyTable(eccentricity: DoubleDouble): AnomalyTable {
  const complement = ddSubtract(one, eccentricity);
  const axisRatio = ddSqrt(ddMultiply(complement, ddAdd(one, eccentricity)));
  const c = complement.hi;
  const scale = Math.sqrt(2 * c);
  const offset = (c * scale) / twoPi.hi;
  const firstCell = cellOf(offset);
  const count = cellOf(0.5 + offset) - firstCell + 1;
  const rows = new Float64Array(count * cellSize);
  for (let k = 0; k < count; k++) {
    const mean = (middleOf(firstCell + k) - offset) * twoPi.hi;
    const bounded = mean < 0 ? 0 : Math.min(mean, Math.PI);
    const node = anomalyNode(nodeNear(solveKepler(eccentricity.hi, bounded), Math.min(scale, 1)));
    const turns = ddMultiply(
      ddAdd(ddScale(complement, node.anomaly), ddMultiply(eccentricity, node.lag)),
      perTurn,
    );
    const r = ddAdd(complement, ddMultiply(eccentricity, ddSubtract(one, node.cos)));
    const at = k * cellSize;
    rows[at] = turns.hi;
    rows[at + 1] = turns.lo;
    rows[at + 2] = node.cos.hi;
    rows[at + 3] = node.sin.hi;
    rows[at + 4] = ddSubtract(node.cos, eccentricity).hi;
    rows[at + 5] = ddMultiply(axisRatio, node.sin).hi;
    rows[at + 6] = r.hi;
    rows[at + 7] = 1 / r.hi;
  }
  return { eccentricity, offset, firstCell, rows };
}
