import type { RankedStepper } from "../../choose/choice.ts";
import type { Chart } from "../chart.ts";
import type { ChoiceEvidence } from "../evidence.ts";
import { colour } from "../look/palette.ts";
import { formatNumber, formatTimes, NO_BREAK } from "../text/number.ts";
import { durationWords, knobWords, plural } from "../text/words.ts";
import { makeChart, type Row } from "./make-chart.ts";

const MOST_BARS = 24;
const WORDS_WIDTH = 70;

/** What does each candidate cost that holds the limits? Force evaluations of the whole fleet and duration. */
export function costBars(evidence: ChoiceEvidence): Chart | null {
  const { choice } = evidence;
  const bars = choice.ranking.slice(0, MOST_BARS);
  const first = choice.ranking.find((ranked) => ranked.stepper === choice.choice) ?? bars[0];
  if (first === undefined) return null;
  const current = choice.current;
  const rows: Row[] = bars.map((ranked) =>
    rowOf(ranked, first, ranked.stepper, ranked.stepper === choice.choice),
  );
  if (current !== null) {
    rows.push({ ...rowOf(current, first, `today: ${current.stepper}`, false), today: true });
  }
  const most = Math.max(...rows.map((row) => Number(row.evaluationsTotal)));
  const unit =
    most >= 2e9
      ? { value: 1e9, words: ", thousand millions" }
      : most >= 2e6
        ? { value: 1e6, words: ", millions" }
        : { value: 1, words: "" };
  const y = {
    field: "label",
    type: "nominal" as const,
    sort: rows.map((row) => String(row.label)),
    title: null,
    axis: { labelLimit: 190, labelColor: colour("ink"), ticks: false, domain: false, labelPadding: 6 },
  };
  // Room for the words after the longest bar, in pixels: the page draws the chart at any width.
  const scale = {
    nice: false,
    domainMin: 0,
    domainMax: { expr: `${most} * width / max(40, width - ${WORDS_WIDTH})` },
  };
  const tooltip = [
    { field: "stepper", title: "stepper", type: "nominal" as const },
    { field: "knob", title: "step", type: "nominal" as const },
    {
      field: "evaluationsTotal",
      title: "force evaluations in all",
      type: "quantitative" as const,
      format: ".4e",
    },
    {
      field: "evaluationsPerOrbit",
      title: "force evaluations per orbit",
      type: "quantitative" as const,
      format: ".4e",
    },
    { field: "evidence", title: "evidence", type: "nominal" as const },
  ];
  const x = {
    field: "evaluationsTotal",
    type: "quantitative" as const,
    scale,
    title: ["force evaluations,", `whole fleet and duration${unit.words}`],
    axis: { tickCount: 4, labelExpr: `format(datum.value / ${unit.value}, '~g')`, grid: true },
  };
  const left = choice.ranking.length - bars.length;
  return makeChart({
    name: "cost-to-hold-the-limits",
    section: "cost",
    title: titleOf(evidence, first),
    description: `Bars: force evaluations of the whole fleet over ${durationWords(choice.scenario)} at the recommended step of each stepper that qualifies, cheapest first. ${bars
      .slice(0, 6)
      .map((ranked) => `${ranked.stepper} ${formatNumber(ranked.evaluationsTotal)}`)
      .join(", ")}.${left > 0 ? ` ${plural(left, "dearer stepper")} are in the ranking only.` : ""}${
      current === null
        ? ""
        : ` Today's ${current.stepper}: ${formatNumber(current.evaluationsTotal)}, ${current.enough ? "which is enough" : "and that is not enough"}.`
    }`,
    note: "Pale bars: extrapolated from short runs. Outlined bar: the integrator and step used today.",
    height: rows.length * 22,
    rows,
    layers: [
      {
        mark: { type: "bar", height: 13, cornerRadiusEnd: 2, strokeWidth: 1.5 },
        encoding: {
          y,
          x,
          color: {
            condition: [
              { test: "datum.today", value: colour("paper") },
              { test: "datum.chosen", value: colour("stepper0") },
            ],
            value: colour("stepper7"),
          },
          stroke: { condition: { test: "datum.today", value: colour("limit") }, value: null },
          opacity: { condition: { test: "datum.evidence === 'extrapolated'", value: 0.45 }, value: 1 },
          tooltip,
        },
      },
      {
        mark: { type: "text", align: "left", dx: 5, fontSize: 11, color: colour("ink") },
        encoding: { y, x, text: { field: "words", type: "nominal" } },
      },
    ],
  });
}

function rowOf(ranked: RankedStepper, first: RankedStepper, label: string, chosen: boolean): Row {
  return {
    label,
    stepper: ranked.stepper,
    knob: knobWords(ranked),
    evaluationsTotal: ranked.evaluationsTotal,
    evaluationsPerOrbit: ranked.evaluationsPerOrbit,
    evidence: ranked.evidence,
    chosen,
    today: false,
    words:
      ranked === first
        ? formatNumber(ranked.evaluationsTotal)
        : `${formatTimes(ranked.evaluationsTotal / first.evaluationsTotal)}${NO_BREAK}×`,
  };
}

function titleOf(evidence: ChoiceEvidence, first: RankedStepper): string {
  const { choice } = evidence;
  const others = choice.ranking.filter((ranked) => ranked !== first);
  const [second, last] = [others[0], others.at(-1)];
  const base = `${first.stepper} does the job with ${formatNumber(first.evaluationsTotal)} force evaluations`;
  if (second === undefined || last === undefined) return `${base}; no other stepper qualifies`;
  const times = (ranked: RankedStepper): string =>
    formatTimes(ranked.evaluationsTotal / first.evaluationsTotal);
  const extrapolated = second.evidence === "extrapolated" ? " (extrapolated)" : "";
  const next = `${base}; ${second.stepper} takes ${times(second)} times as many${extrapolated}`;
  return last === second ? next : `${next}, ${last.stepper} ${times(last)} times`;
}
