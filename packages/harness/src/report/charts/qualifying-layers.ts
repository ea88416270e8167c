import { axisChannel, type Quantity } from "../axes/axis-channel.ts";
import { colour } from "../look/palette.ts";
import type { Looks } from "../look/stepper-look.ts";
import type { Layer } from "./make-chart.ts";

/** What the reader types: every limit of the scenario multiplied by it. */
export const LIMIT_PARAM: {
  readonly name: string;
  readonly value: number;
  readonly bind: { readonly input: string; readonly name: string };
} = {
  name: "limit_times",
  value: 1,
  bind: { input: "number", name: "every limit of the scenario times" },
};

/** The same as a number, 1 while nothing usable is typed: inputs hand over text. */
export const ALLOWED = "(toNumber(limit_times) > 0 ? toNumber(limit_times) : 1)";

/**
 * Which steppers qualify: a ring round the cheapest point of each that holds the limits, and in words how many do and which is cheapest. Rows
 * carry `stepper`; x is the cost and y the error over the limit.
 */
export function qualifyingLayers(x: Quantity, y: Quantity, looks: Looks): Layer[] {
  const coloured = { field: "stepper", oneOf: looks.highlighted.map(({ stepper }) => stepper) };
  const holds = `isValid(datum[${JSON.stringify(y.field)}]) && datum[${JSON.stringify(y.field)}] <= ${ALLOWED}`;
  const words =
    "datum.steppers + (datum.steppers === 1 ? ' stepper holds' : ' steppers hold') + ' the limits' + (datum.steppers > 0 ? ' at a point\\ncheapest: ' + datum.cheapest.stepper : '')";
  const text = {
    type: "text" as const,
    align: "right" as const,
    baseline: "top" as const,
    // Two lines: one would be wider than a phone.
    lineBreak: "\n",
    dx: -4,
    dy: 2,
    fontSize: 11,
  };
  const summary: NonNullable<Layer["transform"]> = [
    { filter: holds },
    {
      aggregate: [
        { op: "distinct", field: "stepper", as: "steppers" },
        { op: "argmin", field: x.field, as: "cheapest" },
      ],
      groupby: [],
    },
    { calculate: words, as: "words" },
  ];
  const place = {
    x: { value: "width" as const },
    y: { value: 0 },
    text: { field: "words", type: "nominal" as const },
  };
  return [
    {
      transform: [
        { filter: holds },
        {
          joinaggregate: [{ op: "min", field: x.field, as: "least" }],
          groupby: ["stepper"],
        },
        { filter: `datum[${JSON.stringify(x.field)}] === datum.least` },
      ],
      name: "qualifying_rings",
      mark: {
        type: "point",
        shape: "circle",
        size: 110,
        filled: false,
        stroke: colour("limit"),
        strokeWidth: 1.3,
        opacity: 1,
        clip: true,
      },
      encoding: {
        x: axisChannel(x),
        y: axisChannel(y, true),
        strokeOpacity: { condition: { test: coloured, value: 1 }, value: 0.45 },
      },
    },
    {
      transform: summary,
      mark: { ...text, stroke: colour("paper"), strokeWidth: 4, strokeJoin: "round" },
      encoding: place,
    },
    { transform: summary, mark: { ...text, color: colour("ink") }, encoding: place },
  ];
}
