import { twoPi } from "../arithmetic/constants.ts";
import {
  type DoubleDouble,
  ddDivide,
  ddMultiply,
  ddOf,
  ddScale,
  ddSubtract,
} from "../arithmetic/double-double.ts";
import type { PlanarOrbit } from "../planar/planar-orbit.ts";
import { anomalyTable } from "./table-cache.ts";

/** What the rows of a reference track are computed from. Angles in turns; `rows`, `offset` and `base` are of the table of the eccentricity. */
export interface TrackConstants {
  readonly turnsPerTime: DoubleDouble;
  /** Mean anomaly of the start, two words. */
  readonly startHi: number;
  readonly startLo: number;
  readonly e: number;
  readonly axisRatio: number;
  readonly offset: number;
  readonly base: number;
  readonly rows: Float64Array;
  /** Semi-major axis times the direction of periapsis, and the same quarter turn ahead in the sense of motion. */
  readonly px: number;
  readonly py: number;
  readonly qx: number;
  readonly qy: number;
  readonly meanMotion: number;
}

/** The constants of an orbit; its table is looked up, or built and kept. */
export function trackConstants(orbit: PlanarOrbit): TrackConstants {
  const table = anomalyTable(orbit.eccentricity);
  const start = ddDivide(orbit.meanAnomaly, twoPi);
  const px = ddMultiply(orbit.semiMajorAxis, orbit.periapsisX);
  const py = ddMultiply(orbit.semiMajorAxis, orbit.periapsisY);
  const forward = orbit.angularMomentum.hi > 0;
  return {
    turnsPerTime: ddDivide(orbit.meanMotion, twoPi),
    startHi: start.hi,
    startLo: start.lo,
    e: orbit.eccentricity.hi,
    axisRatio: orbit.axisRatio.hi,
    offset: table.offset,
    base: table.firstCell,
    rows: table.rows,
    px: px.hi,
    py: py.hi,
    qx: forward ? -py.hi : py.hi,
    qy: forward ? px.hi : -px.hi,
    meanMotion: orbit.meanMotion.hi,
  };
}

/** Turns a step of h, whole turns dropped, in words that an index of 34 bits multiplies exactly (all but the last). */
export interface StepWords {
  readonly w1: number;
  readonly w2: number;
  readonly w3: number;
  readonly w4: number;
}

/**
 * The words of a step of h (normalised time): their sum is h times the rate less whole turns, to 2^-100 of the rate; with |k| <= 2^34
 * the products k w1, k w2 and k w3 are exact.
 */
export function stepWords(turnsPerTime: DoubleDouble, h: number): StepWords {
  const exact = ddScale(turnsPerTime, h);
  const fraction = ddSubtract(exact, ddOf(Math.round(exact.hi)));
  const w1 = upperWord(fraction, 19);
  const rest1 = ddSubtract(fraction, ddOf(w1));
  const w2 = upperWord(rest1, 38);
  const rest2 = ddSubtract(rest1, ddOf(w2));
  const w3 = upperWord(rest2, 57);
  const w4 = ddSubtract(rest2, ddOf(w3)).hi;
  return { w1, w2, w3, w4 };
}

/** Word of `value` with multiples of 2^-fractionBits. */
function upperWord(value: DoubleDouble, fractionBits: number): number {
  const scale = 2 ** fractionBits;
  return Math.round(value.hi * scale) / scale;
}
