import type { Choice, RankedStepper } from "../../choose/choice.ts";
import { html, type Markup } from "../text/html.ts";
import { formatCount, formatNumber, formatTimes } from "../text/number.ts";
import { wholeWords } from "../text/whole-words.ts";
import { durationWords, knobWords, limitWords, plural, withWords } from "../text/words.ts";
import { worstCellWords } from "./worst-cell.ts";

/** The stepper that was chosen, where one qualifies. */
export function chosenOf(choice: Choice): RankedStepper | null {
  return choice.ranking.find((ranked) => ranked.stepper === choice.choice) ?? null;
}

/** The answer in words, first on the page. */
export function verdict(choice: Choice): Markup {
  const chosen = chosenOf(choice);
  return html`<header class="verdict">
<p class="case">${choice.scenario.title} <span class="soft">over ${durationWords(choice.scenario)}</span></p>
${chosen === null ? noneQualifies(choice) : recommendation(choice, chosen)}
</header>`;
}

function recommendation(choice: Choice, chosen: RankedStepper): Markup {
  const binding = chosen.bindingLimit === null ? undefined : chosen.errors[chosen.bindingLimit];
  const knob =
    chosen.tolerance !== null
      ? html`tolerance <b>${formatNumber(chosen.tolerance)}</b>`
      : chosen.stepSeconds !== null
        ? html`a step of <b>${knobWords(chosen)}</b>`
        : html`<b>${knobWords(chosen)}</b>`;
  return html`<h1>Use <b>${wholeWords(chosen.stepper)}</b> with ${knob}</h1>
<p class="lead">${
    binding === undefined || chosen.bindingLimit === null
      ? "Every limit holds."
      : `Its worst error stays ${formatTimes(chosen.margin)} times below its limit: ${limitWords(chosen.bindingLimit)} (${worstCellWords(binding)}).`
  }</p>
<ul class="facts">
<li><span class="figure">${formatTimes(chosen.margin)} ×</span> smallest margin, limit over error</li>
<li><span class="figure">${formatCount(chosen.evaluationsPerOrbit)}</span> force evaluations per orbit</li>
<li><span class="figure">${formatNumber(chosen.evaluationsTotal)}</span> force evaluations in all</li>
${
  chosen.stepsPerOrbit === null
    ? null
    : html`<li><span class="figure">${formatNumber(chosen.stepsPerOrbit, 4)}</span> steps per orbit, shortest orbit</li>`
}
</ul>
<p>${wholeWords(`${bandWords(chosen)} ${edgeWords(chosen)} ${runnerUpWords(choice, chosen)}`)}</p>
<details><summary>In plain words</summary><p>${withWords(choice.explanation)}</p></details>`;
}

function noneQualifies(choice: Choice): Markup {
  return html`<h1>No stepper qualifies</h1>
<p class="lead">None of the steppers tried holds every limit as asked. What would have to give:</p>
<ul class="give">${
    choice.whatWouldHaveToGive.length === 0
      ? html`<li>Nothing was found that would do: see the steppers excluded, with their reasons.</li>`
      : choice.whatWouldHaveToGive.map((line) => html`<li>${withWords(line)}</li>`)
  }</ul>`;
}

function bandWords({ band, stepSeconds, tolerance }: RankedStepper): string {
  if (band === null) return "";
  const range =
    tolerance !== null
      ? `tolerances ${formatNumber(band.from)} to ${formatNumber(band.to)}`
      : stepSeconds === null
        ? `${formatNumber(band.from, 4)} to ${formatNumber(band.to, 4)} steps per orbit`
        : `steps of ${formatNumber(band.from, 5)} to ${formatNumber(band.to, 5)} s`;
  return `Verified in full over ${range}, with ${plural(band.cellsRun, "run")}.`;
}

/** How near the step is to the first failure. */
export function edgeWords({ cliff, stepsPerOrbit }: RankedStepper): string {
  if (cliff === null || cliff.reason === "not searched") return "";
  const knob = knobWords({
    ...cliff,
    stepsPerOrbit: stepsPerOrbit === null ? null : stepsPerOrbit / cliff.ratio,
  });
  return cliff.reason === "capped"
    ? `Every limit still holds at ${knob}, the coarsest that was allowed.`
    : `Every limit still holds at ${knob}, ${formatTimes(cliff.ratio)} times the recommendation, and one breaks beyond.`;
}

function runnerUpWords(choice: Choice, chosen: RankedStepper): string {
  const next = choice.ranking.find((ranked) => ranked !== chosen);
  if (next === undefined) return "No other stepper qualifies.";
  const extrapolated = next.evidence === "extrapolated" ? ", extrapolated from short runs" : "";
  return `Runner-up: ${next.stepper} with ${knobWords(next)}, at ${formatTimes(next.evaluationsTotal / chosen.evaluationsTotal)} times the cost${extrapolated}.`;
}
