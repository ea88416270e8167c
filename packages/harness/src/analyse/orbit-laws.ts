import { angleFloor, energyFloor, type GrowthJudgement, GrowthSamples } from "../score/growth.ts";
import type { ObservedWindow } from "../score/run-scorer.ts";
import { EnergyBlocks, type EnergyTrendResult } from "./energy-trend.ts";
import { type Fit, fitSlope } from "./fit.ts";

const TWO_PI = 2 * Math.PI;
/** Orbits by which a step may overshoot the end of an orbit and still belong to it: time is rounded. */
const ORBIT_SLACK = 1e-9;
const APSIS_BLOCKS = 64;

/** Measures whose growth in time is fitted: angles and positions by their orbit means, what oscillates about zero by its orbit maxima. */
export const GROWTH_MEASURES = ["energy", "angularMomentum", "phase", "position"] as const;
export type GrowthMeasure = (typeof GROWTH_MEASURES)[number];

export interface OrbitLaws {
  readonly trend: EnergyTrendResult;
  readonly growth: Readonly<Record<GrowthMeasure, GrowthJudgement>>;
  /** Turn of the apsis per orbit, rad: least squares over up to 64 means of blocks of whole orbits. */
  readonly apsisPerOrbit: Fit | null;
}

/**
 * Walks a run orbit by orbit, in flat memory, for what is said of its behaviour in time. A step belongs to the orbit it ends in. The growth
 * exponents are those of the score, with the number of points behind them or the reason why there is none.
 */
export class OrbitWalk {
  private readonly step: number | null;
  private readonly circular: boolean;
  private readonly energy: EnergyBlocks;
  private readonly growth: Readonly<Record<GrowthMeasure, GrowthSamples>>;
  private readonly apsisSums: Float64Array;
  private readonly apsisPerBlock: number;
  private orbit = 1;
  private lastTime = 0;
  private weight = 0;
  private readonly sums = { energy: 0, phase: 0, position: 0, apsis: 0 };
  private smallest = Number.POSITIVE_INFINITY;
  private largest = Number.NEGATIVE_INFINITY;
  private momentum = 0;

  /** `step` is null where steps are uneven. */
  constructor(orbits: number, step: number | null, circular: boolean) {
    const whole = Math.floor(orbits + ORBIT_SLACK);
    this.step = step;
    this.circular = circular;
    this.energy = new EnergyBlocks(whole);
    this.growth = {
      energy: new GrowthSamples(whole),
      angularMomentum: new GrowthSamples(whole),
      phase: new GrowthSamples(whole),
      position: new GrowthSamples(whole),
    };
    this.apsisPerBlock = Math.max(1, Math.floor(whole / APSIS_BLOCKS));
    this.apsisSums = new Float64Array(Math.min(APSIS_BLOCKS, whole));
  }

  accept({ chunk, from, to, errors }: ObservedWindow): void {
    const { step, circular, sums } = this;
    const { energy, angularMomentum, phase, position, apsis } = errors;
    const { times, firstStep } = chunk;
    let end = (this.orbit + ORBIT_SLACK) * TWO_PI;
    let { lastTime } = this;
    for (let i = from; i < to; i++) {
      const time = step === null ? (times[2 * i] as number) : (firstStep + i) * step;
      if (time > end) {
        this.close();
        this.orbit = Math.ceil(time / TWO_PI - ORBIT_SLACK);
        end = (this.orbit + ORBIT_SLACK) * TWO_PI;
      }
      const length = time - lastTime;
      lastTime = time;
      const value = energy[i] as number;
      this.weight += length;
      sums.energy += length * value;
      sums.phase += length * (phase[i] as number);
      sums.position += length * (position[i] as number);
      if (!circular) sums.apsis += length * (apsis[i] as number);
      if (value < this.smallest) this.smallest = value;
      if (value > this.largest) this.largest = value;
      const momentum = Math.abs(angularMomentum[i] as number);
      if (momentum > this.momentum) this.momentum = momentum;
    }
    this.lastTime = lastTime;
  }

  private close(): void {
    const { sums, orbit, growth, weight } = this;
    if (weight > 0) {
      this.energy.accept(sums.energy / weight, this.smallest, this.largest);
      growth.energy.accept(orbit, Math.max(Math.abs(this.smallest), Math.abs(this.largest)));
      growth.angularMomentum.accept(orbit, this.momentum);
      growth.phase.accept(orbit, sums.phase / weight);
      growth.position.accept(orbit, sums.position / weight);
      const block = Math.floor((orbit - 1) / this.apsisPerBlock);
      if (block < this.apsisSums.length) {
        this.apsisSums[block] = (this.apsisSums[block] as number) + sums.apsis / weight / this.apsisPerBlock;
      }
    }
    sums.energy = 0;
    sums.phase = 0;
    sums.position = 0;
    sums.apsis = 0;
    this.weight = 0;
    this.smallest = Number.POSITIVE_INFINITY;
    this.largest = Number.NEGATIVE_INFINITY;
    this.momentum = 0;
  }

  /** `completed`: the orbit in progress is whole. */
  finish(completed: boolean, steps: number, evaluations: number): OrbitLaws {
    if (completed) this.close();
    const orbits = this.lastTime / TWO_PI;
    const energy = energyFloor(evaluations / orbits);
    const angle = angleFloor(steps / orbits);
    return {
      trend: this.energy.judge(evaluations),
      growth: {
        energy: this.growth.energy.judge(energy),
        angularMomentum: this.growth.angularMomentum.judge(energy),
        phase: this.growth.phase.judge(angle),
        position: this.growth.position.judge(angle),
      },
      apsisPerOrbit:
        completed && !this.circular && this.apsisSums.length >= 8
          ? withoutResidual(
              fitSlope(Array.from(this.apsisSums, (mean, block) => [block * this.apsisPerBlock, mean])),
            )
          : null,
    };
  }
}

function withoutResidual({ value, standardError, points }: Fit): Fit {
  return { value, standardError, points };
}
