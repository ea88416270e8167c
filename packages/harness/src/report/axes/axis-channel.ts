import type { LogAxis } from "./log-axis.ts";

/** A quantity on an axis: the row's field, its words with unit, and the axis it is drawn on. */
export interface Quantity {
  readonly field: string;
  readonly title: string | string[];
  readonly axis: LogAxis | LinearAxis;
}

export interface LinearAxis {
  readonly domain: [number, number];
  readonly scale: { readonly type: "linear"; readonly domain: [number, number]; readonly nice: false };
  readonly values?: never;
  readonly labelExpr?: never;
}

/** Position channel with its axis; the words of a vertical one stand level above it. */
export function axisChannel(
  quantity: Quantity,
  grid = false,
): {
  readonly field: string;
  readonly type: "quantitative";
  readonly scale: LogAxis["scale"] | LinearAxis["scale"];
  readonly title: string | string[];
  readonly axis: {
    grid: boolean;
    tickCount?: number;
    values?: number[];
    labelExpr?: string;
    labelOverlap: boolean | "greedy";
  };
} {
  const { axis } = quantity;
  return {
    field: quantity.field,
    type: "quantitative",
    scale: axis.scale,
    title: quantity.title,
    axis:
      axis.values === undefined
        ? { grid, tickCount: 8, labelOverlap: "greedy" }
        : { grid, values: axis.values, labelExpr: axis.labelExpr, labelOverlap: "greedy" },
  };
}
