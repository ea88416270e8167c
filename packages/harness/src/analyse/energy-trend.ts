/** Fewer orbits than this give no trend. */
export const TREND_MINIMUM_ORBITS = 128;
const BLOCKS = 64;
/** Orbits whose spread is kept; of longer runs every so many-th, evenly. */
const MOST_SPREADS = 16_384;
const SIGNIFICANT = 8;
const FLOOR_MARGIN = 6;
const LOST = 0.5;

export type EnergyTrend = "bounded" | "drifting" | "random-walk";

/** The trend and the statistics it was decided by; energies are relative. */
export interface EnergyTrendResult {
  readonly energyTrend: EnergyTrend | null;
  /** True where the whole range of the block means is within six times the rounding floor. */
  readonly atFloor: boolean | null;
  readonly statistics: {
    readonly blocks: number;
    readonly orbitsPerBlock: number;
    /** Median over orbits of largest minus smallest energy error within the orbit (A). */
    readonly spreadInOrbit: number;
    /** Largest minus smallest block mean (D). */
    readonly rangeOfMeans: number;
    /** Mean of the block increments over its standard error (T). */
    readonly driftSignificance: number;
    /** 1.5e-16 sqrt(evaluations) (R). */
    readonly roundingFloor: number;
  } | null;
  /** Why there is no trend. */
  readonly note: string | null;
}

/**
 * Gathers energy errors orbit by orbit, in flat memory, and decides whether the energy is bounded, drifts or walks at random.
 *
 * 64 equal blocks of whole orbits. A: median over orbits of max - min; D: range of the block means; T: mean of the block increments over
 * its standard error; R = 1.5e-16 sqrt(evaluations). D <= 2A is bounded; otherwise |T| >= 8 with D > 6R, or D > 0.5, is drifting; otherwise
 * it is a random walk. At the floor where D < 6R. A plain t-test of a slope fails here: block means of a bounded energy are correlated.
 */
export class EnergyBlocks {
  private readonly orbitsPerBlock: number;
  private readonly sums = new Float64Array(BLOCKS);
  private readonly spreads: number[] = [];
  private readonly stride: number;
  private orbits = 0;
  private readonly wanted: number;

  constructor(orbits: number) {
    this.wanted = orbits;
    this.orbitsPerBlock = Math.floor(orbits / BLOCKS);
    this.stride = Math.max(1, Math.ceil(orbits / MOST_SPREADS));
  }

  /** One whole orbit: mean, smallest and largest energy error. */
  accept(mean: number, smallest: number, largest: number): void {
    const block = Math.floor(this.orbits / Math.max(1, this.orbitsPerBlock));
    if (block < BLOCKS) this.sums[block] = (this.sums[block] as number) + mean;
    if (this.orbits % this.stride === 0) this.spreads.push(largest - smallest);
    this.orbits += 1;
  }

  judge(evaluations: number): EnergyTrendResult {
    if (this.wanted < TREND_MINIMUM_ORBITS) return noTrend(`fewer than ${TREND_MINIMUM_ORBITS} orbits`);
    if (this.orbits < BLOCKS * this.orbitsPerBlock) return noTrend("the run ended early");
    const means = Array.from(this.sums, (sum) => sum / this.orbitsPerBlock);
    const increments = means.slice(1).map((mean, i) => mean - (means[i] as number));
    const increment = increments.reduce((sum, value) => sum + value, 0) / increments.length;
    const variance =
      increments.reduce((sum, value) => sum + (value - increment) ** 2, 0) / (increments.length - 1);
    const standardError = Math.sqrt(variance / increments.length);
    const spreadInOrbit = this.spreads.toSorted((a, b) => a - b)[this.spreads.length >> 1] as number;
    const rangeOfMeans = Math.max(...means) - Math.min(...means);
    const driftSignificance = standardError > 0 ? increment / standardError : 0;
    const roundingFloor = 1.5e-16 * Math.sqrt(evaluations);
    const atFloor = rangeOfMeans < FLOOR_MARGIN * roundingFloor;
    const drifts = (Math.abs(driftSignificance) >= SIGNIFICANT && !atFloor) || rangeOfMeans > LOST;
    return {
      energyTrend: rangeOfMeans <= 2 * spreadInOrbit ? "bounded" : drifts ? "drifting" : "random-walk",
      atFloor,
      statistics: {
        blocks: BLOCKS,
        orbitsPerBlock: this.orbitsPerBlock,
        spreadInOrbit,
        rangeOfMeans,
        driftSignificance,
        roundingFloor,
      },
      note: null,
    };
  }
}

function noTrend(note: string): EnergyTrendResult {
  return { energyTrend: null, atFloor: null, statistics: null, note };
}
