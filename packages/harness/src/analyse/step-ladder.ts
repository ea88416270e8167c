import type { Stepper } from "@perigauge/steppers";
import { periapsisRate } from "./order-measures.ts";

/** Steps at the coarsest rung while the body turns by 2 pi at its periapsis rate. */
const COARSEST = 3;
const LEAST_STEPS = 5;

/** Rungs to an octave of the step: the higher the order, the sooner its ladder meets the rounding floor. */
function perOctave(order: number): number {
  return order <= 3 ? 2 : order <= 6 ? 4 : 8;
}

/** Steps per orbit of rung i, whole so that runs end with their orbits, from three steps per turn at the periapsis rate. */
export function rungSteps({ order }: Pick<Stepper, "order">, eccentricity: number, i: number): number {
  return Math.round(
    Math.max(LEAST_STEPS, COARSEST * periapsisRate(eccentricity)) * 2 ** (i / perOctave(order)),
  );
}

/** Tolerance of rung i for a variable step, from 1e-2 down; local errors go with step^(p+1), so the steps make four rungs an octave. */
export function rungTolerance({ order }: Pick<Stepper, "order">, i: number): number {
  return 1e-2 * 2 ** ((-i * (order + 1)) / 4);
}

/** Finer tolerances are below what doubles resolve. */
export const LEAST_TOLERANCE = 1e-15;
