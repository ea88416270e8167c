import type { Quantity } from "../axes/axis-channel.ts";
import { logAxis } from "../axes/log-axis.ts";
import type { Chart } from "../chart.ts";
import type { ChoiceEvidence, CostPoint } from "../evidence.ts";
import type { Looks } from "../look/stepper-look.ts";
import { formatCount, formatNumber, formatTimes } from "../text/number.ts";
import { limitWords, plural } from "../text/words.ts";
import { levelLayers } from "./level-layers.ts";
import { makeChart } from "./make-chart.ts";
import { mutedNote } from "./muted-note.ts";
import { ALLOWED, LIMIT_PARAM, qualifyingLayers } from "./qualifying-layers.ts";
import { seriesLayers, type Tip } from "./series-layers.ts";

const TIPS: readonly Tip[] = [
  { field: "stepper", title: "stepper" },
  { field: "knob", title: "step" },
  { field: "evaluationsPerOrbit", title: "force evaluations per orbit", format: ".4e" },
  { field: "worstRatio", title: "largest error over its limit", format: ".3e" },
  { field: "bindingLimit", title: "binding limit" },
  { field: "evidence", title: "evidence" },
  { field: "command", title: "command" },
];

/** What is drawn: costs up to so many times the cheapest that holds, ratios from a thousandth of the limit to ten thousand times it. */
const MOST_COST = 60;
const LEAST_RATIO = 1e-3;
const MOST_RATIO = 1e4;

/** Which stepper buys the limits cheapest? Largest error over its limit against force evaluations per orbit, limit and design line drawn in. */
export function errorAgainstCost(evidence: ChoiceEvidence, looks: Looks): Chart {
  const points = evidence.costPoints;
  const designFactor = evidence.choice.scenario.designFactor ?? 2;
  const window = windowOf(points);
  const x: Quantity = {
    field: "evaluationsPerOrbit",
    title: "force evaluations per orbit",
    axis: logAxis(window.costs, 0.08),
  };
  const y: Quantity = {
    field: "worstRatio",
    title: "largest error over its limit",
    axis: logAxis([...window.ratios, 1, 1 / designFactor]),
  };
  const rows = points.map((point) => ({
    stepper: point.stepper,
    symplectic: point.symplectic,
    evaluationsPerOrbit: point.evaluationsPerOrbit,
    worstRatio: point.worstRatio,
    knob: knobOf(point),
    bindingLimit: limitWords(point.bindingLimit),
    evidence: point.evidence,
    command: point.command ?? "",
    ended: "completed",
  }));
  const limit = levelLayers(y, 1, "limit", { dash: [1, 0], side: "above", times: ALLOWED });
  const design = levelLayers(y, 1 / designFactor, `limit ÷ ${formatNumber(designFactor)}`, {
    dash: [6, 4],
    side: "below",
    times: ALLOWED,
  });
  const levels = designFactor > 1 ? [limit, design] : [limit];
  const layers = [
    ...levels.flatMap((level) => level.line),
    ...seriesLayers(x, y, looks, TIPS, { clip: true }),
    ...qualifyingLayers(x, y, looks),
    ...levels.flatMap((level) => level.words),
  ];
  return makeChart({
    name: "error-against-cost",
    section: "cost",
    title: findingOf(evidence),
    description: `Largest error over its limit (vertical, logarithmic) against force evaluations per orbit (horizontal, logarithmic), for ${plural(
      new Set(points.map((point) => point.stepper)).size,
      "stepper",
    )} at ${plural(points.length, "step or tolerance", "steps or tolerances")}. Below the whole line at 1 every limit holds; below the dashed line each holds ${formatNumber(
      designFactor,
    )} times over. Further left is cheaper. ${window.outside > 0 ? `Outside the axes: ${plural(window.outside, "point")}. ` : ""}${nearestWords(evidence)}`,
    note: `Rings: the cheapest point of each stepper that holds the limits. ${mutedNote(looks)}`.trim(),
    height: 380,
    rows,
    params: [LIMIT_PARAM],
    layers,
  });
}

function findingOf(evidence: ChoiceEvidence): string {
  const { choice } = evidence;
  const first = choice.ranking.find((ranked) => ranked.stepper === choice.choice) ?? choice.ranking[0];
  const second = choice.ranking.find((ranked) => ranked !== first);
  if (choice.choice === null || first === undefined) {
    const best = nearest(evidence.costPoints);
    return best === undefined
      ? "No stepper could be measured against the limits"
      : `No stepper tried holds every limit as asked: ${best.stepper} comes nearest, at ${formatNumber(best.worstRatio)} of the limit`;
  }
  const others =
    second === undefined
      ? ""
      : `, ${second.stepper} needs ${formatTimes(second.evaluationsTotal / first.evaluationsTotal)} times as many in all`;
  return `${first.stepper} holds every limit with ${formatCount(first.evaluationsPerOrbit)} force evaluations per orbit${others}`;
}

/** Where each curve first comes below the limit, cheapest first. */
function nearestWords(evidence: ChoiceEvidence): string {
  const cheapest = new Map<string, CostPoint>();
  for (const point of evidence.costPoints) {
    const known = cheapest.get(point.stepper);
    if (
      point.worstRatio <= 1 &&
      (known === undefined || point.evaluationsPerOrbit < known.evaluationsPerOrbit)
    ) {
      cheapest.set(point.stepper, point);
    }
  }
  const words = [...cheapest.values()]
    .sort((a, b) => a.evaluationsPerOrbit - b.evaluationsPerOrbit)
    .slice(0, 5)
    .map((point) => `${point.stepper} ${formatCount(point.evaluationsPerOrbit)}`);
  return words.length === 0
    ? "No point lies below the limit."
    : `Fewest evaluations per orbit at a point below the limit: ${words.join(", ")}.`;
}

interface Window {
  readonly costs: readonly number[];
  readonly ratios: readonly number[];
  readonly outside: number;
}

/** Keeps hopeless steppers from squeezing the others into a corner. */
function windowOf(points: readonly CostPoint[]): Window {
  const holding = points.filter((point) => point.worstRatio <= 1).map((point) => point.evaluationsPerOrbit);
  const mostCost = MOST_COST * Math.min(...holding);
  const inside = points.filter(
    (point) =>
      point.evaluationsPerOrbit <= mostCost &&
      point.worstRatio >= LEAST_RATIO &&
      point.worstRatio <= MOST_RATIO,
  );
  const drawn = inside.length === 0 ? points : inside;
  return {
    costs: drawn.map((point) => point.evaluationsPerOrbit),
    ratios: drawn.map((point) => point.worstRatio),
    outside: points.length - drawn.length,
  };
}

function nearest(points: readonly CostPoint[]): CostPoint | undefined {
  return [...points].sort((a, b) => a.worstRatio - b.worstRatio)[0];
}

function knobOf(point: CostPoint): string {
  if (point.stepsPerOrbit !== null) return `${formatNumber(point.stepsPerOrbit, 5)} steps per orbit`;
  return `tolerance ${formatNumber(point.tolerance)}`;
}
