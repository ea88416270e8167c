import type { Choice, ExcludedStepper, RankedStepper } from "../../choose/choice.ts";
import { html, type Markup } from "../text/html.ts";
import { formatCount, formatNumber, formatTimes } from "../text/number.ts";
import { knobWords, limitUnit, limitValue, limitWords, withWords } from "../text/words.ts";
import { type Column, table } from "./table.ts";
import { chosenOf } from "./verdict.ts";

const FIRST_ROWS = 12;

const RANKING_COLUMNS: readonly Column[] = [
  { heading: "stepper" },
  { heading: "step or tolerance", number: true },
  { heading: "evaluations per orbit", number: true },
  { heading: "evaluations in all", number: true },
  { heading: "against the choice", number: true },
  { heading: "margin", number: true },
  { heading: "binding limit" },
  { heading: "room to the edge", number: true },
  { heading: "evidence" },
];

/** Every stepper that qualifies, cheapest first. */
export function ranking(choice: Choice): Markup {
  if (choice.ranking.length === 0) {
    return html`<section aria-labelledby="ranking"><h2 id="ranking">Ranking</h2><p>No stepper is ranked.</p></section>`;
  }
  const chosen = chosenOf(choice);
  const rows = choice.ranking.map((ranked, index) => rankingRow(ranked, index + 1, chosen));
  const marked = chosen === null ? -1 : choice.ranking.indexOf(chosen);
  return html`<section aria-labelledby="ranking"><h2 id="ranking">Ranking</h2>
<p>By force evaluations over the whole fleet and duration. ${
    choice.ranking.some((ranked) => ranked.evidence === "extrapolated")
      ? "Extrapolated entries come from short runs and cannot be chosen; their errors may be as many times larger as stated, should growth turn to the steepest that theory allows."
      : ""
  }</p>
${table("Steppers by cost", RANKING_COLUMNS, rows.slice(0, FIRST_ROWS), marked)}
${folded(rows.slice(FIRST_ROWS), "more steppers", (rest) => table("Steppers by cost, continued", RANKING_COLUMNS, rest, marked - FIRST_ROWS))}
${whyList(choice)}</section>`;
}

function rankingRow(ranked: RankedStepper, rank: number, chosen: RankedStepper | null): Markup[] {
  return [
    html`<span class="rank">${rank}</span> ${ranked.stepper}<span class="title">${ranked.title}${ranked.symplectic ? ", symplectic" : ""}</span>`,
    html`${knobWords(ranked)}`,
    html`${formatCount(ranked.evaluationsPerOrbit)}`,
    html`${formatNumber(ranked.evaluationsTotal, 4)}`,
    html`${chosen === null ? "–" : `${formatTimes(ranked.evaluationsTotal / chosen.evaluationsTotal)} ×`}`,
    html`${formatTimes(ranked.margin)}`,
    html`${ranked.bindingLimit === null ? "–" : limitWords(ranked.bindingLimit)}`,
    html`${roomWords(ranked)}`,
    html`${ranked.evidence === "run" ? "run in full" : extrapolatedWords(ranked)}`,
  ];
}

/** With the largest uncertainty of its errors, where theory allows them to be larger. */
function extrapolatedWords({ errors }: RankedStepper): string {
  const most = Math.max(1, ...Object.values(errors).map(({ uncertaintyFactor }) => uncertaintyFactor));
  return most > 1.005 ? `extrapolated; errors up to ${formatTimes(most)} times larger` : "extrapolated";
}

function roomWords({ cliff }: RankedStepper): string {
  if (cliff === null || cliff.reason === "not searched") return "–";
  return cliff.reason === "capped" ? "none met" : `${formatTimes(cliff.ratio)} ×`;
}

function whyList(choice: Choice): Markup {
  return html`<details><summary>Why each stands where it does</summary><dl class="why">${choice.ranking.map(
    (ranked) => html`<div><dt>${ranked.stepper}</dt><dd>${withWords(ranked.why)}</dd></div>`,
  )}</dl></details>`;
}

const EXCLUDED_COLUMNS: readonly Column[] = [
  { heading: "stepper" },
  { heading: "reason" },
  { heading: "found", number: true },
  { heading: "allowed", number: true },
];

/** Every stepper that does not qualify, with the reason. */
export function excluded(choice: Choice): Markup | null {
  if (choice.excluded.length === 0) return null;
  const rows = choice.excluded.map((entry) => [
    html`${entry.stepper}`,
    html`${withWords(entry.reason)}`,
    html`${valueWords(entry, entry.value)}`,
    html`${valueWords(entry, entry.allowed)}`,
  ]);
  return html`<section aria-labelledby="excluded"><h2 id="excluded">Excluded, and why</h2>
${table("Steppers that do not qualify", EXCLUDED_COLUMNS, rows.slice(0, FIRST_ROWS))}
${folded(rows.slice(FIRST_ROWS), "more excluded", (rest) => table("Steppers that do not qualify, continued", EXCLUDED_COLUMNS, rest))}</section>`;
}

function valueWords(entry: ExcludedStepper, value: number | null): string {
  if (value === null) return "–";
  if (entry.limit !== null && limitUnit(entry.limit) !== "") return limitValue(entry.limit, value);
  return Number.isInteger(value) ? formatCount(value) : formatNumber(value);
}

function folded<Row>(
  rest: readonly Row[],
  words: string,
  draw: (rest: readonly Row[]) => Markup,
): Markup | null {
  return rest.length === 0
    ? null
    : html`<details><summary>${formatCount(rest.length)} ${words}</summary>${draw(rest)}</details>`;
}
