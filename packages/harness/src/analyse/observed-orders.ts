import type { Stepper } from "@perigauge/steppers";
import type { CellPool } from "../run/cell-pool.ts";
import type { Cell, MeasureName, Score, Summation } from "../score/score.ts";
import { type ExpectedOrder, expectedOrder } from "./expected-order.ts";
import type { Fit } from "./fit.ts";
import { errorOf, ORDER_MEASURES, type OrderMeasure, roundingFloor } from "./order-measures.ts";
import { FLOOR_MARGIN, fitOrder } from "./order-window.ts";
import { LEAST_TOLERANCE, rungSteps, rungTolerance } from "./step-ladder.ts";

export interface OrderStudy {
  readonly steppers: readonly Stepper[];
  readonly eccentricities: readonly number[];
  /** Ladders of one's own; null for the automatic one. */
  readonly stepsPerOrbit: readonly number[] | null;
  readonly tolerances: readonly number[] | null;
  readonly orbits: number;
  readonly startAnomalyDeg: number;
  readonly summation: Summation;
}

export interface OrderPoint {
  /** Null for a variable step, whose fineness is `acceptedStepsPerOrbit`. */
  readonly stepsPerOrbit: number | null;
  readonly tolerance: number | null;
  readonly acceptedStepsPerOrbit: number;
  readonly evaluationsPerOrbit: number;
  /** Null where the run diverged or does not have this measure. */
  readonly error: number | null;
}

export interface ObservedOrder extends ExpectedOrder {
  readonly stepper: string;
  readonly eccentricity: number;
  readonly measure: OrderMeasure;
  readonly order: number | null;
  readonly standardError: number | null;
  /** Whether the order lies in the expected range, give or take 0.15, 5% or three standard errors; null where nothing can be said. */
  readonly agrees: boolean | null;
  /** Points inside the window, on which the fit stands. */
  readonly pointsFitted: number;
  readonly window: { readonly from: number; readonly to: number } | null;
  readonly floor: number | null;
  readonly floorFrom: number | null;
  readonly note: string | null;
  readonly points: readonly OrderPoint[];
}

export interface OrderResult {
  readonly format: "perigauge-orders/1";
  readonly orbits: number;
  readonly startAnomalyDeg: number;
  readonly summation: Summation;
  readonly orders: readonly ObservedOrder[];
}

/** A finer run than this many force evaluations is not made by the automatic ladder. */
const MOST_EVALUATIONS = 2 ** 19;
/** Rungs made at a time: one to four octaves. */
const BATCH = 8;
/** Rungs beyond the start of the floor of every measure, to show it. */
const FLOOR_RUNGS = 4;
/**
 * Passages are taken from a run this much longer, in orbits: a late body would miss the last one otherwise. A start elsewhere than at
 * periapsis is no passage, and two are needed: one orbit more.
 */
const passageSlack = (startAnomalyDeg: number): number => (startAnomalyDeg % 360 === 0 ? 0.25 : 1.25);

const STEP_PLAN: readonly MeasureName[] = ["energy", "phase", "position", "apsis"];
const PASSAGE_PLAN: readonly MeasureName[] = ["period", "timing"];

interface Ladder {
  readonly stepper: Stepper;
  readonly eccentricity: number;
  readonly runs: { readonly run: Score; readonly passages: Score }[];
  next: number;
  done: boolean;
}

/** Observed orders of every stepper, eccentricity and measure, and the scores behind them. */
export async function observeOrders(
  study: OrderStudy,
  pool: CellPool,
): Promise<{ readonly result: OrderResult; readonly scores: readonly Score[] }> {
  const ladders: Ladder[] = study.steppers.flatMap((stepper) =>
    study.eccentricities.map((eccentricity) => ({ stepper, eccentricity, runs: [], next: 0, done: false })),
  );
  for (;;) {
    const wanted = ladders.flatMap((ladder) => nextCells(study, ladder).map((cell) => ({ ladder, cell })));
    if (wanted.length === 0) break;
    const jobs = wanted.map(({ cell }) => ({ cell, horizons: [] }));
    const longer = wanted.map(({ cell }) => ({
      cell: { ...cell, orbits: cell.orbits + passageSlack(cell.startAnomalyDeg) },
      horizons: [],
    }));
    const runs = await pool.run(jobs, { measures: STEP_PLAN, summaries: "all" });
    const passages = await pool.run(longer, { measures: PASSAGE_PLAN, summaries: "maxima" });
    wanted.forEach(({ ladder }, i) => {
      ladder.runs.push({ run: runs[i] as Score, passages: passages[i] as Score });
    });
    for (const ladder of ladders) if (!ladder.done && isFineEnough(study, ladder)) ladder.done = true;
  }
  const { orbits, startAnomalyDeg, summation } = study;
  return {
    result: {
      format: "perigauge-orders/1",
      orbits,
      startAnomalyDeg,
      summation,
      orders: ladders.flatMap((ladder) =>
        ORDER_MEASURES.map((measure) => observedOrder(study, ladder, measure)),
      ),
    },
    scores: ladders.flatMap(({ runs }) => runs.flatMap(({ run, passages }) => [run, passages])),
  };
}

/** The rungs to be run next: all of a ladder of one's own at once, else a batch of the automatic one. */
function nextCells(study: OrderStudy, ladder: Ladder): Cell[] {
  if (ladder.done) return [];
  const { stepper, eccentricity } = ladder;
  const { orbits, startAnomalyDeg, summation } = study;
  const common = { stepper: stepper.id, eccentricity, orbits, startAnomalyDeg, summation };
  const own = stepper.knob === "step" ? study.stepsPerOrbit : study.tolerances;
  if (own !== null) {
    ladder.done = true;
    return own.map((value) =>
      stepper.knob === "step" ? { ...common, stepsPerOrbit: value } : { ...common, tolerance: value },
    );
  }
  const rungs = Array.from({ length: BATCH }, (_, i) => ladder.next + i);
  ladder.next += BATCH;
  return stepper.knob === "step"
    ? rungs
        .map((i) => ({ from: i === 0 ? 0 : rungSteps(stepper, eccentricity, i - 1), i }))
        .map(({ from, i }) => ({ from, to: rungSteps(stepper, eccentricity, i) }))
        .filter(({ from, to }) => to > from)
        .map(({ to }) => ({ ...common, stepsPerOrbit: to }))
    : rungs
        .map((i) => rungTolerance(stepper, i))
        .filter((tolerance) => tolerance >= LEAST_TOLERANCE)
        .map((tolerance) => ({ ...common, tolerance }));
}

/** True once the next rungs would cost too much, or every measure has been at its floor for a few rungs. */
function isFineEnough(study: OrderStudy, ladder: Ladder): boolean {
  const { stepper, runs } = ladder;
  const last = runs.at(-1)?.run;
  if (last === undefined) return true;
  if (stepper.knob === "tolerance" && rungTolerance(stepper, ladder.next) < LEAST_TOLERANCE) return true;
  if (2 * last.evaluations > MOST_EVALUATIONS) return true;
  if (runs.length < FLOOR_RUNGS) return false;
  return ORDER_MEASURES.every((measure) =>
    runs.slice(-FLOOR_RUNGS).every(({ run, passages }) => {
      const error = errorOf(measure, run, passages);
      return (
        (error === null && run.ended.status === "completed") ||
        (error !== null && error < FLOOR_MARGIN * floorOf(study, ladder, measure, run))
      );
    }),
  );
}

function floorOf(study: OrderStudy, { eccentricity }: Ladder, measure: OrderMeasure, run: Score): number {
  return roundingFloor(measure, eccentricity, study.orbits, run.steps, run.evaluations);
}

/** How far an order may lie from the expected one beside three standard errors: the next power still counts over a window of finite steps. */
const LEEWAY = 0.15;
const RELATIVE_LEEWAY = 0.05;

const DISAGREES =
  "not the expected order: over these steps the next power still counts, or leading terms cancel (compare the points)";

function agreesWith(order: Fit, { expectedRange }: ExpectedOrder): boolean | null {
  if (expectedRange === null) return null;
  const leeway = Math.max(LEEWAY, RELATIVE_LEEWAY * expectedRange[1], 3 * order.standardError);
  return order.value >= expectedRange[0] - leeway && order.value <= expectedRange[1] + leeway;
}

function observedOrder(study: OrderStudy, ladder: Ladder, measure: OrderMeasure): ObservedOrder {
  const { stepper, eccentricity, runs } = ladder;
  const points = runs.map(
    ({ run, passages }): OrderPoint => ({
      stepsPerOrbit: run.stepsPerOrbit,
      tolerance: run.tolerance,
      acceptedStepsPerOrbit: run.stepsPerOrbit ?? run.steps / run.orbits,
      evaluationsPerOrbit: run.evaluationsPerOrbit,
      error: errorOf(measure, run, passages),
    }),
  );
  const fit = fitOrder(
    points.map(({ acceptedStepsPerOrbit, error }, i) => ({
      fineness: acceptedStepsPerOrbit,
      error,
      floor: floorOf(study, ladder, measure, (runs[i] as Ladder["runs"][number]).run),
    })),
  );
  const expected = expectedOrder(stepper, measure, {
    eccentricity,
    orbits: study.orbits,
    startAnomalyDeg: study.startAnomalyDeg,
  });
  const agrees = fit.order === null ? null : agreesWith(fit.order, expected);
  return {
    stepper: stepper.id,
    eccentricity,
    measure,
    ...expected,
    order: fit.order?.value ?? null,
    standardError: fit.order?.standardError ?? null,
    agrees,
    pointsFitted: fit.order?.points ?? 0,
    window: fit.window,
    floor: fit.floor,
    floorFrom: fit.floorFrom,
    note: agrees === false ? DISAGREES : fit.note,
    points,
  };
}
