import { type Fit, fitSlope } from "./fit.ts";

/** One rung of a ladder of steps: how fine it is and the error found. */
export interface Rung {
  /** Steps per orbit; for a variable-step stepper the accepted steps per orbit. */
  readonly fineness: number;
  readonly error: number | null;
  /** Rounding floor of this rung. */
  readonly floor: number;
}

export interface OrderFit {
  /** Order and its standard error; null where there is no asymptotic window. */
  readonly order: Fit | null;
  readonly window: { readonly from: number; readonly to: number } | null;
  /** Median error of the rungs at the rounding floor, and where they begin; null where the ladder ends above it. */
  readonly floor: number | null;
  readonly floorFrom: number | null;
  /** Why there is no order, or what to know about it. */
  readonly note: string | null;
}

/** Rungs below this many times the rounding floor are not fitted: rounding is then up to a twentieth of the error. */
export const FLOOR_MARGIN = 20;
/** Errors above this (radians, semi-major axes, of the energy) are no longer small against the orbit. */
const LARGEST_ERROR = 0.1;
const SMALLEST_WINDOW = 5;
/** The window must span this ratio of step sizes. */
const SMALLEST_SPAN = 2;
/** And no more than this, unless five rungs take more: what is coarser is further from the limit. */
const LARGEST_SPAN = 8.1;
/** Standard errors asked of the fit, the first that some window meets. */
const STANDARD_ERRORS: readonly number[] = [0.02, 0.05, 0.1];
/** An error may differ from the fitted power by this share of it, or by what so small a change of the step would bring, if that is more. */
const LARGEST_RESIDUAL = 0.1;
const STEP_RESIDUAL = 0.02;
/** The window ends at the finest rung that can be fitted or at one of the two before it. */
const RUNGS_TO_SPARE = 2;

/**
 * Observed order from a ladder of steps, coarse to fine.
 *
 * A rung can be fitted where its run ended well, its error is at most 0.1 and more than 20 times the rounding floor, and no coarser rung
 * beyond it is at the floor. The asymptotic window is the longest run of consecutive such rungs that ends at the finest of them, or one or
 * two before it, holds at least five rungs and a factor of two (at most eight) in step, and looks like one power: each error within 10% of the fit (or within
 * what 2% of the step would bring), and a standard error of at most 0.02; where no window meets that, 0.05, then 0.1. What fails that too has
 * no asymptotic window, and no order is given.
 */
export function fitOrder(ladder: readonly Rung[]): OrderFit {
  const rungs = ladder.toSorted((a, b) => a.fineness - b.fineness);
  const atFloor = rungs.map(({ error, floor }) => error !== null && error < FLOOR_MARGIN * floor);
  const firstAtFloor = atFloor.indexOf(true);
  const above = firstAtFloor < 0 ? rungs : rungs.slice(0, firstAtFloor);
  const level = rungs.slice(above.length).flatMap(({ error }) => (error === null ? [] : [error]));
  const floor = {
    floor: level.length === 0 ? null : median(level),
    floorFrom: rungs[above.length]?.fineness ?? null,
  };
  const found = findWindow(above);
  if (found !== null) return { ...found, ...floor, note: null };
  const nothing = { order: null, window: null, ...floor };
  if (rungs.every(({ error }) => error === null)) return { ...nothing, note: "no run gave this error" };
  if (above.length < SMALLEST_WINDOW && firstAtFloor >= 0)
    return { ...nothing, note: "at the rounding floor" };
  return { ...nothing, note: "no asymptotic window" };
}

function findWindow(rungs: readonly Rung[]): Pick<OrderFit, "order" | "window"> | null {
  for (const standardError of STANDARD_ERRORS) {
    for (let spare = 0; spare <= RUNGS_TO_SPARE; spare++) {
      const found = longestWindow(rungs, rungs.length - spare, standardError);
      if (found !== null) return found;
    }
  }
  return null;
}

/** The longest window that ends before rung `end`. */
function longestWindow(
  rungs: readonly Rung[],
  end: number,
  standardError: number,
): Pick<OrderFit, "order" | "window"> | null {
  let start = end;
  while (start > 0 && usable(rungs[start - 1])) start -= 1;
  for (let from = start; from <= end - SMALLEST_WINDOW; from++) {
    const window = rungs.slice(from, end) as (Rung & { readonly error: number })[];
    const first = (window[0] as Rung).fineness;
    const last = (window.at(-1) as Rung).fineness;
    if (last > LARGEST_SPAN * first && window.length > SMALLEST_WINDOW) continue;
    if (last < SMALLEST_SPAN * first) return null;
    const points = window.map(({ fineness, error }) => [Math.log(fineness), -Math.log(error)] as const);
    const order = onePower(points, standardError);
    if (order !== null) return { order, window: { from: first, to: last } };
  }
  return null;
}

function usable(rung: Rung | undefined): boolean {
  return rung !== undefined && rung.error !== null && rung.error > 0 && rung.error <= LARGEST_ERROR;
}

/** The fit, where the points look like one power. */
function onePower(points: readonly (readonly [number, number])[], standardError: number): Fit | null {
  const fit = fitSlope(points);
  if (!(fit.value > 0.5 && fit.standardError <= standardError)) return null;
  return fit.largestResidual <= Math.max(LARGEST_RESIDUAL, STEP_RESIDUAL * fit.value) ? fit : null;
}

function median(values: readonly number[]): number {
  const sorted = values.toSorted((a, b) => a - b);
  return sorted[sorted.length >> 1] as number;
}
