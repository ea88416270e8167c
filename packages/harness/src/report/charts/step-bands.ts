import type { RankedStepper } from "../../choose/choice.ts";
import { axisChannel, type Quantity } from "../axes/axis-channel.ts";
import { logAxis } from "../axes/log-axis.ts";
import type { Chart } from "../chart.ts";
import type { ChoiceEvidence } from "../evidence.ts";
import { colour } from "../look/palette.ts";
import { formatNumber } from "../text/number.ts";
import { knobWords, plural } from "../text/words.ts";
import { makeChart, type Row } from "./make-chart.ts";

const MOST_ROWS = 16;

/** How near is the edge? The band of steps verified in full for each ranked stepper, its recommended step and where a limit first breaks. */
export function stepBands(evidence: ChoiceEvidence): Chart | null {
  const { choice } = evidence;
  const ranked = choice.ranking
    .filter((candidate) => candidate.stepSeconds !== null && candidate.band !== null)
    .slice(0, MOST_ROWS);
  const first = ranked[0];
  if (first === undefined) return null;
  const rows = ranked.map(rowOf);
  const seconds = rows.flatMap((row) =>
    [row.from, row.to, row.cliff, row.step].map((value) => (value === null ? null : Number(value))),
  );
  const x: Quantity = { field: "step", title: "step, s", axis: logAxis(seconds, 0.08) };
  const cap = choice.scenario.step?.maxSeconds;
  const y = {
    field: "stepper",
    type: "nominal" as const,
    sort: rows.map((row) => String(row.stepper)),
    title: null,
    axis: { labelLimit: 190, labelColor: colour("ink"), ticks: false, domain: false, grid: true },
  };
  const plainX = (field: string): { field: string; type: "quantitative"; scale: typeof x.axis.scale } => ({
    field,
    type: "quantitative",
    scale: x.axis.scale,
  });
  const tooltip = [
    { field: "stepper", title: "stepper", type: "nominal" as const },
    { field: "knob", title: "recommended step", type: "nominal" as const },
    { field: "band", title: "verified band", type: "nominal" as const },
    { field: "cellsRun", title: "cells run in the band", type: "nominal" as const },
    { field: "edge", title: "edge", type: "nominal" as const },
  ];
  return makeChart({
    name: "step-bands",
    section: "cost",
    title: titleOf(ranked.find((candidate) => candidate.stepper === choice.choice) ?? first),
    description: `For ${plural(rows.length, "stepper")} of the ranking with a fixed step: the band of steps verified in full as a bar, the recommended step as a disc, and the coarsest step that still holds every limit as an upright stroke, in seconds on a logarithmic scale. ${rows
      .slice(0, 6)
      .map((row) => `${row.stepper}: ${row.knob}, ${row.edge}`)
      .join(
        "; ",
      )}.${cap === undefined ? "" : ` The scenario allows no step above ${formatNumber(cap, 5)} s.`}`,
    note: "Bar: verified in full. Disc: recommended. Stroke: coarsest step that holds every limit.",
    height: rows.length * 24,
    rows,
    layers: [
      {
        mark: { type: "bar", height: 8, cornerRadius: 3, color: colour("stepper5"), opacity: 0.55 },
        encoding: { y, x: plainX("from"), x2: { field: "to" }, tooltip },
      },
      {
        transform: [{ filter: "isValid(datum.cliff)" }],
        mark: { type: "tick", thickness: 2.5, size: 17, color: colour("limit"), opacity: 1 },
        encoding: { y, x: plainX("cliff"), tooltip },
      },
      {
        mark: { type: "point", filled: true, size: 75, color: colour("stepper0"), opacity: 1 },
        encoding: { y, x: axisChannel(x, true), tooltip },
      },
    ],
  });
}

function rowOf(ranked: RankedStepper): Row {
  const { band, cliff } = ranked;
  return {
    stepper: ranked.stepper,
    step: ranked.stepSeconds,
    from: band?.from ?? null,
    to: band?.to ?? null,
    cellsRun: band?.cellsRun ?? 0,
    cliff: cliff?.stepSeconds ?? null,
    knob: knobWords(ranked),
    band: band === null ? "–" : `${formatNumber(band.to, 4)} to ${formatNumber(band.from, 4)} s`,
    edge: edgeWords(ranked),
  };
}

function edgeWords(ranked: RankedStepper): string {
  const { cliff } = ranked;
  if (cliff === null || cliff.reason === "not searched") return "edge not searched";
  return cliff.reason === "capped"
    ? "no limit breaks up to the cap"
    : `limits break beyond ${formatNumber(cliff.ratio)} times that step`;
}

function titleOf(subject: RankedStepper): string {
  const { cliff } = subject;
  if (cliff === null || cliff.reason === "not searched") {
    return `${subject.stepper} was verified in full around its step of ${knobWords(subject)}`;
  }
  return cliff.reason === "capped"
    ? `The step of ${subject.stepper} is held by the scenario's cap: no limit breaks before it`
    : `The step of ${subject.stepper} can grow ${formatNumber((cliff.ratio - 1) * 100, 2)} % before a limit breaks`;
}
