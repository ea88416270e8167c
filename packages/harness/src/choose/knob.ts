import type { StepperInfo } from "@perigauge/steppers";
import type { Scenario } from "../scenario/scenario.ts";
import type { Cell } from "../score/score.ts";
import { corners, type Fleet, type FleetPoint, orbitsOf } from "./fleet.ts";

/**
 * What is turned to make a stepper finer or coarser. One number, `fineness`, serves both kinds: steps per orbit of the shortest orbit for
 * a fixed step, 1/tolerance for a variable one.
 */
export interface Knob {
  readonly kind: "step" | "tolerance";
  /** Coarsest fineness that the scenario allows: step cap, grid, and no fewer than five steps per orbit. */
  readonly coarsest: number;
  readonly finest: number;
  /** The next allowed fineness after a change by about `factor` (above 1: finer; below 1: coarser); the same one at an end. */
  move(fineness: number, factor: number): number;
  /** The nearest allowed fineness that is not coarser. */
  snap(fineness: number): number;
  /** Factors of fineness over which a recommended value must hold. */
  readonly band: readonly number[];
  /** One notch of the search. */
  readonly notch: number;
  cellAt(point: FleetPoint, startAnomalyDeg: number, fineness: number, seconds: number): Cell;
  /** Cells at steps per orbit that are whole, or just off whole, near this cell's own: resonances live there. None for a tolerance. */
  nearWhole(cell: Cell): Cell[];
  physical(fineness: number): {
    readonly stepSeconds: number | null;
    readonly stepsPerOrbit: number | null;
    readonly tolerance: number | null;
  };
}

const FEWEST_STEPS = 5;
const MOST_STEPS = 2 ** 22;
const COARSEST_TOLERANCE = 1e-2;
const FINEST_TOLERANCE = 1e-15;
const STEP_BAND = [1, 1.03, 1.08, 1.15, 1.25, 1.5, 2] as const;
/** Distances from a whole number of steps per orbit at which resonances were seen. */
const OFFSETS = [0, 0.0005, -0.0005, 0.002, -0.002, 0.2, 0.4] as const;
const TWO_PI = 2 * Math.PI;

export function knobOf(stepper: StepperInfo, scenario: Scenario, fleet: Fleet): Knob {
  return stepper.knob === "step" ? stepKnob(stepper, scenario, fleet) : toleranceKnob(stepper, scenario);
}

function stepKnob(stepper: StepperInfo, scenario: Scenario, fleet: Fleet): Knob {
  const period = fleet.shortestPeriodSeconds;
  const grid = stepper.uneven ? undefined : scenario.step?.multipleOfSeconds;
  const onGrid = (seconds: number): number =>
    grid === undefined ? seconds : Math.max(1, Math.floor(seconds / grid + 1e-9)) * grid;
  const cap =
    (scenario.step?.maxSeconds ?? Number.POSITIVE_INFINITY) / (stepper.uneven ? largestOverMean(fleet) : 1);
  const longest = onGrid(Math.min(cap, period / FEWEST_STEPS));
  const coarsest = period / longest;
  const finest = grid === undefined ? MOST_STEPS : period / grid;
  const within = (fineness: number): number => Math.min(finest, Math.max(coarsest, fineness));
  const snap = (fineness: number): number => within(period / onGrid(period / fineness));
  const move = (fineness: number, factor: number): number => {
    if (grid === undefined) return within(fineness * factor);
    const count = Math.round(period / fineness / grid);
    const wanted = count / factor;
    const next =
      factor > 1
        ? Math.min(count - 1, Math.floor(wanted + 1e-9))
        : Math.max(count + 1, Math.floor(wanted + 1e-9));
    return within(period / (Math.max(1, next) * grid));
  };
  return {
    kind: "step",
    coarsest,
    finest,
    move,
    snap,
    band: STEP_BAND,
    notch: 1.03,
    cellAt: (point, startAnomalyDeg, fineness, seconds) => ({
      stepper: stepper.id,
      eccentricity: point.eccentricity,
      // The step in seconds comes first; it is rounded once to normalised units.
      step: secondsOf(period, fineness, grid) * point.meanMotion,
      // Uneven steps make whole orbits alike but not parts of one: whole orbits, rounded up, cover the duration from any start.
      orbits: stepper.uneven ? Math.ceil(orbitsOf(point, seconds)) : orbitsOf(point, seconds),
      startAnomalyDeg,
      summation: "plain",
    }),
    nearWhole: (cell) => {
      const own = TWO_PI / (cell.step as number);
      const whole = Math.round(own);
      const near = new Set([Math.floor(own), Math.ceil(own), ...OFFSETS.map((offset) => whole + offset)]);
      return [...near].filter((n) => n >= FEWEST_STEPS).map((n) => ({ ...cell, step: TWO_PI / n }));
    },
    physical: (fineness) => ({
      // Uneven steps have no one length in seconds: steps per orbit say all there is.
      stepSeconds: stepper.uneven ? null : secondsOf(period, fineness, grid),
      stepsPerOrbit: fineness,
      tolerance: null,
    }),
  };
}

/** Largest step over the mean one where steps are proportional to the radius: 1 + e at apoapsis. */
function largestOverMean(fleet: Fleet): number {
  return 1 + Math.max(...corners(fleet).map(({ eccentricity }) => eccentricity));
}

/** Seconds of a fineness; on a grid the multiple itself, free of the rounding of the division. */
function secondsOf(period: number, fineness: number, grid: number | undefined): number {
  const seconds = period / fineness;
  if (grid === undefined) return seconds;
  const multiple = Math.round(seconds / grid) * grid;
  return Math.abs(multiple - seconds) < 1e-9 * seconds ? multiple : seconds;
}

function toleranceKnob(stepper: StepperInfo, scenario: Scenario): Knob {
  const coarsest = 1 / COARSEST_TOLERANCE;
  const finest = 1 / FINEST_TOLERANCE;
  // Eighths of a decade, so that tolerances read well and a resumed search meets the same values.
  const snap = (fineness: number): number => {
    // The slack covers the rounding of the tolerances to three digits.
    const eighths = Math.ceil(8 * Math.log10(Math.min(finest, Math.max(coarsest, fineness))) - 0.05);
    return 1 / eighthOfDecade(-eighths);
  };
  const maxSeconds = scenario.step?.maxSeconds;
  return {
    kind: "tolerance",
    coarsest,
    finest,
    snap,
    move: (fineness, factor) => {
      const steps = 8 * Math.log10(factor);
      const eighths = factor > 1 ? Math.max(1, Math.round(steps)) : Math.min(-1, Math.round(steps));
      return snap(fineness * 10 ** (eighths / 8));
    },
    band: Array.from({ length: 9 }, (_, i) => 10 ** (i / 8)),
    notch: 10 ** (1 / 8),
    cellAt: (point, startAnomalyDeg, fineness, seconds) => ({
      stepper: stepper.id,
      eccentricity: point.eccentricity,
      tolerance: toleranceOf(fineness),
      ...(maxSeconds === undefined ? {} : { maxStep: maxSeconds * point.meanMotion }),
      orbits: orbitsOf(point, seconds),
      startAnomalyDeg,
      summation: "plain",
    }),
    nearWhole: () => [],
    physical: (fineness) => ({ stepSeconds: null, stepsPerOrbit: null, tolerance: toleranceOf(fineness) }),
  };
}

/** 1/fineness, free of the rounding of the division. */
function toleranceOf(fineness: number): number {
  return Number((1 / fineness).toPrecision(6));
}

/** 10^(k/8) rounded to three significant digits. */
function eighthOfDecade(k: number): number {
  return Number((10 ** (k / 8)).toPrecision(3));
}
