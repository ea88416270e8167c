import type { StepperInfo } from "@perigauge/steppers";
import type { LimitKey } from "./choice.ts";

/**
 * Largest growth exponent in time that theory gives a measure: energy is bounded for a symplectic stepper and linear otherwise; angles and
 * positions grow one power faster (Calvo & Sanz-Serna, SIAM J. Sci. Comput. 14, 936, 1993; Cano & Sanz-Serna, SIAM J. Numer. Anal. 34, 1391,
 * 1997); the apsis turns at a constant rate.
 */
export function steepestGrowth(stepper: StepperInfo, key: LimitKey): number {
  const conserving = stepper.symplectic && stepper.knob === "step";
  switch (key) {
    case "semiMajorAxisM":
    case "energyRelative":
      return conserving ? 0 : 1;
    case "apsisDeg":
      return 1;
    default:
      return conserving ? 1 : 2;
  }
}

/** `value` at `from` orbits carried on to `to` orbits, with the growth seen over the second half of the run, clipped to [0, steepest]. */
export function extrapolate(half: number, value: number, from: number, to: number, steepest: number): number {
  if (to <= from || !Number.isFinite(value)) return value;
  const seen = half > 0 ? Math.log2(value / half) : steepest;
  return value * (to / from) ** Math.min(steepest, Math.max(0, seen));
}
