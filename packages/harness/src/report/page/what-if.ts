import type { BodyErrors, Choice, HandOver } from "../../choose/choice.ts";
import { html, type Markup } from "../text/html.ts";
import { formatCount, formatNumber, formatTimes } from "../text/number.ts";
import { dayWords, knobWords } from "../text/words.ts";
import { type Column, table } from "./table.ts";
import { chosenOf } from "./verdict.ts";

const COLUMNS: readonly Column[] = [
  { heading: "change" },
  { heading: "cheapest stepper" },
  { heading: "step or tolerance", number: true },
  { heading: "evaluations per orbit", number: true },
  { heading: "against the choice", number: true },
];

/** How would the choice change with tighter limits, a longer duration or a higher eccentricity? */
export function whatIf(choice: Choice): Markup | null {
  if (choice.sensitivity.length === 0) return null;
  const chosen = chosenOf(choice);
  const rows = choice.sensitivity.map((entry) => [
    html`${entry.change}`,
    html`${entry.stepper ?? "none qualifies"}`,
    html`${knobWords(entry)}`,
    html`${entry.evaluationsPerOrbit === null ? "–" : formatCount(entry.evaluationsPerOrbit)}`,
    html`${
      chosen === null || entry.evaluationsPerOrbit === null
        ? "–"
        : `${formatTimes(entry.evaluationsPerOrbit / chosen.evaluationsPerOrbit)} ×`
    }`,
  ]);
  return html`<section aria-labelledby="what-if"><h2 id="what-if">What if the case changes?</h2>
${table("The cheapest stepper of a changed scenario, extrapolated from short runs and not verified", COLUMNS, rows)}</section>`;
}

/** What to repeat with the production code, and what should come out. */
export function handOver(choice: Choice): Markup | null {
  const chosen = chosenOf(choice);
  if (choice.handOver === null || chosen === null)
    return choice.bodies === null ? null : bodiesOnly(choice.bodies);
  const test = choice.handOver;
  return html`<section aria-labelledby="hand-over"><h2 id="hand-over">Hand-over test</h2>
<p>Repeat this with the production code switched to a point mass: ${cellWords(test)}, ${chosen.stepper}, ${dayWords(test.days)}.</p>
<ul>
<li>Run with ${formatNumber(test.stepSeconds, 5)} s and with half of it: at common times the two part by at most <b>${formatNumber(test.halfStepDifferenceKm)} km</b>.</li>
<li>Run forward, reverse the velocities and run back: the end lies <b>${formatNumber(test.closureKm)} km</b> from the start.</li>
</ul>
<p>Figures of the same size say that the production code steps like the stepper measured here; a power of ten between them has to be explained first.</p>
${choice.bodies === null ? null : bodyWords(choice.bodies)}</section>`;
}

function cellWords(test: HandOver): string {
  return `orbit ${test.orbit}, e = ${formatNumber(test.eccentricity, 5)}, start at ${formatNumber(test.startAnomalyDeg, 5)}°`;
}

function bodiesOnly(bodies: BodyErrors): Markup {
  return html`<section aria-labelledby="hand-over"><h2 id="hand-over">Both bodies</h2>${bodyWords(bodies)}</section>`;
}

function bodyWords(bodies: BodyErrors): Markup {
  return html`<p>About the barycentre, with a mass ratio of ${formatNumber(bodies.massRatio)}, the heavier body takes ${formatNumber(bodies.heavierShare)} of each position error of the relative orbit and the lighter ${formatNumber(bodies.lighterShare)}.</p>`;
}
