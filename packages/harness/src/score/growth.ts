import { linearRegression } from "simple-statistics";

/** Fewer whole orbits than this give no growth exponent. */
export const GROWTH_MINIMUM_ORBITS = 64;
const SAMPLES = 25;
/** The window starts at this share of the run. */
const WINDOW = 1 / 32;
const LARGEST_STANDARD_ERROR = 0.1;
const FLOOR_MARGIN = 20;
/** Unit roundoff of IEEE doubles. */
const UNIT = 2 ** -53;

export type RoundingFloor = (orbit: number) => number;

/** Rounding floor of the energy error: 1.5e-16 sqrt(evaluations so far). */
export function energyFloor(evaluationsPerOrbit: number): RoundingFloor {
  return (orbit) => 1.5e-16 * Math.sqrt(evaluationsPerOrbit * orbit);
}

/** Rounding floor of angles and positions: 2 u t sqrt(steps so far), u = 2^-53 (after Brouwer, Astron. J. 46, 149, 1937). */
export function angleFloor(stepsPerOrbit: number): RoundingFloor {
  return (orbit) => 2 * UNIT * 2 * Math.PI * orbit * Math.sqrt(stepsPerOrbit * orbit);
}

export interface Growth {
  readonly growthExponent: number | null;
  readonly growthStandardError: number | null;
}

/** A growth exponent with the number of orbits behind it, or why there is none. */
export interface GrowthJudgement extends Growth {
  readonly points: number;
  readonly reason: string | null;
}

const none = (points: number, reason: string): GrowthJudgement => ({
  growthExponent: null,
  growthStandardError: null,
  points,
  reason,
});

/** Values at 25 orbits spaced evenly in log time over [K/32, K], kept as the orbits complete. */
export class GrowthSamples {
  private readonly wanted: ReadonlySet<number>;
  private readonly orbits: number[] = [];
  private readonly values: number[] = [];
  private readonly total: number;

  constructor(orbits: number) {
    this.total = orbits;
    const wanted = new Set<number>();
    for (let i = 0; i < SAMPLES; i++)
      wanted.add(Math.round(orbits * WINDOW * (1 / WINDOW) ** (i / (SAMPLES - 1))));
    this.wanted = orbits >= GROWTH_MINIMUM_ORBITS ? wanted : new Set();
  }

  /** `orbit` counts from 1. */
  accept(orbit: number, value: number): void {
    if (!this.wanted.has(orbit)) return;
    this.orbits.push(orbit);
    this.values.push(value);
  }

  /**
   * Slope of log |value| against log (orbit - 1/2); its standard error is half the difference of the slopes of the two halves. Null
   * where that exceeds 0.1, the value changes sign or vanishes, the start of the window lies within 20 times the rounding floor, or the
   * run was shorter than 64 orbits or ended early.
   */
  judge(floor: RoundingFloor): GrowthJudgement {
    const { orbits, values } = this;
    const n = orbits.length;
    if (this.total < GROWTH_MINIMUM_ORBITS) return none(n, `fewer than ${GROWTH_MINIMUM_ORBITS} orbits`);
    if (n < 8 || orbits.at(-1) !== this.total) return none(n, "the run ended early");
    if (Math.abs(values[0]!) < FLOOR_MARGIN * floor(orbits[0]!)) {
      return none(n, `starts within ${FLOOR_MARGIN} times the rounding floor`);
    }
    const sign = Math.sign(values[0]!);
    if (sign === 0 || values.some((value) => Math.sign(value) !== sign)) return none(n, "changes sign");
    const points = orbits.map((orbit, i): [number, number] => [
      Math.log(orbit - 0.5),
      Math.log(Math.abs(values[i]!)),
    ]);
    const middle = (points.length - 1) >> 1;
    const early = linearRegression(points.slice(0, middle + 1)).m;
    const late = linearRegression(points.slice(middle)).m;
    const growthStandardError = Math.abs(late - early) / 2;
    if (growthStandardError > LARGEST_STANDARD_ERROR) {
      return none(n, `not one power of time (standard error above ${LARGEST_STANDARD_ERROR})`);
    }
    return { growthExponent: linearRegression(points).m, growthStandardError, points: n, reason: null };
  }

  growth(floor: RoundingFloor): Growth {
    const { growthExponent, growthStandardError } = this.judge(floor);
    return { growthExponent, growthStandardError };
  }
}
