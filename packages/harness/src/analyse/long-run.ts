import type { Stepper } from "@perigauge/steppers";
import { resolveCell } from "../run/resolve-cell.ts";
import { runCell } from "../run/run-cell.ts";
import type { GrowthJudgement } from "../score/growth.ts";
import { type Cell, MEASURES, type Score } from "../score/score.ts";
import type { EnergyTrendResult } from "./energy-trend.ts";
import type { Fit } from "./fit.ts";
import { LogTimeSeries, type SeriesPoint } from "./log-time-series.ts";
import { type GrowthMeasure, OrbitWalk } from "./orbit-laws.ts";

/** What a run of many orbits shows: its score, the trend of its energy, growth laws, and a history even in log time. */
export interface LongRun {
  readonly stepper: string;
  readonly eccentricity: number;
  readonly stepsPerOrbit: number | null;
  readonly tolerance: number | null;
  readonly orbits: number;
  readonly startAnomalyDeg: number;
  readonly summation: Cell["summation"];
  readonly score: Score;
  readonly energyTrend: EnergyTrendResult["energyTrend"];
  readonly atFloor: boolean | null;
  readonly energyTrendStatistics: EnergyTrendResult["statistics"];
  readonly energyTrendNote: string | null;
  readonly energyGrowthExponent: number | null;
  readonly phaseGrowthExponent: number | null;
  readonly growth: Readonly<Record<GrowthMeasure, GrowthJudgement>>;
  readonly apsisPerOrbit: Fit | null;
  readonly series: readonly SeriesPoint[];
  readonly notes: readonly string[];
}

/**
 * Runs a cell and judges its behaviour in time. Memory does not depend on the length of the run.
 *
 * @throws InvalidInputError for a cell that cannot be run
 */
export function longRun(cell: Cell, stepper: Stepper): LongRun {
  const resolved = resolveCell(cell, stepper);
  const step = stepper.uneven ? null : resolved.step;
  const circular = cell.eccentricity === 0;
  const walk = new OrbitWalk(cell.orbits, step, circular);
  const series = new LogTimeSeries(cell.orbits, step, circular);
  const score = runCell(cell, stepper, {
    measures: new Set(MEASURES),
    summaries: "all",
    horizons: [],
    observe: (window) => {
      walk.accept(window);
      series.accept(window);
    },
    observePassage: (passage) => series.passage(passage),
  });
  const laws = walk.finish(score.ended.status === "completed", score.steps, score.evaluations);
  return {
    stepper: cell.stepper,
    eccentricity: cell.eccentricity,
    stepsPerOrbit: score.stepsPerOrbit,
    tolerance: score.tolerance,
    orbits: cell.orbits,
    startAnomalyDeg: cell.startAnomalyDeg,
    summation: cell.summation,
    score,
    energyTrend: laws.trend.energyTrend,
    atFloor: laws.trend.atFloor,
    energyTrendStatistics: laws.trend.statistics,
    energyTrendNote: laws.trend.note,
    energyGrowthExponent: laws.growth.energy.growthExponent,
    phaseGrowthExponent: laws.growth.phase.growthExponent,
    growth: laws.growth,
    apsisPerOrbit: laws.apsisPerOrbit,
    series: series.finish(),
    notes: notesOn(score),
  };
}

function notesOn(score: Score): string[] {
  const notes: string[] = [];
  if (score.ended.status === "diverged") {
    notes.push(`diverged (${score.ended.reason}) after ${score.ended.atOrbit.toPrecision(4)} orbits`);
  }
  if (score.stepsPerOrbit !== null && Number.isInteger(score.stepsPerOrbit)) {
    notes.push(
      "whole steps per orbit: resonant librations can look like drift; a fraction (such as +0.37) avoids them",
    );
  }
  if (score.phaseUncertain) notes.push("one step changed the phase by more than pi/2: its turns are a guess");
  return notes;
}
