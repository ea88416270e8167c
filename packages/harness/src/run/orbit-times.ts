import { ddScale, twoPi } from "@perigauge/kepler";

/** `orbits` nominal periods of 2 pi as an unevaluated sum of two doubles, within 2^-100 of it relatively. */
export function endOfOrbits(orbits: number): readonly [hi: number, lo: number] {
  const { hi, lo } = ddScale(twoPi, orbits);
  return [hi, lo];
}

/** Whole steps within so many orbits; the slack keeps whole products from being cut short by rounding. */
export function stepsBy(orbits: number, stepsPerOrbit: number): number {
  return Math.floor(orbits * stepsPerOrbit + 1e-9);
}
