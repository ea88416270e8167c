import { axisChannel, type LinearAxis, type Quantity } from "../axes/axis-channel.ts";
import { logAxis } from "../axes/log-axis.ts";
import type { Chart } from "../chart.ts";
import type { ChoiceEvidence, History } from "../evidence.ts";
import { colour } from "../look/palette.ts";
import type { Looks } from "../look/stepper-look.ts";
import { formatNumber } from "../text/number.ts";
import { listWords } from "../text/words.ts";
import { caseWords, DASH_OF_ROLE, labelsOf } from "./history-charts.ts";
import { HOVER_MARKS } from "./hover-marks.ts";
import { type Layer, makeChart, type Row } from "./make-chart.ts";

/** The period error of single orbits over the run, for the choice, its best rival of the other kind and today's stepper. */
export function periodChart({ histories }: ChoiceEvidence, looks: Looks): Chart | null {
  const known = histories.filter((history) =>
    (history.periods ?? []).some(({ periodRelative }) => periodRelative !== 0),
  );
  if (known.length === 0) return null;
  const labels = labelsOf(known);
  const rows: Row[] = known.flatMap((history, index) =>
    (history.periods ?? []).map(({ orbit, periodRelative }) => ({
      label: labels[index] ?? history.label,
      stepper: history.stepper,
      orbit,
      size: Math.abs(periodRelative),
      sign: periodRelative < 0 ? "shorter than exact" : "longer than exact",
      command: history.command,
    })),
  );
  const x: Quantity = {
    field: "orbit",
    title: "orbits since the start",
    axis: linearAxis(rows.map(({ orbit }) => Number(orbit))),
  };
  const y: Quantity = {
    field: "size",
    title: "size of the period error, relative",
    axis: logAxis(rows.map(({ size }) => Number(size))),
  };
  return makeChart({
    name: "period-orbit-by-orbit",
    section: "duration",
    title: `Single periods are off by ${listWords(known.map(medianWords))} (medians)`,
    description: `Size of the error of each anomalistic period (vertical, logarithmic) against orbits since the start. ${known
      .map((history, index) => `${labels[index] ?? ""}: ${rangeWords(history)}`)
      .join(". ")}.`,
    note: caseWords(known),
    height: 280,
    rows,
    layers: curves(known, labels, x, y, looks, [
      { field: "orbit", title: "orbits", type: "quantitative", format: ".4e" },
      { field: "size", title: "period error, relative", type: "quantitative", format: ".3e" },
      { field: "sign", title: "period", type: "nominal" },
    ]),
  });
}

/** The energy error within the first orbit, each stepper against its own largest: what a symplectic stepper gives back. */
export function oscillationChart({ histories }: ChoiceEvidence, looks: Looks): Chart | null {
  const known = histories.filter((history) => largestEnergy(history) > 0);
  if (known.length === 0) return null;
  const labels = labelsOf(known);
  const rows: Row[] = known.flatMap((history, index) =>
    (history.oscillation?.points ?? []).map(({ orbit, energyRelative }) => ({
      label: labels[index] ?? history.label,
      stepper: history.stepper,
      orbit,
      share: energyRelative / largestEnergy(history),
      energyRelative,
      command: history.command,
    })),
  );
  const x: Quantity = { field: "orbit", title: "orbits since the start", axis: fixedAxis(0, 1) };
  const y: Quantity = {
    field: "share",
    title: "energy error over its own largest in this orbit",
    axis: fixedAxis(-1.08, 1.08),
  };
  const periapsis = known.find((history) => history.oscillation?.periapsisAtOrbit != null)?.oscillation
    ?.periapsisAtOrbit;
  return makeChart({
    name: "energy-within-an-orbit",
    section: "duration",
    title: `Within the first orbit the energy error swings by ${listWords(known.map(swingWords))}`,
    description: `Energy error against time within the first orbit, signed, each stepper over its own largest: ${known
      .map((history, index) => `${labels[index] ?? ""} ${formatNumber(largestEnergy(history), 2)}`)
      .join(
        ", ",
      )}.${periapsis == null ? "" : ` Upright line: periapsis, after ${formatNumber(periapsis, 3)} orbits.`}`,
    note: `${periapsis == null ? "" : "Upright line: periapsis. "}${caseWords(known)}`,
    height: 280,
    rows,
    layers: [
      ...(periapsis == null ? [] : [uprightLine(periapsis, x)]),
      ...curves(known, labels, x, y, looks, [
        { field: "orbit", title: "orbits", type: "quantitative", format: ".4e" },
        { field: "energyRelative", title: "energy error, relative", type: "quantitative", format: ".3e" },
      ]),
    ],
  });
}

function curves(
  histories: readonly History[],
  labels: readonly string[],
  x: Quantity,
  y: Quantity,
  looks: Looks,
  tips: readonly { field: string; title: string; type: "quantitative" | "nominal"; format?: string }[],
): Layer[] {
  const legend = { columns: 1, symbolType: "stroke", symbolSize: 320, symbolStrokeWidth: 2 };
  const colours = histories.map(({ stepper }) => {
    const look = looks.highlighted.find((candidate) => candidate.stepper === stepper);
    return colour(look?.colourName ?? "ink");
  });
  const channels = {
    x: axisChannel(x),
    y: axisChannel(y, true),
    color: {
      field: "label",
      type: "nominal" as const,
      scale: { domain: [...labels], range: colours },
      legend,
    },
  };
  const drawable = y.field === "size" ? "datum.size > 0" : "isValid(datum.share)";
  return [
    {
      transform: [{ filter: drawable }],
      mark: { type: "line", strokeWidth: 1.6 },
      encoding: {
        ...channels,
        strokeDash: {
          field: "label",
          type: "nominal",
          scale: { domain: [...labels], range: histories.map(({ role }) => [...DASH_OF_ROLE[role]]) },
          legend,
        },
      },
    },
    {
      transform: [{ filter: drawable }],
      name: HOVER_MARKS,
      mark: { type: "circle", size: 60, opacity: 0 },
      encoding: {
        ...channels,
        tooltip: [
          { field: "label", title: "stepper", type: "nominal" },
          ...tips,
          { field: "command", title: "command", type: "nominal" },
        ],
      },
    },
  ];
}

function uprightLine(at: number, x: Quantity): Layer {
  return {
    data: { values: [{ at }] },
    mark: { type: "rule", color: colour("soft"), strokeWidth: 1, strokeDash: [3, 3] },
    encoding: { x: { field: "at", type: "quantitative", scale: x.axis.scale } },
  };
}

function linearAxis(values: readonly number[]): LinearAxis {
  return fixedAxis(0, Math.max(1, ...values) * 1.01);
}

function fixedAxis(low: number, high: number): LinearAxis {
  const domain: [number, number] = [low, high];
  return { domain, scale: { type: "linear", domain, nice: false } };
}

function largestEnergy({ oscillation }: History): number {
  return Math.max(0, ...(oscillation?.points ?? []).map(({ energyRelative }) => Math.abs(energyRelative)));
}

function sizesOf({ periods }: History): number[] {
  return (periods ?? []).map(({ periodRelative }) => Math.abs(periodRelative)).sort((a, b) => a - b);
}

function medianWords(history: History): string {
  const sizes = sizesOf(history);
  return `${formatNumber(sizes[sizes.length >> 1], 2)} for ${history.stepper}`;
}

function rangeWords(history: History): string {
  const sizes = sizesOf(history);
  const longer = (history.periods ?? []).filter(({ periodRelative }) => periodRelative > 0).length;
  return `${formatNumber(sizes[0], 2)} to ${formatNumber(sizes.at(-1), 2)}, too long in ${formatNumber((100 * longer) / sizes.length, 2)} % of the orbits drawn`;
}

/** From the lowest to the highest energy error of the orbit. */
function swingWords({ oscillation, stepper }: History): string {
  const values = (oscillation?.points ?? []).map(({ energyRelative }) => energyRelative);
  return `${formatNumber(Math.max(...values) - Math.min(...values), 2)} for ${stepper}`;
}
