import type { Quantity } from "../axes/axis-channel.ts";
import { colour } from "../look/palette.ts";
import type { Layer } from "./make-chart.ts";

/**
 * A horizontal line at a value and its words at the left end, above the line or below it: the line goes behind the data, the words
 * before. `times` is an expression of the charting language that the value is multiplied by.
 */
export function levelLayers(
  y: Quantity,
  value: number,
  words: string,
  options: { readonly dash: number[]; readonly side: "above" | "below"; readonly times?: string },
): { readonly line: Layer[]; readonly words: Layer[] } {
  const row = { values: [{ level: value, words }] };
  // A field of its own: the runtime computes it anew from the same row whenever the factor changes.
  const transform = [{ calculate: `datum.level * ${options.times ?? "1"}`, as: "drawn" }];
  const encoding = { y: { field: "drawn", type: "quantitative" as const, scale: y.axis.scale } };
  const text = {
    type: "text" as const,
    clip: true,
    align: "left" as const,
    baseline: options.side === "above" ? ("bottom" as const) : ("top" as const),
    dx: 4,
    dy: options.side === "above" ? -3 : 4,
    fontSize: 11,
  };
  const label = { ...encoding, x: { value: 0 }, text: { field: "words", type: "nominal" as const } };
  const line: Layer[] = [
    {
      data: row,
      transform,
      mark: { type: "rule", clip: true, color: colour("limit"), strokeWidth: 1.4, strokeDash: options.dash },
      encoding,
    },
  ];
  // A wide stroke in the paper's colour under the words keeps them readable where curves cross.
  const labels: Layer[] = [
    {
      data: row,
      transform,
      mark: { ...text, stroke: colour("paper"), strokeWidth: 4, strokeJoin: "round" },
      encoding: label,
    },
    { data: row, transform, mark: { ...text, color: colour("limit") }, encoding: label },
  ];
  return { line, words: labels };
}
