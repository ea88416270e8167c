import type { TopLevelSpec } from "vega-lite";
import type { Chart } from "../chart.ts";
import { chartConfig } from "../look/chart-config.ts";
import { wrapWords } from "../text/wrap.ts";

/** One layer of a layered specification. */
export type Layer = Extract<TopLevelSpec, { layer: unknown }>["layer"][number];

/** A row of inline data. */
export type Row = Readonly<Record<string, string | number | boolean | null>>;

export interface ChartParts extends Omit<Chart, "spec"> {
  readonly height: number;
  readonly rows: readonly Row[];
  readonly layers: readonly Layer[];
  /** Values a reader can set, with the input that sets them. */
  readonly params?: TopLevelSpec["params"];
  /** Applied to the rows before any layer's own. */
  readonly transform?: Layer["transform"];
}

const SCHEMA = "https://vega.github.io/schema/vega-lite/v6.json";
const WIDTH = 780;
const TITLE_CHARACTERS = 78;
const NOTE_CHARACTERS = 112;

/** Put a chart's parts into a specification that stands alone: data inline, title and look included. */
export function makeChart(parts: ChartParts): Chart {
  const { name, title, description, note, section } = parts;
  return {
    name,
    title,
    description,
    note,
    section,
    spec: {
      $schema: SCHEMA,
      description,
      title: { text: wrapWords(title, TITLE_CHARACTERS), subtitle: wrapWords(note, NOTE_CHARACTERS) },
      width: WIDTH,
      height: parts.height,
      autosize: { type: "fit-x", contains: "padding" },
      config: chartConfig,
      data: { values: parts.rows.map(rounded) },
      ...(parts.params === undefined ? {} : { params: parts.params }),
      ...(parts.transform === undefined ? {} : { transform: parts.transform }),
      layer: [...parts.layers],
    },
  };
}

/** Seven digits are more than a chart or a tooltip shows; all of them stand in the result's own files. */
const DIGITS = 7;

function rounded(row: Row): Record<string, Row[string]> {
  return Object.fromEntries(
    Object.entries(row).map(([name, value]) => [
      name,
      typeof value === "number" ? Number(value.toPrecision(DIGITS)) : value,
    ]),
  );
}
