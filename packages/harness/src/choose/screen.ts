import type { StepperInfo } from "@perigauge/steppers";
import type { Cell } from "../score/score.ts";
import type { Candidate, ChoiceContext } from "./candidate.ts";
import { corners, daysToSeconds, type FleetPoint, orbitsOf, pointAt } from "./fleet.ts";
import { extrapolate, steepestGrowth } from "./growth-law.ts";
import type { Limit } from "./limits.ts";
import { roundingFloor } from "./limits.ts";
import { type Reading, readingOfHorizon, type Sample } from "./measure.ts";
import { screeningStartsOf } from "./starts.ts";

/** A short run carried on to the scenario's duration by its growth. */
export interface Screened {
  readonly fineness: number;
  /** Extrapolated worst value over its limit. */
  readonly ratio: number;
  readonly evaluationsPerOrbit: number;
  readonly worst: readonly ScreenedLimit[];
}

export interface ScreenedLimit {
  readonly limit: Limit;
  readonly value: number;
  readonly reading: Reading;
  readonly uncertaintyFactor: number;
}

export interface Screening {
  readonly tried: readonly Screened[];
  /** Fineness at which the limits divided by the design factor are met, as far as short runs tell; null where none was found. */
  readonly estimate: Screened | null;
  /** Observed order of the worst ratio in the fineness. */
  readonly order: number;
}

const SHORT_ORBITS = 10;
const LONGER_ORBITS = 60;
/** Screening stops at this many force evaluations an orbit; beyond, the estimate is carried on with the method's order. */
const MOST_EVALUATIONS = 65_536;
/** An estimate is carried no further than this beyond what was screened. */
const MOST_CARRIED = 1000;

/**
 * Screening of one stepper: runs of ten orbits at the corners of the ranges and a few starts, finer and finer until the extrapolated
 * errors hold limit / designFactor; then one correction with runs of sixty orbits.
 */
export async function screen(
  context: ChoiceContext,
  candidate: Candidate,
  evaluationLimit: number = MOST_EVALUATIONS,
): Promise<Screening> {
  const { designFactor } = context;
  const { knob } = candidate;
  const tried: Screened[] = [];
  const at = async (fineness: number, orbits: number): Promise<Screened> => {
    const screened = await screenAt(context, candidate, fineness, orbits);
    tried.push(screened);
    return screened;
  };
  const stride = knob.kind === "step" ? 2 : 10;
  let coarse: Screened | null = null;
  let fine = await at(knob.coarsest, SHORT_ORBITS);
  while (
    fine.ratio * designFactor > 1 &&
    fine.fineness < knob.finest &&
    costOf(fine, candidate) < evaluationLimit
  ) {
    coarse = fine;
    fine = await at(Math.min(knob.finest, fine.fineness * stride), SHORT_ORBITS);
  }
  const order = coarse === null || !(fine.ratio < coarse.ratio) ? 0 : slope(coarse, fine);
  if (fine.ratio * designFactor > 1) {
    // Beyond the screening range: carried on with the order seen, if there is one.
    if (!(order > 0.5) || fine.fineness >= knob.finest || !Number.isFinite(fine.ratio))
      return { tried, estimate: null, order };
    const factor = (fine.ratio * designFactor) ** (1 / order);
    return { tried, estimate: carriedOn(context, candidate, fine, factor), order };
  }
  const near = knob.snap(coarse === null ? fine.fineness : crossing(coarse, fine, order, designFactor));
  const longer = await at(near, LONGER_ORBITS);
  if (coarse === null && longer.ratio * designFactor <= 1) return { tried, estimate: longer, order };
  const power = order > 0.5 ? order : Math.max(1, candidate.stepper.order);
  const factor = Number.isFinite(longer.ratio) ? (longer.ratio * designFactor) ** (1 / power) : 2;
  const fineness = knob.snap(near * factor);
  const estimate = fineness === near ? longer : carriedOn(context, candidate, longer, fineness / near);
  return { tried, estimate, order };
}

/** Evaluations an orbit, by the step where they follow from it; a run that diverged early says nothing of its cost. */
function costOf({ fineness, ratio, evaluationsPerOrbit }: Screened, { stepper, knob }: Candidate): number {
  if (knob.kind === "step" && stepper.evaluationsPerStep !== null)
    return fineness * stepper.evaluationsPerStep;
  return Number.isFinite(ratio) ? evaluationsPerOrbit : 0;
}

function slope(coarse: Screened, fine: Screened): number {
  if (!Number.isFinite(coarse.ratio) || fine.ratio === 0) return 0;
  return Math.log(coarse.ratio / fine.ratio) / Math.log(fine.fineness / coarse.fineness);
}

/** Where the ratio crosses 1 / designFactor, straight in logarithms; the finer end where the coarser one diverged. */
function crossing(coarse: Screened, fine: Screened, order: number, designFactor: number): number {
  return order > 0.5 ? coarse.fineness * (coarse.ratio * designFactor) ** (1 / order) : fine.fineness;
}

/**
 * A screening carried on to another fineness, where the limits should just be met. Cost grows in proportion to the steps, and as the
 * inverse tolerance to the power 1/order. Null where the limits lie below the rounding floor there.
 */
function carriedOn(
  { designFactor, measurer }: ChoiceContext,
  { stepper, knob }: Candidate,
  from: Screened,
  factor: number,
): Screened | null {
  const cost = knob.kind === "step" ? factor : factor ** (1 / Math.max(1, stepper.order));
  const evaluationsPerOrbit = from.evaluationsPerOrbit * cost;
  const scale = 1 / (designFactor * from.ratio);
  const worst = from.worst.map((entry) => ({ ...entry, value: entry.value * scale }));
  const belowFloor = worst.some(({ limit, reading }) => {
    const orbits = orbitsOf(reading.sample.point, measurer.durationSeconds);
    return (
      roundingFloor(limit, reading.sample.point, orbits, evaluationsPerOrbit) * designFactor > limit.limit
    );
  });
  if (belowFloor || !(factor <= MOST_CARRIED)) return null;
  return { ...from, fineness: from.fineness * factor, evaluationsPerOrbit, ratio: 1 / designFactor, worst };
}

/** How many times larger an extrapolated value would be with the steepest growth that theory allows. */
function steepestOver(
  { measurer }: ChoiceContext,
  stepper: StepperInfo,
  limit: Limit,
  { sample, cell, limits }: Reading,
  value: number,
): number {
  const seconds = limit.withinDays === null ? measurer.durationSeconds : daysToSeconds(limit.withinDays);
  const short = limits[measurer.limits.indexOf(limit)]?.value ?? 0;
  const steepest = steepestGrowth(stepper, limit.key);
  const largest = short * Math.max(1, orbitsOf(sample.point, seconds) / cell.orbits) ** steepest;
  return value > 0 && Number.isFinite(largest) ? Math.max(1, largest / value) : 1;
}

async function screenAt(
  context: ChoiceContext,
  { stepper, knob }: Candidate,
  fineness: number,
  wantedOrbits: number,
): Promise<Screened> {
  const { scenario, fleet, measurer } = context;
  const samples = screeningSamples(
    corners(fleet),
    (index) => pointAt(fleet, index, 0.9, 0.9),
    screeningStartsOf(scenario),
  );
  const orbitsAt = (point: FleetPoint): number =>
    Math.min(wantedOrbits, orbitsOf(point, measurer.durationSeconds));
  const runs = samples.map((sample) => {
    const full = knob.cellAt(sample.point, sample.startAnomalyDeg, fineness, measurer.durationSeconds);
    const cell: Cell = { ...full, orbits: orbitsAt(sample.point) };
    return { sample, cell };
  });
  const readings = await measurer.measure(runs, (point) => [orbitsAt(point) / 2]);
  const worst = measurer.limits.map((limit, i): ScreenedLimit => {
    const values = readings.map((reading) => {
      const { point } = reading.sample;
      const run = reading.cell.orbits;
      const seconds = limit.withinDays === null ? measurer.durationSeconds : daysToSeconds(limit.withinDays);
      const wanted = Math.min(orbitsOf(point, seconds), orbitsOf(point, measurer.durationSeconds));
      const value = reading.limits[i]?.value ?? Number.POSITIVE_INFINITY;
      if (wanted <= run) return value;
      const half = readingOfHorizon(limit, reading, run / 2);
      return extrapolate(half, value, run, wanted, steepestGrowth(stepper, limit.key));
    });
    const at = values.reduce((best, value, k) => (value > (values[best] as number) ? k : best), 0);
    const reading = readings[at] as Reading;
    return {
      limit,
      value: values[at] as number,
      reading,
      uncertaintyFactor: steepestOver(context, stepper, limit, reading, values[at] as number),
    };
  });
  return {
    fineness,
    ratio: Math.max(...worst.map(({ limit, value }) => value / limit.limit)),
    evaluationsPerOrbit: evaluationsPerShortestOrbit(readings, fleet.shortestPeriodSeconds),
    worst,
  };
}

/** Force evaluations in one period of the shortest orbit, the largest over the readings. */
export function evaluationsPerShortestOrbit(
  readings: readonly Reading[],
  shortestPeriodSeconds: number,
): number {
  return Math.max(
    ...readings.map(
      ({ score, sample }) => (score.evaluationsPerOrbit * shortestPeriodSeconds) / sample.point.periodSeconds,
    ),
  );
}

function screeningSamples(
  ends: readonly FleetPoint[],
  inside: (orbitIndex: number) => FleetPoint,
  starts: readonly number[],
): Sample[] {
  const ranged = new Set(
    ends.filter(({ parameters }) => parameters[0] > 0 || parameters[1] > 0).map((end) => end.orbitIndex),
  );
  const points = [...ends, ...[...ranged].map(inside)];
  return points.flatMap((point) => starts.map((startAnomalyDeg) => ({ point, startAnomalyDeg })));
}
