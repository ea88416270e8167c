import { axisChannel, type Quantity } from "../axes/axis-channel.ts";
import { logAxis } from "../axes/log-axis.ts";
import type { Chart } from "../chart.ts";
import type { ChoiceEvidence, History } from "../evidence.ts";
import { colour } from "../look/palette.ts";
import type { Looks } from "../look/stepper-look.ts";
import { formatNumber } from "../text/number.ts";
import { dayWords, durationWords, listWords } from "../text/words.ts";
import { growthSlope, slopeLabels, slopeWords } from "./growth-slopes.ts";
import { growthFinding, type HistoryMeasure, trackFinding } from "./history-findings.ts";
import { HOVER_MARKS } from "./hover-marks.ts";
import { type Layer, makeChart, type Row } from "./make-chart.ts";

const MEASURES: readonly HistoryMeasure[] = [
  {
    field: "energyRelative",
    name: "energy-over-time",
    words: "energy error",
    axisTitle: "energy error, relative",
    unit: "",
  },
  {
    field: "phaseRad",
    name: "phase-over-time",
    words: "phase error",
    axisTitle: "phase error, rad",
    unit: " rad",
  },
  {
    field: "alongTrackKm",
    name: "along-track-over-time",
    words: "error along the track",
    axisTitle: "error along the track, km",
    unit: " km",
  },
];

const HEIGHT = 300;

export const DASH_OF_ROLE: Readonly<Record<History["role"], readonly number[]>> = {
  choice: [1, 0],
  rival: [7, 3],
  current: [2, 2],
};

/** How do the errors grow over the duration, for the choice, its best rival of the other kind and today's stepper? */
export function historyCharts(evidence: ChoiceEvidence, looks: Looks): Chart[] {
  const { histories } = evidence;
  if (histories.every((history) => history.points.length === 0)) return [];
  const labels = labelsOf(histories);
  const rows: Row[] = histories.flatMap((history, index) =>
    history.points.map((point) => ({
      label: labels[index] ?? history.label,
      stepper: history.stepper,
      days: point.days,
      orbit: point.orbit,
      energyRelative: point.energyRelative,
      phaseRad: point.phaseRad,
      alongTrackKm: point.alongTrackKm,
      command: history.command,
    })),
  );
  const x: Quantity = {
    field: "days",
    title: "days since the start",
    axis: logAxis(
      rows.map((row) => Number(row.days)),
      0.03,
    ),
  };
  return MEASURES.filter((measure) => rows.some((row) => Number(row[measure.field]) > 0)).map((measure) => {
    const limits = measure.field === "alongTrackKm" ? alongTrackLimits(evidence, x) : [];
    const y: Quantity = {
      field: measure.field,
      title: measure.axisTitle,
      axis: logAxis([
        ...rows.map((row) => Number(row[measure.field])),
        ...limits.map((limit) => limit.value),
      ]),
    };
    return makeChart({
      name: measure.name,
      section: "duration",
      title:
        measure.field === "alongTrackKm" ? trackFinding(evidence, measure) : growthFinding(evidence, measure),
      description: `Largest ${measure.words} of each interval (vertical, logarithmic) against days since the start (horizontal, logarithmic), over ${durationWords(
        evidence.choice.scenario,
      )}. ${histories.map((history, index) => `${labels[index] ?? ""}: ${endWords(history, measure)}, ${slopeWords(growthSlope(history, measure.field))}`).join(". ")}.${
        limits.length === 0 ? "" : ` Limits drawn: ${listWords(limits.map((limit) => limit.words))}.`
      }`,
      note: caseWords(histories),
      height: HEIGHT,
      rows,
      layers: [
        ...limitLayers(limits, x, y),
        ...lines(histories, labels, x, y, looks, measure),
        ...slopeLabels(histories, measure, y, HEIGHT),
      ],
    });
  });
}

function lines(
  histories: readonly History[],
  labels: readonly string[],
  x: Quantity,
  y: Quantity,
  looks: Looks,
  measure: HistoryMeasure,
): Layer[] {
  const colours = histories.map((history) => {
    const look = looks.highlighted.find((candidate) => candidate.stepper === history.stepper);
    return look === undefined ? colour("ink") : colour(look.colourName);
  });
  const drawable = `datum[${JSON.stringify(measure.field)}] > 0`;
  const channels = {
    x: axisChannel(x),
    y: axisChannel(y, true),
    color: {
      field: "label",
      type: "nominal" as const,
      scale: { domain: [...labels], range: colours },
      legend: { columns: 1, symbolType: "stroke", symbolSize: 320, symbolStrokeWidth: 2 },
    },
  };
  return [
    {
      transform: [{ filter: drawable }],
      mark: { type: "line", strokeWidth: 2 },
      encoding: {
        ...channels,
        strokeDash: {
          field: "label",
          type: "nominal",
          scale: { domain: [...labels], range: histories.map((history) => [...DASH_OF_ROLE[history.role]]) },
          legend: { columns: 1, symbolType: "stroke", symbolSize: 320, symbolStrokeWidth: 2 },
        },
      },
    },
    {
      transform: [{ filter: drawable }],
      // Seen by the pointer only: drawn, they would hide the dashes.
      name: HOVER_MARKS,
      mark: { type: "circle", size: 60, opacity: 0 },
      encoding: {
        ...channels,
        tooltip: [
          { field: "label", title: "stepper", type: "nominal" },
          { field: "days", title: "days", type: "quantitative", format: ".4e" },
          { field: "orbit", title: "orbits", type: "quantitative", format: ".4e" },
          { field: measure.field, title: measure.axisTitle, type: "quantitative", format: ".3e" },
          { field: "command", title: "command", type: "nominal" },
        ],
      },
    },
  ];
}

interface DrawnLimit {
  readonly value: number;
  readonly from: number;
  readonly to: number;
  readonly words: string;
}

function alongTrackLimits(evidence: ChoiceEvidence, x: Quantity): DrawnLimit[] {
  return evidence.choice.scenario.limits.flatMap((limit) => {
    if (limit.alongTrackKm === undefined) return [];
    const horizon = limit.withinDays;
    const words = `${formatNumber(limit.alongTrackKm)} km${horizon === undefined ? "" : ` in the first ${dayWords(horizon)}`}`;
    return [{ value: limit.alongTrackKm, from: x.axis.domain[0], to: horizon ?? x.axis.domain[1], words }];
  });
}

function limitLayers(limits: readonly DrawnLimit[], x: Quantity, y: Quantity): Layer[] {
  if (limits.length === 0) return [];
  const data = { values: limits.map((limit) => ({ ...limit })) };
  const level = { field: "value", type: "quantitative" as const, scale: y.axis.scale };
  return [
    {
      data,
      mark: { type: "rule", color: colour("limit"), strokeWidth: 1.6 },
      encoding: {
        y: level,
        x: { field: "from", type: "quantitative", scale: x.axis.scale },
        x2: { field: "to" },
      },
    },
    {
      data,
      mark: {
        type: "text",
        color: colour("limit"),
        align: "left",
        baseline: "bottom",
        dx: 4,
        dy: -3,
        fontSize: 11,
      },
      encoding: {
        y: level,
        x: { field: "from", type: "quantitative", scale: x.axis.scale },
        text: { field: "words", type: "nominal" },
      },
    },
  ];
}

/** Labels that differ even where two histories are of one stepper. */
export function labelsOf(histories: readonly History[]): string[] {
  const seen = new Map<string, number>();
  return histories.map((history) => {
    const count = (seen.get(history.label) ?? 0) + 1;
    seen.set(history.label, count);
    return count === 1 ? history.label : `${history.label} (${count})`;
  });
}

/** The cells drawn, once where all are of one orbit and start. */
export function caseWords(histories: readonly History[]): string {
  const cells = histories.map(
    (history) =>
      `orbit ${history.orbit}, e = ${formatNumber(history.eccentricity, 5)}, start at ${formatNumber(history.startAnomalyDeg)}°`,
  );
  if (new Set(cells).size === 1) return `Cell drawn: ${cells[0] ?? ""}.`;
  return `Cells drawn: ${histories.map((history, index) => `${history.stepper}, ${cells[index] ?? ""}`).join("; ")}.`;
}

function endWords(history: History, measure: HistoryMeasure): string {
  const last = history.points.at(-1);
  if (last === undefined) return "no data";
  return `${formatNumber(last[measure.field])}${measure.unit} on day ${formatNumber(last.days)}`;
}
