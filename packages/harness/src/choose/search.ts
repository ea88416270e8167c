import { type Candidate, type ChoiceContext, runFull } from "./candidate.ts";
import { type Reading, type Sample, worst, worstSamples } from "./measure.ts";
import { refineSamples } from "./refine-samples.ts";

/** Result of the search on the worst samples; the recommended fineness has still to be verified over its band. */
export interface Found {
  /** Coarsest fineness reached from the fine side whose errors hold limit / designFactor; null where none does. */
  readonly fineness: number | null;
  readonly worstSamples: readonly Sample[];
  /** The best ratio met where none holds, and where. */
  readonly nearest: Reading;
  readonly nearestFineness: number;
  /** Refining stopped helping before the limits were met: the rounding floor. */
  readonly stalled: boolean;
}

const WORST_COUNT = 3;
const MOST_APPROACHES = 14;
/** So many refinements in a row that gain less than a third of the method's order: the rounding floor. */
const MOST_STALLS = 2;

/**
 * Full-length search with the worst three samples. The neighbourhood is found by secant on log(error / limit); the answer is not: from
 * twice as fine as a passing value it coarsens by 3 % until the first failure, because error is not monotonic in the step.
 */
export async function search(context: ChoiceContext, candidate: Candidate, estimate: number): Promise<Found> {
  const { designFactor, measurer } = context;
  const { knob } = candidate;
  const all = await runFull(context, candidate, candidate.samples, estimate);
  const refined = await refineSamples(context, candidate, estimate, all);
  const hard = worstSamples(refined, measurer.limits.length, WORST_COUNT);
  const ratioAt = async (fineness: number): Promise<Reading> =>
    worst(await runFull(context, candidate, hard, fineness));

  let fineness = estimate;
  let reading = worst(refined);
  let nearest = reading;
  let nearestFineness = fineness;
  let stalls = 0;
  for (let i = 0; reading.ratio * designFactor > 1; i++) {
    const power = Math.max(1, candidate.stepper.order);
    const factor = Number.isFinite(reading.ratio) ? (reading.ratio * designFactor) ** (1 / power) * 1.02 : 2;
    const next = knob.move(fineness, Math.min(3, Math.max(knob.notch, factor)));
    if (next === fineness || i >= MOST_APPROACHES || stalls >= MOST_STALLS) {
      return { fineness: null, worstSamples: hard, nearest, nearestFineness, stalled: stalls >= MOST_STALLS };
    }
    const after = await ratioAt(next);
    const expected = (next / fineness) ** (power / 3);
    stalls = knob.kind === "step" && after.ratio * expected > reading.ratio ? stalls + 1 : 0;
    fineness = next;
    reading = after;
    if (after.ratio < nearest.ratio) {
      nearest = after;
      nearestFineness = next;
    }
  }

  const passing = fineness;
  let last: number | null = null;
  for (let at = knob.move(passing, knob.kind === "step" ? 2 : 10); ; ) {
    const { ratio } = await ratioAt(at);
    if (ratio * designFactor <= 1) last = at;
    // A failure on the fine side of a value known to pass is the rounding floor or a bump: go on to the passing one, no further.
    else if (last !== null || at <= passing) break;
    const next = knob.move(at, 1 / knob.notch);
    if (next === at) break;
    at = next;
  }
  return { fineness: last ?? passing, worstSamples: hard, nearest, nearestFineness, stalled: false };
}

/** The cliff: coarsest fineness, beyond the recommended one, at which every limit itself still holds on the worst samples. */
export interface Cliff {
  readonly fineness: number;
  readonly reason: "fails beyond" | "capped";
}

export async function findCliff(
  context: ChoiceContext,
  candidate: Candidate,
  recommended: number,
  hard: readonly Sample[],
): Promise<Cliff> {
  const { knob } = candidate;
  let at = recommended;
  for (;;) {
    const next = knob.move(at, 1 / knob.notch);
    if (next === at) return { fineness: at, reason: "capped" };
    const { ratio } = worst(await runFull(context, candidate, hard, next));
    if (!(ratio <= 1)) return { fineness: at, reason: "fails beyond" };
    at = next;
  }
}
