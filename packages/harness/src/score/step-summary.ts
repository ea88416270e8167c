import { BlockMeans } from "./drift.ts";
import { GrowthSamples, type RoundingFloor } from "./growth.ts";
import type { MeasureSummary } from "./score.ts";

/** Which value of an orbit its growth is judged by: means for angles and positions, largest values for what oscillates about zero. */
export type GrowthValue = "orbit mean" | "orbit maximum";

/**
 * Root mean square, drift and growth of one measure taken at every step. The mean square weighs each step by half the time between its
 * neighbours; the start, where every error is zero, is left out.
 */
export class StepSummary {
  private square = 0;
  private elapsed = 0;
  private previousSquare = 0;
  private started = false;
  private final = 0;
  private orbit = 1;
  private orbitSum = 0;
  private orbitTime = 0;
  private orbitMaximum = 0;
  private readonly blocks: BlockMeans;
  private readonly samples: GrowthSamples;
  private readonly growthValue: GrowthValue;

  constructor(wholeOrbits: number, growthValue: GrowthValue) {
    this.blocks = new BlockMeans(wholeOrbits);
    this.samples = new GrowthSamples(wholeOrbits);
    this.growthValue = growthValue;
  }

  /** Rows `from` to `to` all lie in `orbit` (counted from 1); `lengths` holds the length of the step that led to each row. */
  accept(errors: Float64Array, from: number, to: number, lengths: Float64Array, orbit: number): void {
    if (orbit !== this.orbit) this.closeOrbit(orbit);
    let { square, elapsed, previousSquare, orbitSum, orbitTime, orbitMaximum } = this;
    for (let i = from; i < to; i++) {
      const error = errors[i]!;
      const length = lengths[i]!;
      const error2 = error * error;
      square += 0.5 * length * (previousSquare + error2);
      // The first step counts half: the other half belongs to the start, which is left out.
      elapsed += this.started ? length : 0.5 * length;
      this.started = true;
      previousSquare = error2;
      orbitSum += length * error;
      orbitTime += length;
      const size = Math.abs(error);
      if (size > orbitMaximum) orbitMaximum = size;
    }
    this.square = square;
    this.elapsed = elapsed;
    this.previousSquare = previousSquare;
    this.orbitSum = orbitSum;
    this.orbitTime = orbitTime;
    this.orbitMaximum = orbitMaximum;
    if (to > from) this.final = errors[to - 1]!;
  }

  private closeOrbit(next: number): void {
    if (this.orbitTime > 0) {
      const mean = this.orbitSum / this.orbitTime;
      this.blocks.accept(this.orbit, mean);
      this.samples.accept(this.orbit, this.growthValue === "orbit mean" ? mean : this.orbitMaximum);
    }
    this.orbit = next;
    this.orbitSum = 0;
    this.orbitTime = 0;
    this.orbitMaximum = 0;
  }

  /** `completed`: the orbit in progress is whole. */
  finish(completed: boolean, floor: RoundingFloor): Omit<MeasureSummary, "max" | "maxAtOrbit"> {
    if (completed) this.closeOrbit(this.orbit + 1);
    return {
      rms: this.elapsed > 0 ? Math.sqrt(this.square / this.elapsed) : null,
      final: this.started ? this.final : null,
      driftPerOrbit: this.blocks.drift(),
      ...this.samples.growth(floor),
    };
  }
}
