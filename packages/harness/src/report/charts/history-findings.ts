import type { ChoiceEvidence } from "../evidence.ts";
import { formatNumber, formatTimes } from "../text/number.ts";
import { listWords } from "../text/words.ts";

/** An error of a long run: the field of its points, its words and its unit. */
export interface HistoryMeasure {
  readonly field: "energyRelative" | "phaseRad" | "alongTrackKm";
  readonly name: string;
  readonly words: string;
  readonly axisTitle: string;
  readonly unit: string;
}

/** Between these ratios of end to start an error counts as level. */
const LEVEL = [0.8, 1.25] as const;

/** How much the error grew, or that it stays level, for each stepper of the long runs. */
export function growthFinding(evidence: ChoiceEvidence, measure: HistoryMeasure): string {
  const grows: string[] = [];
  const falls: string[] = [];
  const level: string[] = [];
  for (const { points, stepper } of evidence.histories) {
    const drawn = points.filter((point) => point[measure.field] > 0);
    const [first, last] = [drawn[0], drawn.at(-1)];
    if (first === undefined || last === undefined || first === last) continue;
    const ratio = last[measure.field] / first[measure.field];
    if (ratio >= LEVEL[0] && ratio <= LEVEL[1]) level.push(stepper);
    else if (ratio > 1) grows.push(`${formatTimes(ratio)} times for ${stepper}`);
    else falls.push(`${formatTimes(1 / ratio)} times for ${stepper}`);
  }
  const parts = [
    ...(grows.length > 0 ? [`grows ${listWords(grows)}`] : []),
    ...(falls.length > 0 ? [`falls ${listWords(falls)}`] : []),
    ...(level.length > 0 ? [`stays level for ${listWords(level)}`] : []),
  ];
  const from = evidence.histories[0]?.points[0]?.days ?? 0;
  return `From day ${formatNumber(from, 2)} to the end the ${measure.words} ${parts.join("; it ")}`;
}

/** How far each stepper strays along the track, or when it passes the limit. */
export function trackFinding(evidence: ChoiceEvidence, measure: HistoryMeasure): string {
  const whole = evidence.choice.scenario.limits.find(
    (limit) => limit.alongTrackKm !== undefined && limit.withinDays === undefined,
  )?.alongTrackKm;
  const parts = evidence.histories.map((history) => {
    const most = Math.max(...history.points.map((point) => point[measure.field]));
    const broken =
      whole === undefined ? undefined : history.points.find((point) => point.alongTrackKm > whole);
    if (broken !== undefined)
      return `${history.stepper} passes the limit by day ${formatNumber(broken.days, 2)}`;
    return `${history.stepper} stays within ${formatNumber(most, 2)} km`;
  });
  return `Along the track ${listWords(parts)}${whole === undefined ? "" : ` (limit ${formatNumber(whole)} km)`}`;
}
