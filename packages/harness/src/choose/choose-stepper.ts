import { findStepper, type Stepper, type StepperInfo } from "@perigauge/steppers";
import type { CellPool } from "../run/cell-pool.ts";
import type { Scenario } from "../scenario/scenario.ts";
import { threeDigits } from "../text/numbers.ts";
import { WORK_PER_MINUTE, workInFull, workOf } from "./budget.ts";
import { type Candidate, type ChoiceContext, makeCandidate } from "./candidate.ts";
import { cautionsOf } from "./cautions.ts";
import type { BodyErrors, Choice, CurrentChoice, ExcludedStepper, RankedStepper } from "./choice.ts";
import { assessCurrent } from "./current.ts";
import { digestOf } from "./digest.ts";
import { explain } from "./explanation.ts";
import { buildFleet } from "./fleet.ts";
import { handOver } from "./hand-over.ts";
import { limitsOf } from "./limits.ts";
import { Measurer } from "./measure.ts";
import { failedEntry, rankedRun, rankedScreening } from "./ranked.ts";
import { unmetRequirement } from "./requirements.ts";
import { type Screened, type Screening, screen } from "./screen.ts";
import { type Found, findCliff, search } from "./search.ts";
import { sensitivity } from "./sensitivity.ts";
import { isVerified, verify } from "./verify.ts";
import { whatWouldHaveToGive } from "./what-would-have-to-give.ts";
import { explainRanking } from "./why.ts";

/** Phases of a choice, in order; reported as they begin. */
export type Phase = "screening" | "search" | "verification" | "current" | "sensitivity";

export interface ChooseOptions {
  readonly pool: CellPool;
  /** Candidates; steppers of one's own among them. */
  readonly steppers: readonly Stepper[];
  readonly seed: number;
  /** Work to spend, in minutes of two nominal cores; what does not fit is extrapolated. Default 2. */
  readonly minutes?: number;
  /** Modules of steppers of one's own, which a command that re-runs their cells must name. */
  readonly ownFiles?: readonly string[];
  readonly version: string;
  readonly command: string;
  readonly now: () => number;
  readonly onPhase?: (phase: Phase, detail: string) => void;
}

/** A screened stepper with what its search found, for the report. */
export interface Tried {
  readonly candidate: Candidate;
  readonly screening: Screening;
}

export interface ChoiceRun {
  readonly choice: Choice;
  readonly context: ChoiceContext;
  readonly tried: readonly Tried[];
}

/** Steppers whose screened cost is over this many times the best are not run in full... */
const WORTH_RUNNING = 3.5;
/** ... nor are those that come after so many cheaper ones that were; the screened cost is good to about this share. */
const RUN_IN_FULL = 5;
const SCREENING_ERROR = 0.12;
const DEFAULT_MINUTES = 2;
/** A screened cost this far above a cap on evaluations excludes without a run in full; nearer, the run decides. */
const CERTAINLY_OVER = 1.3;

/**
 * The main job: for every stepper the largest step whose errors hold every limit over the whole duration, fleet and band of steps, found
 * by search and then run in full; ranked by force evaluations.
 */
export async function chooseStepper(scenario: Scenario, options: ChooseOptions): Promise<ChoiceRun> {
  const { pool, now } = options;
  const began = now();
  const fleet = buildFleet(scenario);
  const limits = limitsOf(scenario.limits, scenario.integrationShare);
  const measurer = new Measurer(pool, limits, fleet.durationSeconds);
  const designFactor = scenario.designFactor ?? 2;
  const context: ChoiceContext = { scenario, fleet, measurer, designFactor, seed: options.seed };
  const excluded: ExcludedStepper[] = [];
  const seconds = { screening: 0, search: 0, verification: 0, sensitivity: 0 };
  const timed = async <T>(phase: keyof typeof seconds, work: () => Promise<T>): Promise<T> => {
    const from = now();
    const result = await work();
    seconds[phase] += (now() - from) / 1000;
    return result;
  };

  const suitable = options.steppers.filter((stepper) => {
    const unmet = unmetRequirement(stepper, scenario.require);
    if (unmet !== null) excluded.push(unmet);
    return unmet === null;
  });
  const cap = scenario.require?.evaluationsPerOrbit ?? Number.POSITIVE_INFINITY;
  options.onPhase?.("screening", `${suitable.length} steppers`);
  const tried = await timed("screening", () =>
    Promise.all(
      suitable.map(async (stepper): Promise<Tried> => {
        const candidate = makeCandidate(stepper, context);
        return { candidate, screening: await screen(context, candidate, Math.min(65_536, 4 * cap)) };
      }),
    ),
  );

  const hopeful: { tried: Tried; estimate: Screened }[] = [];
  for (const entry of tried) {
    const { estimate } = entry.screening;
    if (estimate === null) excluded.push(failedEntry(context, entry.candidate, entry.screening, null));
    else if (estimate.evaluationsPerOrbit > cap * CERTAINLY_OVER) {
      excluded.push(
        overCap(entry.candidate.stepper, estimate.evaluationsPerOrbit, cap, "extrapolated from short runs"),
      );
    } else hopeful.push({ tried: entry, estimate });
  }
  hopeful.sort((a, b) => a.estimate.evaluationsPerOrbit - b.estimate.evaluationsPerOrbit);

  const ranking: RankedStepper[] = [];
  const budget = (options.minutes ?? DEFAULT_MINUTES) * WORK_PER_MINUTE;
  const beyondBudget: string[] = [];
  const costs: number[] = [];
  const worthRunning = ({ candidate }: Tried, { fineness, evaluationsPerOrbit: cost }: Screened): boolean => {
    const cheaper = costs.toSorted((a, b) => a - b);
    const [best] = cheaper;
    const last = cheaper[RUN_IN_FULL - 1];
    if (best !== undefined && cost > best * WORTH_RUNNING) return false;
    // At the coarsest setting allowed the cost cannot turn out lower.
    const least = fineness <= candidate.knob.coarsest ? cost : cost * (1 - SCREENING_ERROR);
    return last === undefined || least < last;
  };
  for (const { tried: entry, estimate } of hopeful) {
    const { candidate } = entry;
    const { id } = candidate.stepper;
    const affordable =
      workOf(pool.stepsRun, pool.evaluationsRun) + workInFull(context, candidate, estimate) <= budget;
    if (!affordable) beyondBudget.push(id);
    if (!affordable || !worthRunning(entry, estimate)) {
      ranking.push(rankedScreening(context, candidate, estimate));
      continue;
    }
    options.onPhase?.("search", id);
    const found: Found = await timed("search", () => search(context, candidate, estimate.fineness));
    if (found.fineness === null) {
      excluded.push(failedEntry(context, candidate, entry.screening, found));
      continue;
    }
    options.onPhase?.("verification", id);
    const hard = [...found.worstSamples];
    const verified = await timed("verification", () =>
      verify(context, candidate, found.fineness as number, hard),
    );
    if (!isVerified(verified)) {
      const failed = { ...found, nearest: verified.reading, nearestFineness: verified.fineness };
      excluded.push(failedEntry(context, candidate, entry.screening, failed));
      continue;
    }
    const cliff = await timed("search", () => findCliff(context, candidate, verified.fineness, hard));
    const ranked = rankedRun(context, candidate, verified, cliff);
    if (ranked.evaluationsPerOrbit > cap) {
      excluded.push(overCap(candidate.stepper, ranked.evaluationsPerOrbit, cap, "run in full"));
      continue;
    }
    costs.push(ranked.evaluationsPerOrbit);
    ranking.push(ranked);
  }
  ranking.sort((a, b) => rankKey(a) - rankKey(b) || a.stepper.localeCompare(b.stepper));
  const explained = explainRanking(ranking).map((entry) => namingOwn(entry, options));
  // Where nothing could be run in full within the budget, the cheapest of the screened is the answer, and says that it is extrapolated.
  const winner =
    explained.find((entry) => entry.evidence === "run") ??
    explained.find(({ margin: held }) => held >= designFactor * (1 - 1e-6)) ??
    null;

  let current: CurrentChoice | null = null;
  if (scenario.current !== undefined) {
    options.onPhase?.("current", scenario.current.stepper);
    const stepper =
      options.steppers.find(({ id }) => id === scenario.current?.stepper) ??
      findStepper(scenario.current.stepper);
    current = await timed("verification", () => assessCurrent(context, stepper as Stepper, winner));
  }

  const winnerStepper = options.steppers.find(({ id }) => id === winner?.stepper);
  options.onPhase?.("sensitivity", "");
  const changes = await timed("sensitivity", () => sensitivity(context, tried));
  if (current !== null) current = namingOwn(current, options);
  const body = {
    format: "perigauge-choice/1",
    scenario,
    choice: winner?.stepper ?? null,
    ranking: explained,
    current,
    excluded,
    whatWouldHaveToGive: winner === null ? whatWouldHaveToGive(context, tried, excluded) : [],
    explanation: explain(context, winner, explained),
    sensitivity: changes,
    handOver:
      winner === null || winnerStepper === undefined ? null : handOver(context, winnerStepper, winner),
    bodies: bodiesOf(scenario),
    cautions: cautionsOf(context, winner, explained, beyondBudget),
  } as const;
  const choice: Choice = {
    ...body,
    provenance: {
      version: options.version,
      node: process.version,
      command: options.command,
      seed: options.seed,
      digest: digestOf(body),
      cellsRun: pool.cellsRun,
      seconds: { ...seconds, total: (now() - began) / 1000 },
    },
  };
  return { choice, context, tried };
}

/** Commands that re-run a stepper of one's own name its module. */
function namingOwn<T extends RankedStepper>(entry: T, { steppers, ownFiles = [] }: ChooseOptions): T {
  if (steppers.find(({ id }) => id === entry.stepper)?.family !== "own") return entry;
  const own = ownFiles.map((file) => ` --own ${file}`).join("");
  const errors = Object.entries(entry.errors).map(([id, error]) => [
    id,
    { ...error, command: error.command.replace(/^perigauge score/, `perigauge score${own}`) },
  ]);
  return { ...entry, errors: Object.fromEntries(errors) };
}

/** Each body's share of a relative error, from the mass ratio, where the scenario gives one. */
function bodiesOf({ massRatio }: Scenario): BodyErrors | null {
  if (massRatio === undefined) return null;
  return { massRatio, heavierShare: massRatio / (1 + massRatio), lighterShare: 1 / (1 + massRatio) };
}

/** What was run in full ranks before what was only screened. */
function rankKey(entry: RankedStepper): number {
  return entry.evaluationsTotal + (entry.evidence === "run" ? 0 : Number.MAX_SAFE_INTEGER);
}

function overCap(stepper: StepperInfo, needed: number, cap: number, how: string): ExcludedStepper {
  const rounded = Math.round(needed);
  return {
    stepper: stepper.id,
    reason: `needs ${rounded} force evaluations per orbit (${how}), ${threeDigits(needed / cap)} times the ${cap} allowed`,
    limit: "evaluationsPerOrbit",
    value: rounded,
    allowed: cap,
  };
}
