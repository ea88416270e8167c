import type { ChoiceEvidence } from "../evidence.ts";
import { html, type Markup } from "../text/html.ts";
import { formatCount, formatNumber } from "../text/number.ts";
import { commandCode } from "../text/whole-words.ts";
import { durationWords, plural } from "../text/words.ts";

/** How the numbers came about, for the reader who has to defend them. */
export function method(evidence: ChoiceEvidence): Markup {
  const { choice, survey } = evidence;
  const { scenario, provenance } = choice;
  const designFactor = formatNumber(scenario.designFactor ?? 2);
  return html`<section aria-labelledby="method"><h2 id="method">Method</h2>
<p>Every stepper integrates the two-body problem, whose exact solution is known. Errors are numerical minus exact at the same time, taken at every step over ${durationWords(scenario)}, for ${
    scenario.orbits.length === 1 ? "the orbit" : `all ${formatCount(scenario.orbits.length)} orbits`
  } of the scenario, eccentricities sampled over their ranges with both ends, and ${startWords(scenario.start)}. The exact orbit is the one through the rounded start, carried in twice the working precision.</p>
<p>A recommended step keeps every error below its limit divided by ${designFactor}, the design factor, over a whole band of finer steps and offsets from whole numbers of steps per orbit, run in full: one step that happens to hold proves nothing. The edge is the coarsest step at which the limits themselves still hold. Steppers are ranked by force evaluations, which do not depend on a machine: ${formatCount(provenance.cellsRun)} runs in all.</p>
<p>The charts against eccentricity use runs of ${plural(survey.orbits, "orbit")} at about ${formatCount(survey.evaluationsPerOrbit)} force evaluations per orbit for each stepper that can be set to it; those against steps per orbit are at eccentricity ${formatNumber(survey.eccentricity)}. Phase is the polar angle in rad; energy is relative to its start; period is the time between periapsis passages relative to the exact one.</p></section>`;
}

function startWords(start: ChoiceEvidence["choice"]["scenario"]["start"]): string {
  if (start === undefined || start === "any") return "starts all round the orbit, the worst of which counts";
  return typeof start === "number"
    ? `a start at true anomaly ${formatNumber(start)}°`
    : `a start at ${start}`;
}

export function cautions(evidence: ChoiceEvidence): Markup {
  return html`<section aria-labelledby="cautions"><h2 id="cautions">Cautions</h2>
<ul>${[...new Set([...evidence.choice.cautions, ...STANDING])].map((line) => html`<li>${line}</li>`)}</ul></section>`;
}

/** Said on every page, beside what is particular to the result. */
const STANDING: readonly string[] = [
  "Run the chosen stepper and step on the production force model before relying on it, and compare a run with half the step.",
];

export function provenance(evidence: ChoiceEvidence): Markup {
  const { version, node, command, seed, digest, cellsRun, seconds } = evidence.choice.provenance;
  const row = (term: string, words: Markup): Markup => html`<div><dt>${term}</dt><dd>${words}</dd></div>`;
  return html`<section aria-labelledby="provenance"><h2 id="provenance">Provenance</h2>
<dl class="facts-list">
${row("perigauge", html`${version}`)}
${row("Node.js", html`${node}`)}
${row("command", commandCode(command))}
${row("seed", html`<code>${String(seed)}</code>`)}
${row("digest of the result", html`<code>${digest}</code>`)}
${row("runs", html`${formatCount(cellsRun)}`)}
${row("time", html`${formatNumber(seconds.total)} s: screening ${formatNumber(seconds.screening)} s, search ${formatNumber(seconds.search)} s, verification ${formatNumber(seconds.verification)} s`)}
</dl>
<p class="soft">Each chart also stands in the folder <code>charts</code> beside this page, as a specification, an SVG drawing and a PNG picture.</p></section>`;
}
