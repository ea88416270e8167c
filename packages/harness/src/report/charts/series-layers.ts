import type { LogAxis } from "../axes/log-axis.ts";
import { colour } from "../look/palette.ts";
import { type Looks, lookScales } from "../look/stepper-look.ts";
import type { Layer } from "./make-chart.ts";

/** A quantity on an axis: the row's field, its words with unit, and the axis it is drawn on. */
export interface Quantity {
  readonly field: string;
  readonly title: string;
  readonly axis: LogAxis | LinearAxis;
}

export interface LinearAxis {
  readonly domain: [number, number];
  readonly scale: { readonly type: "linear"; readonly domain: [number, number]; readonly nice: false };
  readonly values?: never;
  readonly labelExpr?: never;
}

export interface Tip {
  readonly field: string;
  readonly title: string;
  /** A format of the charting language; text where absent. */
  readonly format?: string;
}

const FADED = 0.1;

/**
 * Lines with marks, one per stepper. Rows carry `stepper`, `symplectic` and `ended`; those of muted steppers are drawn in grey behind (whole
 * lines symplectic, dashed not), those of runs that left the orbit as a cross at the upper edge. A parameter `picked`, bound to the legend, brings
 * steppers out and lets the rest fade.
 */
export function seriesLayers(x: Quantity, y: Quantity, looks: Looks, tips: readonly Tip[]): Layer[] {
  const scales = lookScales(looks.highlighted);
  const shown = { field: "stepper", oneOf: scales.domain };
  const drawable = `isValid(datum[${JSON.stringify(y.field)}]) && datum[${JSON.stringify(y.field)}] > 0 && datum.ended !== 'diverged'`;
  const position = { x: axisChannel(x), y: axisChannel(y, true) };
  const tooltip = tips.map((tip) =>
    tip.format === undefined
      ? { field: tip.field, title: tip.title, type: "nominal" as const }
      : { field: tip.field, title: tip.title, type: "quantitative" as const, format: tip.format },
  );
  const lookColour = {
    field: "stepper",
    type: "nominal" as const,
    scale: { domain: scales.domain, range: scales.colours },
  };
  const fading = { condition: { param: "picked", value: 1 }, value: FADED };
  const mutedFading = {
    condition: [
      { param: "picked", empty: false, value: 1 },
      { param: "picked", empty: true, value: 0.55 },
    ],
    value: FADED,
  };
  const mutedColour = {
    condition: { param: "picked", empty: false, value: colour("ink") },
    value: colour("others"),
  };
  const layers: Layer[] = [];
  if (looks.muted.length > 0) {
    layers.push(
      {
        transform: [{ filter: { not: shown } }, { filter: drawable }],
        mark: { type: "line", strokeWidth: 1 },
        encoding: {
          ...position,
          detail: { field: "stepper", type: "nominal" },
          color: mutedColour,
          opacity: mutedFading,
          strokeDash: { condition: { test: "datum.symplectic", value: [1, 0] }, value: [3, 3] },
        },
      },
      {
        transform: [{ filter: { not: shown } }, { filter: drawable }],
        mark: { type: "circle", size: 10 },
        encoding: { ...position, color: mutedColour, opacity: mutedFading, tooltip },
      },
    );
  }
  layers.push(
    {
      transform: [{ filter: shown }, { filter: drawable }],
      mark: { type: "line", strokeWidth: 1.8 },
      encoding: {
        ...position,
        color: lookColour,
        opacity: fading,
        strokeDash: {
          field: "stepper",
          type: "nominal",
          scale: { domain: scales.domain, range: scales.dashes },
          legend: null,
        },
      },
    },
    {
      params: [{ name: "picked", select: { type: "point", fields: ["stepper"] }, bind: "legend" }],
      transform: [{ filter: shown }, { filter: drawable }],
      mark: { type: "point", filled: true, size: 55, stroke: colour("paper"), strokeWidth: 0.6 },
      encoding: {
        ...position,
        color: lookColour,
        shape: {
          field: "stepper",
          type: "nominal",
          scale: { domain: scales.domain, range: scales.shapes },
        },
        opacity: fading,
        tooltip,
      },
    },
    {
      transform: [{ filter: "datum.ended === 'diverged'" }],
      mark: { type: "text", text: "×", fontSize: 14, baseline: "top" },
      encoding: {
        x: axisChannel(x),
        y: { value: 0 },
        color: { condition: { test: { not: shown }, value: colour("others") }, value: colour("ink") },
        opacity: fading,
        tooltip,
      },
    },
  );
  return layers;
}

/** A horizontal line at a value, with its words at the left end; above the line or below it. */
export function levelLayers(
  y: Quantity,
  value: number,
  words: string,
  options: { readonly dash: number[]; readonly side: "above" | "below" },
): Layer[] {
  const row = { values: [{ level: value, words }] };
  const encoding = { y: { field: "level", type: "quantitative" as const, scale: y.axis.scale } };
  const text = {
    type: "text" as const,
    align: "left" as const,
    baseline: options.side === "above" ? ("bottom" as const) : ("top" as const),
    dx: 4,
    dy: options.side === "above" ? -3 : 4,
    fontSize: 11,
  };
  const label = { ...encoding, x: { value: 0 }, text: { field: "words", type: "nominal" as const } };
  return [
    {
      data: row,
      mark: { type: "rule", color: colour("limit"), strokeWidth: 1.4, strokeDash: options.dash },
      encoding,
    },
    {
      data: row,
      mark: { ...text, stroke: colour("paper"), strokeWidth: 4, strokeJoin: "round" },
      encoding: label,
    },
    { data: row, mark: { ...text, color: colour("limit") }, encoding: label },
  ];
}

/** Position channel with its axis; the words of a vertical one stand level above it. */
export function axisChannel(
  quantity: Quantity,
  grid = false,
): {
  readonly field: string;
  readonly type: "quantitative";
  readonly scale: LogAxis["scale"] | LinearAxis["scale"];
  readonly title: string;
  readonly axis: { grid: boolean; values?: number[]; labelExpr?: string; labelOverlap: boolean | "greedy" };
} {
  const { axis } = quantity;
  return {
    field: quantity.field,
    type: "quantitative",
    scale: axis.scale,
    title: quantity.title,
    axis:
      axis.values === undefined
        ? { grid, labelOverlap: "greedy" }
        : { grid, values: axis.values, labelExpr: axis.labelExpr, labelOverlap: "greedy" },
  };
}
