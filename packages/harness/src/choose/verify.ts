import type { Cell } from "../score/score.ts";
import { type Candidate, type ChoiceContext, runFull } from "./candidate.ts";
import { pointAt } from "./fleet.ts";
import { type Reading, type Sample, worst } from "./measure.ts";
import { refineSamples } from "./refine-samples.ts";
import { seededRandom } from "./seeded-random.ts";

/** A recommended fineness whose errors hold limit / designFactor over its whole band, run in full. */
export interface Verified {
  readonly fineness: number;
  /** Readings at the recommended fineness itself: its errors are reported. */
  readonly at: readonly Reading[];
  readonly bandFinest: number;
  readonly cellsRun: number;
  /** Finest fineness that still holds, where the band is cut short by rounding. */
  readonly floor: number | null;
}

/** Why a fineness was given up, and at which fineness to go on. */
export interface Failure {
  readonly fineness: number;
  readonly reading: Reading;
}

export function isVerified(outcome: Verified | Failure): outcome is Verified {
  return "at" in outcome;
}

const MOST_ATTEMPTS = 24;
/** Beyond so many times the fineness that the search found, verification is given up. */
const MOST_FINER = 3;
/** After so many attempts each move is one notch longer. */
const STRIDE_GROWTH = 3;
const RANDOM_PAIRS = 32;
/** A band cut by the rounding floor must still reach this far, or the step is not recommended. */
const LEAST_BAND = 1.25;
/** A failure this far on the fine side of the recommended value may be the rounding floor. */
const FLOOR_SUSPECT = 1.1;

/**
 * Verifies a fineness in full, with all samples: over the band of factors, at whole and nearly whole steps per orbit, and at random pairs
 * of orbit and start. Any failure moves the boundary past it and the whole is repeated. The last failure where no fineness survives.
 */
export async function verify(
  context: ChoiceContext,
  candidate: Candidate,
  start: number,
  hard: Sample[],
): Promise<Verified | Failure> {
  const { knob } = candidate;
  let fineness = start;
  let last: Failure | null = null;
  for (let attempt = 0; attempt < MOST_ATTEMPTS; attempt++) {
    const outcome = await attemptAt(context, candidate, fineness, hard);
    if (isVerified(outcome)) return outcome;
    hard.push(outcome.reading.sample);
    last = outcome;
    // The first steps away are small; a wide resonance is left behind by larger ones.
    const stride = knob.notch ** (1 + Math.floor(attempt / STRIDE_GROWTH));
    const next = knob.move(Math.max(fineness, outcome.fineness), stride);
    if (next <= fineness || next > MOST_FINER * start) break;
    fineness = next;
  }
  return last as Failure;
}

async function attemptAt(
  context: ChoiceContext,
  candidate: Candidate,
  fineness: number,
  hard: readonly Sample[],
): Promise<Verified | Failure> {
  const { designFactor, measurer } = context;
  const { knob } = candidate;
  const fails = (reading: Reading): boolean => !(reading.ratio * designFactor <= 1);
  const bandCells = (samples: readonly Sample[], factor: number): { sample: Sample; cell: Cell }[] =>
    samples.map((sample) => ({
      sample,
      cell: knob.cellAt(
        sample.point,
        sample.startAnomalyDeg,
        bandFineness(candidate, fineness, factor),
        measurer.durationSeconds,
      ),
    }));
  const wholeCells = (samples: readonly Sample[]): { sample: Sample; cell: Cell }[] =>
    bandCells(samples, 1).flatMap(({ sample, cell }) =>
      knob.nearWhole(cell).map((near) => ({ sample, cell: near })),
    );

  let cellsRun = 0;
  let bandFinest = fineness;
  let floor: number | null = null;
  const run = async (cells: readonly { sample: Sample; cell: Cell }[]): Promise<Reading | null> => {
    if (cells.length === 0) return null;
    cellsRun += cells.length;
    const found = worst(await measurer.measure(cells));
    return fails(found) ? found : null;
  };

  // The worst samples first, so that a value that cannot hold is given up early.
  for (const samples of [hard, candidate.samples]) {
    bandFinest = fineness;
    for (const factor of knob.band) {
      if (floor !== null && bandFineness(candidate, fineness, factor) > floor) break;
      const failed = await run(bandCells(samples, factor));
      if (failed !== null) {
        const at = bandFineness(candidate, fineness, factor);
        if (factor < FLOOR_SUSPECT || !(await isFloor(context, candidate, failed, at)))
          return { fineness: at, reading: failed };
        if (bandFinest < LEAST_BAND * fineness) return { fineness: at, reading: failed };
        floor = bandFinest;
        break;
      }
      bandFinest = bandFineness(candidate, fineness, factor);
    }
    const failed = await run(wholeCells(samples));
    if (failed !== null) return { fineness, reading: failed };
  }
  const atRecommended = await runFull(context, candidate, candidate.samples, fineness);
  const refined = await refineSamples(context, candidate, fineness, atRecommended);
  const random = await measurer.measure(randomCells(context, candidate, fineness, bandFinest));
  cellsRun += refined.length - atRecommended.length + random.length;
  const failed = [...refined, ...random].find(fails);
  if (failed !== undefined) return { fineness, reading: failed };
  const recommended = random.filter(({ cell, sample }) => {
    const own = knob.cellAt(sample.point, sample.startAnomalyDeg, fineness, measurer.durationSeconds);
    return cell.step === own.step && cell.tolerance === own.tolerance;
  });
  return { fineness, at: [...refined, ...recommended], bandFinest, cellsRun, floor };
}

/** A fineness of the band: on the engineer's grid or list only the recommended value itself has to lie. */
function bandFineness({ knob }: Candidate, fineness: number, factor: number): number {
  return knob.kind === "step" ? fineness * factor : knob.snap(fineness * factor);
}

/** Whether a failure on the fine side is the rounding floor: it stays, or grows, when the fineness is doubled again. */
async function isFloor(
  context: ChoiceContext,
  candidate: Candidate,
  failed: Reading,
  fineness: number,
): Promise<boolean> {
  if (fineness * 2 > candidate.knob.finest) return false;
  const [finer] = await runFull(context, candidate, [failed.sample], fineness * 2);
  return finer !== undefined && finer.ratio >= 0.7 * failed.ratio;
}

/** Seeded random orbits and starts: half at the recommended fineness, half anywhere in the band. */
function randomCells(
  context: ChoiceContext,
  { knob }: Candidate,
  fineness: number,
  bandFinest: number,
): { sample: Sample; cell: Cell }[] {
  const { fleet, measurer, scenario, seed } = context;
  const random = seededRandom(seed);
  const start = scenario.start ?? "any";
  return Array.from({ length: RANDOM_PAIRS }, (_, i) => {
    const index = Math.floor(random() * fleet.orbits.length);
    const free = fleet.orbits[index]?.sampler.parameters ?? 0;
    const [first, second, angle, place] = [random(), random(), random(), random()];
    const point = pointAt(fleet, index, free > 0 ? first : 0, free > 1 ? second : 0);
    const fixed = typeof start === "number" ? start : start === "apoapsis" ? 180 : 0;
    const startAnomalyDeg = start === "any" ? Math.round(3600 * angle - 1800) / 10 : fixed;
    const at = i % 2 === 0 ? fineness : fineness * (bandFinest / fineness) ** place;
    return {
      sample: { point, startAnomalyDeg },
      cell: knob.cellAt(point, startAnomalyDeg, at, measurer.durationSeconds),
    };
  });
}
