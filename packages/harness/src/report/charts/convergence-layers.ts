import { fitOrder } from "../../analyse/order-window.ts";
import { angleFloor, energyFloor } from "../../score/growth.ts";
import type { Quantity } from "../axes/axis-channel.ts";
import type { Survey, SurveyPoint } from "../evidence.ts";
import { colour } from "../look/palette.ts";
import type { Looks, StepperLook } from "../look/stepper-look.ts";
import { formatNumber } from "../text/number.ts";
import type { Layer } from "./make-chart.ts";
import { FADED } from "./series-layers.ts";

type Field = "phase" | "energy" | "period";

/** A stepper with the order fitted to the asymptotic part of its points; null where they show no such part. */
export interface FittedOrder {
  readonly look: StepperLook;
  readonly order: number | null;
}

const LINE = 15;
const MOST_SLOPES = 4;

/** Rounding floor of one measure at the end of the survey's runs, after `steps` steps and `evaluations` evaluations per orbit. */
function floorOf(field: Field, orbits: number, steps: number, evaluations: number): number {
  if (field === "energy") return energyFloor(evaluations)(orbits);
  const angle = angleFloor(steps)(orbits);
  return field === "phase" ? angle : angle / (2 * Math.PI);
}

/** Least-squares order of every highlighted stepper over the asymptotic part of its ladder of steps. */
export function fittedOrders(
  survey: Survey,
  field: Field,
  looks: Looks,
  stepsOf: (point: SurveyPoint) => number | null,
): FittedOrder[] {
  return looks.highlighted.flatMap((look) => {
    const ladder = survey.againstStep
      .filter((point) => point.stepper === look.stepper)
      .flatMap((point) => {
        const steps = stepsOf(point);
        if (steps === null) return [];
        return [
          {
            fineness: steps,
            error: point.ended === "completed" ? point[field] : null,
            floor: floorOf(field, survey.orbits, steps, point.evaluationsPerOrbit),
          },
        ];
      });
    return ladder.length === 0 ? [] : [{ look, order: fitOrder(ladder).order?.value ?? null }];
  });
}

/** What lies behind the curves: the rounding floor as a shaded band, and straight lines of the orders met. */
export function groundLayers(
  field: Field,
  survey: Survey,
  orders: readonly FittedOrder[],
  x: Quantity,
  y: Quantity,
): Layer[] {
  const position = {
    x: { field: "steps", type: "quantitative" as const, scale: x.axis.scale },
    y: { field: "level", type: "quantitative" as const, scale: y.axis.scale },
  };
  const [low] = y.axis.domain;
  const floor = x.axis.domain.map((steps) => ({
    steps,
    level: Math.max(low, floorOf(field, survey.orbits, steps, steps)),
    low,
  }));
  const shaded: Layer = {
    data: { values: floor },
    mark: { type: "area", color: colour("rule"), opacity: 1, clip: true },
    encoding: { ...position, y2: { field: "low" } },
  };
  const slopes = referenceSlopes(orders, x, y);
  if (slopes.length === 0) return [shaded];
  return [
    shaded,
    {
      data: {
        values: slopes.flatMap(({ order, from, to }) => [
          { order, ...from },
          { order, ...to },
        ]),
      },
      mark: { type: "line", color: colour("soft"), strokeWidth: 1, strokeDash: [2, 3] },
      encoding: { ...position, detail: { field: "order", type: "nominal" } },
    },
    {
      data: { values: slopes.map(({ order, to }) => ({ order: `N${raised(order)}`, ...to })) },
      mark: { type: "text", color: colour("soft"), fontSize: 10, baseline: "top", dy: 3 },
      encoding: { ...position, text: { field: "order", type: "nominal" } },
    },
  ];
}

/** A fan from the left edge, in the corner that errors leave free: few steps and a small error. */
function referenceSlopes(
  orders: readonly FittedOrder[],
  x: Quantity,
  y: Quantity,
): { order: number; from: { steps: number; level: number }; to: { steps: number; level: number } }[] {
  const whole = [...new Set(orders.flatMap(({ order }) => (order === null ? [] : [Math.round(order)])))]
    .sort((a, b) => a - b)
    .filter((order, index, all) => order > 0 && (index === 0 || order >= 1.3 * (all[index - 1] ?? 0)))
    .slice(0, MOST_SLOPES);
  const decades = y.axis.domain.map(Math.log10) as [number, number];
  const span = decades[1] - decades[0];
  const from = { steps: x.axis.domain[0] * 1.06, level: 10 ** (decades[0] + 0.42 * span) };
  const fall = 10 ** (0.2 * span);
  return whole.flatMap((order) => {
    const steps = from.steps * fall ** (1 / order);
    return steps < x.axis.domain[1] ? [{ order, from, to: { steps, level: from.level / fall } }] : [];
  });
}

function raised(order: number): string {
  return `⁻${String(order).replace(/\d/g, (digit) => "⁰¹²³⁴⁵⁶⁷⁸⁹"[Number(digit)] ?? digit)}`;
}

/** The fitted orders in the upper right corner, which errors leave free, each with its stepper's mark. */
export function orderLabels(orders: readonly FittedOrder[]): Layer[] {
  const said = orders.filter(({ order }) => order !== null);
  return said.flatMap(({ look, order }, index): Layer[] => {
    const data = { values: [{ stepper: look.stepper }] };
    const at = {
      x: { value: "width" as const },
      y: { value: 8 + LINE * index },
      // Fades with its curve when others are picked.
      opacity: { condition: { param: "picked", value: 1 }, value: FADED },
    };
    const text = {
      type: "text" as const,
      text: `${look.stepper}: order ${formatNumber(order, 3)}`,
      align: "right" as const,
      fontSize: 10,
      dx: -16,
    };
    return [
      { data, mark: { ...text, stroke: colour("paper"), strokeWidth: 4, strokeJoin: "round" }, encoding: at },
      { data, mark: { ...text, color: colour("ink") }, encoding: at },
      {
        data,
        mark: {
          type: "point",
          filled: true,
          size: 45,

          shape: look.shape,
          color: colour(look.colourName),
          xOffset: -7,
        },
        encoding: at,
      },
    ];
  });
}

export function orderWords(orders: readonly FittedOrder[]): string {
  const said = orders.flatMap(({ look, order }) =>
    order === null ? [] : [`${look.stepper} ${formatNumber(order, 3)}`],
  );
  const unsaid = orders.flatMap(({ look, order }) => (order === null ? [look.stepper] : []));
  return `${said.length === 0 ? "" : ` Fitted order, by least squares on the asymptotic part: ${said.join(", ")}.`}${
    unsaid.length === 0 ? "" : ` No asymptotic part, so no order: ${unsaid.join(", ")}.`
  }`;
}
