import type { TopLevelSpec } from "vega-lite";

/** One chart of a report: the finding, its text alternative and how to draw it. */
export interface Chart {
  /** Kebab-case; the name of its files. */
  readonly name: string;
  /** What it shows, as a sentence with numbers computed from the data. */
  readonly title: string;
  /** Text alternative: what is drawn, on which axes, and the values that matter. */
  readonly description: string;
  /** Short line under the title in a file of its own: axes conventions, grey marks. */
  readonly note: string;
  /** What the page puts it under. */
  readonly section: ChartSection;
  readonly spec: TopLevelSpec;
}

export type ChartSection = "cost" | "plane" | "eccentricity" | "step" | "duration" | "orbit";
