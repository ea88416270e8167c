import type { LimitError, LimitErrors } from "../../choose/choice.ts";
import { axisChannel, type Quantity } from "../axes/axis-channel.ts";
import { logAxis } from "../axes/log-axis.ts";
import type { Chart } from "../chart.ts";
import type { ChoiceEvidence } from "../evidence.ts";
import { colour } from "../look/palette.ts";
import { formatNumber, formatTimes } from "../text/number.ts";
import { limitValue, limitWords } from "../text/words.ts";
import { wrapWords } from "../text/wrap.ts";
import { type Layer, makeChart, type Row } from "./make-chart.ts";

interface Subject {
  readonly stepper: string;
  readonly label: string;
  readonly errors: LimitErrors;
}

const LABEL_CHARACTERS = 17;
const SUBJECT_LOOKS = [
  { colour: colour("stepper0"), shape: "circle" },
  { colour: colour("stepper1"), shape: "square" },
  { colour: colour("stepper2"), shape: "triangle-up" },
];

/** How far below each limit does the choice stay, beside the runner-up and today's stepper? */
export function margins(evidence: ChoiceEvidence): Chart | null {
  const subjects = subjectsOf(evidence);
  const chosen = subjects[0];
  if (chosen === undefined) return null;
  const designFactor = evidence.choice.scenario.designFactor ?? 2;
  const rows: Row[] = subjects.flatMap((subject) =>
    Object.entries(subject.errors).map(([key, error]) => ({
      label: subject.label,
      stepper: subject.stepper,
      limit: limitWords(key),
      lines: wrapWords(limitWords(key), LABEL_CHARACTERS).join("\n"),
      factor: factorOf(error),
      worst: limitValue(key, error.value),
      allowed: limitValue(key, error.limit),
      orbit: error.orbit,
      command: error.command,
    })),
  );
  const factors = rows.map((row) => Number(row.factor));
  const x: Quantity = {
    field: "factor",
    title: ["limit over worst error;", "right of 1 the limit holds"],
    axis: logAxis([...factors, 1, designFactor], 0.15),
  };
  // What a logarithm cannot show stands at the edge: no error at all on the right, a run that diverged on the left.
  const [low, high] = x.axis.domain;
  const placed = rows.map((row) => ({ ...row, factor: Math.min(Math.max(Number(row.factor), low), high) }));
  const limits = [...new Set(rows.map((row) => String(row.lines)))];
  const labels = subjects.map((subject) => subject.label);
  const y = {
    field: "lines",
    type: "nominal" as const,
    sort: limits,
    title: null,
    axis: {
      labelLimit: 170,
      labelColor: colour("ink"),
      ticks: false,
      domain: false,
      grid: true,
      labelExpr: "split(datum.label, '\\n')",
    },
  };
  const line = (value: number, words: string, dash: number[], align: "left" | "right"): Layer[] => [
    {
      data: { values: [{ factor: value }] },
      mark: { type: "rule", color: colour("limit"), strokeDash: dash, strokeWidth: 1.4 },
      encoding: { x: { field: "factor", type: "quantitative", scale: x.axis.scale } },
    },
    {
      data: { values: [{ factor: value, words }] },
      mark: {
        type: "text",
        color: colour("limit"),
        align,
        dx: align === "left" ? 4 : -4,
        dy: -6,
        baseline: "bottom",
        fontSize: 11,
      },
      encoding: {
        x: { field: "factor", type: "quantitative", scale: x.axis.scale },
        y: { value: 0 },
        text: { field: "words", type: "nominal" },
      },
    },
  ];
  return makeChart({
    name: "margins",
    section: "cost",
    title: titleOf(evidence, chosen),
    description: `Limit over worst error for each limit, on a logarithmic scale; right of the whole line at 1 the limit holds, right of the dashed line it holds with the design factor of ${formatNumber(
      designFactor,
    )}. ${subjects.map((subject) => `${subject.label}: ${factorsOf(subject)}`).join(". ")}.`,
    note: "",
    height: limits.length * 44,
    rows: placed,
    layers: [
      ...line(1, "limit", [1, 0], "right"),
      ...(designFactor > 1 ? line(designFactor, `× ${formatNumber(designFactor)}`, [6, 4], "left") : []),
      {
        mark: {
          type: "point",
          filled: true,
          size: 90,
          stroke: colour("paper"),
          strokeWidth: 0.8,
          opacity: 1,
        },
        encoding: {
          x: axisChannel(x, true),
          y,
          yOffset: { field: "label", type: "nominal", scale: { domain: labels, paddingOuter: 1 } },
          color: {
            field: "label",
            type: "nominal",
            scale: {
              domain: labels,
              range: SUBJECT_LOOKS.slice(0, labels.length).map((look) => look.colour),
            },
            legend: { columns: 1 },
          },
          shape: {
            field: "label",
            type: "nominal",
            scale: { domain: labels, range: SUBJECT_LOOKS.slice(0, labels.length).map((look) => look.shape) },
            legend: { columns: 1 },
          },
          tooltip: [
            { field: "label", title: "stepper", type: "nominal" },
            { field: "limit", title: "limit on", type: "nominal" },
            { field: "allowed", title: "limit", type: "nominal" },
            { field: "worst", title: "worst error", type: "nominal" },
            { field: "factor", title: "limit over error", type: "quantitative", format: ".3e" },
            { field: "orbit", title: "orbit", type: "nominal" },
            { field: "command", title: "command", type: "nominal" },
          ],
        },
      },
    ],
  });
}

function subjectsOf(evidence: ChoiceEvidence): Subject[] {
  const { choice } = evidence;
  const chosen = choice.ranking.find((ranked) => ranked.stepper === choice.choice);
  const next = choice.ranking.find((ranked) => ranked !== chosen);
  const subjects: Subject[] = [];
  if (chosen !== undefined) subjects.push({ ...chosen, label: `${chosen.stepper}, the choice` });
  if (choice.current !== null)
    subjects.push({ ...choice.current, label: `${choice.current.stepper}, used today` });
  if (next !== undefined) {
    subjects.push({ ...next, label: `${next.stepper}, ${chosen === undefined ? "nearest" : "runner-up"}` });
  }
  return subjects.filter((subject) => Object.keys(subject.errors).length > 0);
}

function titleOf(evidence: ChoiceEvidence, subject: Subject): string {
  const tightest = Object.entries(subject.errors).sort((a, b) => factorOf(a[1]) - factorOf(b[1]))[0];
  if (tightest === undefined) return `No limit was measured for ${subject.stepper}`;
  const [key, error] = tightest;
  const who = subject.stepper === evidence.choice.choice ? subject.stepper : subject.label;
  const limit = limitWords(key);
  if (factorOf(error) >= 1) {
    return `The limit on ${limit} binds ${who}: its worst error stays ${formatTimes(error.factor)} times below`;
  }
  return error.factor > 0
    ? `${who} breaks the limit on ${limit} ${formatTimes(1 / error.factor)} times over`
    : `${who} breaks the limit on ${limit}: it does not stay in orbit, or the error is not defined`;
}

/** Limit over error; beyond every number where there is no error. */
function factorOf(error: LimitError): number {
  return error.value === 0 ? Number.POSITIVE_INFINITY : error.factor;
}

function factorWords(error: LimitError): string {
  if (error.value === 0) return "without error";
  return error.value === null ? "diverged or not defined" : formatNumber(error.factor);
}

function factorsOf(subject: Subject): string {
  return Object.entries(subject.errors)
    .map(([key, error]) => `${limitWords(key)} ${factorWords(error)}`)
    .join("; ");
}
