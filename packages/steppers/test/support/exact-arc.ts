import { Decimal } from "decimal.js";
import { fromDouble } from "../../src/exact/rational.ts";
import { type Pairs, pairs } from "./interpret-double-double.ts";

Decimal.set({ precision: 42 });

/** Planar elliptic motion at 42 digits (normalised units) as double-double pairs: x, y, vx, vy. */
export function exactPairs(eccentricity: string, eccentricAnomaly: Decimal): Pairs {
  const e = new Decimal(eccentricity);
  const b = e.times(e).neg().plus(1).sqrt();
  const cos = eccentricAnomaly.cos();
  const sin = eccentricAnomaly.sin();
  const rate = new Decimal(1).div(e.times(cos).neg().plus(1));
  const state = [cos.minus(e), b.times(sin), sin.times(rate).neg(), b.times(cos).times(rate)];
  const result = pairs(4);
  state.forEach((value, k) => {
    result.hi[k] = value.toNumber();
    result.lo[k] = value.minus(exactly(result.hi[k]!)).toNumber();
  });
  return result;
}

/** The double itself: `new Decimal(x)` would take its shortest decimal form instead. */
export function exactly(x: number): Decimal {
  const { numerator, denominator } = fromDouble(x);
  return new Decimal(numerator.toString()).div(denominator.toString());
}

/** Eccentric anomaly a time later: Kepler's equation by Newton's method to 40 digits. */
export function anomalyAfter(eccentricity: string, start: Decimal, time: number | Decimal): Decimal {
  const e = new Decimal(eccentricity);
  const mean = start.minus(e.times(start.sin())).plus(time);
  let E = mean;
  for (let i = 0; i < 60; i += 1) {
    const change = E.minus(e.times(E.sin())).minus(mean).div(e.times(E.cos()).neg().plus(1));
    E = E.minus(change);
    if (change.abs().lt("1e-40")) break;
  }
  return E;
}

export interface Arc {
  readonly start: Pairs;
  readonly end: Pairs;
  /** Eccentric anomaly at the start, rad. */
  readonly anomaly: Decimal;
}

/** The arc on which orders are measured: e = 0.3, T = 1, from eccentric anomalies 0, 1, 2.5 and 4.5 rad. */
export const arcs: readonly Arc[] = [0, 1, 2.5, 4.5].map((anomaly) => {
  const start = new Decimal(anomaly);
  return {
    anomaly: start,
    start: exactPairs("0.3", start),
    end: exactPairs("0.3", anomalyAfter("0.3", start, 1)),
  };
});
