import { splitter } from "../arithmetic/two-product.ts";
import { anomalyCorrection } from "../equation/anomaly-correction.ts";
import { refuse, requireFinite } from "../errors.ts";
import type { PlanarOrbit } from "../planar/planar-orbit.ts";
import { cellShift, cellSize } from "./anomaly-table.ts";
import { stepWords, type TrackConstants, trackConstants } from "./track-constants.ts";

/** Adding and subtracting 1.5 2^52 rounds to the nearest integer. */
const toNearest = 6755399441055744;
/** Largest index of a step. */
const largestStep = 2 ** 34;
/** Points a block: mean anomalies are made for a block, then states. */
const blockSize = 256;

const bits: Float64Array = new Float64Array(1);
const words: Uint32Array = new Uint32Array(bits.buffer);
/** Mean anomalies of a block in turns: high words, then low words. */
const meanHi: Float64Array = new Float64Array(blockSize);
const meanLo: Float64Array = new Float64Array(blockSize);

/**
 * The exact states of one bound orbit at many times (normalised units): what a trajectory is scored against.
 *
 * A row is x, y, vx, vy. Each point costs a reduction of the time to turns, a look-up in the table of the eccentricity, one step
 * of `anomalyCorrection` and a rotation: no trigonometric function, no loop, no branch on the data; about 32 ns.
 *
 * Errors for e <= 0.999 at times up to 2^34 steps or 1e8 periods: of a position at most 4 x 2^-52 a (1.98 measured), of a velocity 6 x
 * 2^-52 of the largest speed (2.02 measured), of the polar angle 1e-15 rad (2.6e-16 measured). The time is k h exactly, or the exact
 * sum of two words. The result does not depend on how the times are grouped into calls.
 *
 * Construction looks up or builds the table (`table-cache.ts`), shared among tracks of equal eccentricity.
 */
export class ReferenceTrack {
  readonly orbit: PlanarOrbit;
  /** What a row is computed from, for whoever computes rows in another way. */
  readonly constants: TrackConstants;

  constructor(orbit: PlanarOrbit) {
    this.orbit = orbit;
    this.constants = trackConstants(orbit);
  }

  /**
   * States at t = k h for k = firstStep .. firstStep + count - 1, four doubles a row from rows[0].
   * h any finite double, k integers with |k| <= 2^34; k h is exact.
   * @throws InvalidInputError for an index that is not such an integer, or rows too short
   */
  statesAtSteps(firstStep: number, count: number, h: number, rows: Float64Array): void {
    requireFinite("statesAtSteps.h", h);
    requireBatch("statesAtSteps", count, rows);
    if (!(Number.isInteger(firstStep) && Math.abs(firstStep) <= largestStep - count)) {
      refuse("statesAtSteps.firstStep", "stepIndex", firstStep);
    }
    const { w1, w2, w3, w4 } = stepWords(this.constants.turnsPerTime, h);
    const { startHi, startLo } = this.constants;
    for (let done = 0; done < count; done += blockSize) {
      const size = Math.min(count - done, blockSize);
      for (let j = 0; j < size; j++) {
        const k = firstStep + done + j;
        const p1 = k * w1;
        const p2 = k * w2;
        const s = p1 - (p1 + toNearest - toNearest) + (p2 - (p2 + toNearest - toNearest));
        const f = s - (s + toNearest - toNearest);
        const p3 = k * w3;
        const u = f + p3;
        const ut = u - f;
        const uLow = f - (u - ut) + (p3 - ut);
        const v = u + startHi;
        const vt = v - u;
        const vLow = u - (v - vt) + (startHi - vt);
        meanHi[j] = v - (v + toNearest - toNearest);
        meanLo[j] = vLow + (uLow + (startLo + k * w4));
      }
      this.#writeStates(size, rows, 4 * done);
    }
  }

  /**
   * States at the times times[2 j] + times[2 j + 1], j < count: pairs of a high and a low word, |low| <= 2^-52 |high|; four doubles a row
   * from rows[0]. @throws InvalidInputError for arrays too short
   */
  statesAtTimes(times: Float64Array, count: number, rows: Float64Array): void {
    requireBatch("statesAtTimes", count, rows);
    if (times.length < 2 * count) refuse("statesAtTimes.times", "times", times.length);
    for (let done = 0; done < count; done += blockSize) {
      const size = Math.min(count - done, blockSize);
      for (let j = 0; j < size; j++) {
        this.#reduceTime(times[2 * (done + j)]!, times[2 * (done + j) + 1]!, j);
      }
      this.#writeStates(size, rows, 4 * done);
    }
  }

  /** State at the time timeHi + timeLo into out[0..3]. @throws InvalidInputError for a time that is not finite or a short array */
  stateAt(timeHi: number, timeLo: number, out: Float64Array): void {
    requireFinite("stateAt.timeHi", timeHi);
    requireFinite("stateAt.timeLo", timeLo);
    requireBatch("stateAt", 1, out);
    this.#reduceTime(timeHi, timeLo, 0);
    this.#writeStates(1, out, 0);
  }

  /** Mean anomaly at a time, in turns within [-1/2, 1/2], into place j of the block: an exact product, whole turns dropped, plus the start. */
  #reduceTime(hi: number, lo: number, j: number): void {
    const { turnsPerTime: rate, startHi, startLo } = this.constants;
    const p = hi * rate.hi;
    const ta = splitter * hi;
    const a1 = ta - (ta - hi);
    const a2 = hi - a1;
    const tb = splitter * rate.hi;
    const b1 = tb - (tb - rate.hi);
    const b2 = rate.hi - b1;
    const pLow = a1 * b1 - p + a1 * b2 + a2 * b1 + a2 * b2 + (hi * rate.lo + lo * rate.hi);
    const f = p - (p + toNearest - toNearest);
    const u = f + pLow;
    const ut = u - f;
    const uLow = f - (u - ut) + (pLow - ut);
    const g = u - (u + toNearest - toNearest);
    const v = g + startHi;
    const vt = v - g;
    meanHi[j] = v - (v + toNearest - toNearest);
    meanLo[j] = g - (v - vt) + (startHi - vt) + (uLow + startLo);
  }

  /** States of the first `size` mean anomalies of the block, into rows from `to`. */
  #writeStates(size: number, rows: Float64Array, to: number): void {
    const { rows: table, e, axisRatio, offset, base, px, py, qx, qy, meanMotion } = this.constants;
    let at = to;
    for (let j = 0; j < size; j++) {
      const hi = meanHi[j]!;
      const lo = meanLo[j]!;
      // The half orbit is mirrored: M < 0 has the same cos E and the opposite sin E.
      const side = hi < 0 ? -1 : 1;
      const turns = side * hi;
      bits[0] = turns + offset;
      const row = ((words[1]! >>> cellShift) - base) * cellSize;
      const cosNode = table[row + 2]!;
      const sinNode = table[row + 3]!;
      const inverse = table[row + 7]!;
      const scale = e * inverse;
      const q = (turns - table[row]! + (side * lo - table[row + 1]!)) * (6.283185307179586 * inverse);
      const d = anomalyCorrection(q, scale * sinNode, scale * cosNode);
      const z = d * d;
      const sine = d * (1 + z * (-1 / 6 + z * (1 / 120 + z * (-1 / 5040))));
      const versine = z * (0.5 + z * (-1 / 24 + z * (1 / 720)));
      const dCos = cosNode * versine + sinNode * sine;
      const dSin = cosNode * sine - sinNode * versine;
      const along = table[row + 4]! - dCos;
      const across = side * (table[row + 5]! + axisRatio * dSin);
      const rate = meanMotion / (table[row + 6]! + e * dCos);
      const vAlong = -side * (sinNode + dSin) * rate;
      const vAcross = axisRatio * (cosNode - dCos) * rate;
      rows[at] = px * along + qx * across;
      rows[at + 1] = py * along + qy * across;
      rows[at + 2] = px * vAlong + qx * vAcross;
      rows[at + 3] = py * vAlong + qy * vAcross;
      at += 4;
    }
  }
}

function requireBatch(where: string, count: number, rows: Float64Array): void {
  if (!(Number.isInteger(count) && count >= 0)) refuse(`${where}.count`, "count", count);
  if (rows.length < 4 * count) refuse(`${where}.rows`, "rows", rows.length);
}

/** The reference track of an orbit; its table is built at most once an eccentricity. */
export function referenceTrack(orbit: PlanarOrbit): ReferenceTrack {
  return new ReferenceTrack(orbit);
}
