import { median } from "simple-statistics";

/** Fewer whole orbits than this give no drift. */
export const DRIFT_MINIMUM_ORBITS = 8;
const MOST_BLOCKS = 512;

/** Means over at most 512 equal blocks of whole orbits, gathered as the orbits complete: flat memory whatever the length. */
export class BlockMeans {
  private readonly sums: Float64Array;
  private readonly counts: Float64Array;
  private readonly orbits: number;

  constructor(orbits: number) {
    const blocks = Math.max(1, Math.min(MOST_BLOCKS, orbits));
    this.orbits = Math.max(1, orbits);
    this.sums = new Float64Array(blocks);
    this.counts = new Float64Array(blocks);
  }

  /** `orbit` counts from 1. */
  accept(orbit: number, mean: number): void {
    const block = Math.floor(((orbit - 1) * this.sums.length) / this.orbits);
    if (block >= this.sums.length) return;
    this.sums[block]! += mean;
    this.counts[block]! += 1;
  }

  /** Theil-Sen slope of the block means, per orbit; null where fewer than eight orbits were complete. */
  drift(): number | null {
    const at: number[] = [];
    const means: number[] = [];
    let first = 0;
    for (let block = 0; block < this.sums.length; block++) {
      const count = this.counts[block]!;
      if (count > 0) {
        at.push(first + 0.5 * count);
        means.push(this.sums[block]! / count);
      }
      first += count;
    }
    return first < DRIFT_MINIMUM_ORBITS ? null : theilSenSlope(at, means);
  }
}

/** Median of the slopes between all pairs of points (Theil 1950; Sen, J. Am. Stat. Assoc. 63, 1379, 1968). */
export function theilSenSlope(x: readonly number[], y: readonly number[]): number {
  const slopes: number[] = [];
  for (let i = 0; i < x.length; i++) {
    for (let j = i + 1; j < x.length; j++) slopes.push((y[j]! - y[i]!) / (x[j]! - x[i]!));
  }
  return median(slopes);
}
