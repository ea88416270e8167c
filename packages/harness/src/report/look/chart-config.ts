import type { Config } from "vega-lite";
import { colour } from "./palette.ts";

export const FONT = "DejaVu Sans, Verdana, Geneva, sans-serif";

/** One look for every chart, written into each specification so that it draws alike anywhere. */
export const chartConfig: Config = {
  // The drawing as a whole has a title and a description; thousands of marks with roles of their own help nobody.
  aria: false,
  mark: { aria: false },
  background: colour("paper"),
  font: FONT,
  padding: { left: 8, right: 14, top: 8, bottom: 8 },
  view: { stroke: null },
  title: {
    anchor: "start",
    color: colour("ink"),
    fontSize: 14,
    fontWeight: "bold",
    lineHeight: 19,
    subtitleColor: colour("soft"),
    subtitleFontSize: 11,
    subtitleLineHeight: 15,
    subtitlePadding: 4,
    offset: 12,
    frame: "bounds",
  },
  axis: {
    domainColor: colour("soft"),
    tickColor: colour("soft"),
    tickSize: 4,
    gridColor: colour("rule"),
    labelColor: colour("soft"),
    labelFontSize: 11,
    labelPadding: 4,
    labelFlush: false,
    titleColor: colour("ink"),
    titleFontSize: 11,
    titleFontWeight: "normal",
    titlePadding: 8,
  },
  axisY: {
    titleAngle: 0,
    titleAlign: "left",
    titleAnchor: "start",
    titleBaseline: "bottom",
    titleX: 0,
    titleY: -8,
  },
  legend: {
    orient: "bottom",
    columns: 3,
    labelColor: colour("ink"),
    labelFontSize: 11,
    labelLimit: 260,
    symbolSize: 70,
    symbolStrokeWidth: 0.4,
    title: null,
    rowPadding: 4,
    columnPadding: 18,
    offset: 12,
  },
};
