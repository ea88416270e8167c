import { fitSlope } from "../../analyse/fit.ts";
import type { Quantity } from "../axes/axis-channel.ts";
import type { History } from "../evidence.ts";
import { colour } from "../look/palette.ts";
import { formatNumber } from "../text/number.ts";
import type { HistoryMeasure } from "./history-findings.ts";
import type { Layer } from "./make-chart.ts";

/** The window of the fit starts at this share of the run. */
const WINDOW = 1 / 32;
/** Intervals end at a step, so that one of an orbit may be a little shorter. */
const WHOLE_ORBIT = 0.98;
const FEWEST_POINTS = 8;
/** A bend beyond this is not one power of time, and no slope is written. */
const LARGEST_STANDARD_ERROR = 0.1;
/** Least distance of two labels, in units of the drawing. */
const LINE = 15;

/**
 * Growth exponent of the largest errors of intervals: least-squares slope of log error against log time over the last 31/32 of the run, as far
 * as the intervals are an orbit long at least: shorter ones see the oscillation within an orbit. Null where its standard error exceeds 0.1 or
 * fewer than eight such intervals had an error.
 */
export function growthSlope(history: History, field: HistoryMeasure["field"]): number | null {
  const end = history.points.at(-1)?.days ?? 0;
  const points = history.points
    .filter((point, index, all) => {
      const length = point.orbit - (all[index - 1]?.orbit ?? point.orbit);
      return point[field] > 0 && point.days >= end * WINDOW && length > WHOLE_ORBIT;
    })
    .map((point) => [Math.log(point.days), Math.log(point[field])] as const);
  if (points.length < FEWEST_POINTS) return null;
  const { value, standardError } = fitSlope(points);
  return standardError <= LARGEST_STANDARD_ERROR ? value : null;
}

export function slopeWords(slope: number | null): string {
  return slope === null
    ? "no single power of time"
    : `slope ${formatNumber(Math.abs(slope) < 0.005 ? 0 : slope, 2)}`;
}

/** The slope of each curve, written at its end and kept clear of the others. */
export function slopeLabels(
  histories: readonly History[],
  measure: HistoryMeasure,
  y: Quantity,
  height: number,
): Layer[] {
  const [low, high] = y.axis.domain.map(Math.log) as [number, number];
  const labels = histories
    .flatMap((history) => {
      const last = history.points.findLast((point) => point[measure.field] > 0);
      const slope = growthSlope(history, measure.field);
      if (last === undefined || slope === null) return [];
      const at = ((high - Math.log(last[measure.field])) / (high - low)) * height;
      return [{ words: `${slopeWords(slope)}, ${history.stepper}`, at }];
    })
    .sort((a, b) => a.at - b.at);
  // Above each curve's end, pushed down where the label before is too near, and never below the axis.
  let lowest = Number.NEGATIVE_INFINITY;
  const placed = labels.map(({ words, at }, index) => {
    const room = height - 4 - (labels.length - 1 - index) * LINE;
    lowest = Math.max(Math.min(Math.max(at - 10, 10), room), lowest + LINE);
    return { words, at: Math.round(lowest) };
  });
  return placed.flatMap(({ words, at }): Layer[] => {
    const encoding = { x: { value: "width" as const }, y: { value: at } };
    const text = { type: "text" as const, text: words, align: "right" as const, dx: -6, fontSize: 11 };
    const data = { values: [{}] };
    return [
      { data, mark: { ...text, stroke: colour("paper"), strokeWidth: 4, strokeJoin: "round" }, encoding },
      { data, mark: { ...text, color: colour("ink") }, encoding },
    ];
  });
}
