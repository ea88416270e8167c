import { axisChannel, type Quantity } from "../axes/axis-channel.ts";
import { colour } from "../look/palette.ts";
import { type Looks, lookScales } from "../look/stepper-look.ts";
import { MUTED_MARKS } from "./hover-marks.ts";
import type { Layer } from "./make-chart.ts";

export interface Tip {
  readonly field: string;
  readonly title: string;
  /** A format of the charting language; text where absent. */
  readonly format?: string;
}

/** Opacity of what is not picked. */
export const FADED = 0.1;

/**
 * Lines with marks, one per stepper. Rows carry `stepper`, `symplectic` and `ended`; those of muted steppers are drawn in grey behind (whole
 * lines symplectic, dashed not), those of runs that left the orbit as a cross at the upper edge. A parameter `picked`, bound to the legend, brings
 * steppers out and lets the rest fade. With `clip`, what lies outside the axes is cut off.
 */
export function seriesLayers(
  x: Quantity,
  y: Quantity,
  looks: Looks,
  tips: readonly Tip[],
  options: { readonly clip?: boolean } = {},
): Layer[] {
  const clip = options.clip === true;
  const scales = lookScales(looks.highlighted);
  const shown = { field: "stepper", oneOf: scales.domain };
  const drawable = `isValid(datum[${JSON.stringify(y.field)}]) && datum[${JSON.stringify(y.field)}] > 0 && datum.ended !== 'diverged'`;
  // Grey lines end at their last mark inside: cutting each at the edge would take the picture a second.
  const inside = clip ? `${within(x)} && ${within(y)}` : "true";
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
  // Opacity of strokes and fills, not of whole marks: that would cost the picture a layer for each of thousands.
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
        transform: [{ filter: { not: shown } }, { filter: drawable }, { filter: inside }],
        mark: { type: "line", strokeWidth: 1 },
        encoding: {
          ...position,
          detail: { field: "stepper", type: "nominal" },
          color: mutedColour,
          strokeOpacity: mutedFading,
          strokeDash: { condition: { test: "datum.symplectic", value: [1, 0] }, value: [3, 3] },
        },
      },
      {
        transform: [{ filter: { not: shown } }, { filter: drawable }, { filter: inside }],
        name: MUTED_MARKS,
        mark: { type: "circle", size: 10, opacity: 1 },
        encoding: { ...position, color: mutedColour, fillOpacity: mutedFading, tooltip },
      },
    );
  }
  layers.push(
    {
      transform: [{ filter: shown }, { filter: drawable }],
      mark: { type: "line", strokeWidth: 1.8, clip },
      encoding: {
        ...position,
        color: lookColour,
        opacity: fading,
        strokeDash: {
          field: "stepper",
          type: "nominal",
          scale: { domain: scales.domain, range: scales.dashes },
        },
      },
    },
    {
      params: [{ name: "picked", select: { type: "point", fields: ["stepper"] }, bind: "legend" }],
      transform: [{ filter: shown }, { filter: drawable }],
      mark: { type: "point", filled: true, size: 55, stroke: colour("paper"), strokeWidth: 0.6, clip },
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

function within({ field, axis }: Quantity): string {
  return `inrange(datum[${JSON.stringify(field)}], [${axis.domain.join(", ")}])`;
}
