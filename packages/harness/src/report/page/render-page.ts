import { createHash } from "node:crypto";
import { readFileSync } from "node:fs";
import type { Chart } from "../chart.ts";
import type { ChoiceEvidence } from "../evidence.ts";
import { withColourVariables } from "../look/palette.ts";
import { chooseLooks } from "../look/stepper-look.ts";
import { runtimeFile } from "../render/font-files.ts";
import { html, jsonBlock, type Markup, trusted } from "../text/html.ts";
import { knobWords } from "../text/words.ts";
import { complianceTable } from "./compliance.ts";
import { figures, pageCharts } from "./figures.ts";
import { legend } from "./legend.ts";
import { cautions, method, provenance } from "./method.ts";
import { excluded, ranking } from "./ranking.ts";
import { pageScript } from "./script.ts";
import { pageStyle } from "./style.ts";
import { today } from "./today.ts";
import { chosenOf, verdict } from "./verdict.ts";
import { handOver, whatIf } from "./what-if.ts";

/** Drawings made beforehand, by chart name: what the page shows until its script has drawn, in print without scripts, or if it cannot run. */
export type Drawings = ReadonlyMap<string, string>;

/**
 * The whole report as one page that needs nothing else: runtime, data, style and drawings are inside, and its policy forbids the browser any
 * request. Text from the scenario is escaped; only the two scripts written here may run.
 */
export function renderPage(
  evidence: ChoiceEvidence,
  charts: readonly Chart[],
  drawings: Drawings = new Map(),
): string {
  const { choice } = evidence;
  const runtime = inlineScript(
    readFileSync(runtimeFile, "utf8").replace(/\n?\/\/# sourceMappingURL=.*\s*$/, "\n"),
  );
  const script = inlineScript(pageScript);
  const policy = `default-src 'none'; style-src 'unsafe-inline'; img-src data:; script-src '${runtime.hash}' '${script.hash}' 'unsafe-eval'; base-uri 'none'; form-action 'none'`;
  return html`${trusted("<!doctype html>")}
<html lang="en"><head><meta charset="utf-8"><meta http-equiv="Content-Security-Policy" content="${trusted(policy)}">
<meta name="viewport" content="width=device-width,initial-scale=1"><meta name="color-scheme" content="light dark">
<title>${titleOf(evidence)}</title><link rel="icon" href="data:,"><style>${trusted(pageStyle)}</style></head>
<body><a class="skip" href="#charts">Skip to the charts</a><main>
${verdict(choice)}
${contents(evidence)}
${today(choice)}
${compliance(evidence)}
${ranking(choice)}
${excluded(choice)}
${whatIf(choice)}
<section aria-labelledby="charts"><h2 id="charts">Charts</h2>
${legend(chooseLooks(evidence))}
${figures(charts, (name) => trusted(withColourVariables(drawings.get(name) ?? "")))}</section>
${handOver(choice)}
${method(evidence)}
${cautions(evidence)}
${provenance(evidence)}
<div id="tip" hidden></div></main>
<script type="application/json" id="charts-data">${jsonBlock(pageCharts(charts))}</script>
<script>${runtime.code}</script>
<script>${script.code}</script>
</body></html>
`.markup;
}

function titleOf({ choice }: ChoiceEvidence): string {
  const chosen = chosenOf(choice);
  const answer = chosen === null ? "no stepper qualifies" : `${chosen.stepper}, ${knobWords(chosen)}`;
  return `${choice.scenario.title}: ${answer}`;
}

function compliance({ choice }: ChoiceEvidence): Markup | null {
  const chosen = chosenOf(choice);
  if (chosen === null) return null;
  return html`<section aria-labelledby="compliance"><h2 id="compliance">Compliance</h2>
${complianceTable(choice, chosen, `${chosen.stepper} with ${knobWords(chosen)} against each requirement; the stroke in a gauge is the design line`)}</section>`;
}

function contents({ choice }: ChoiceEvidence): Markup {
  const entries: [string, string][] = [
    ...(choice.current === null ? [] : [["today", "Today’s choice"] as [string, string]]),
    ...(choice.choice === null ? [] : [["compliance", "Compliance"] as [string, string]]),
    ["ranking", "Ranking"],
    ...(choice.excluded.length === 0 ? [] : [["excluded", "Excluded"] as [string, string]]),
    ...(choice.sensitivity.length === 0 ? [] : [["what-if", "What if"] as [string, string]]),
    ["charts", "Charts"],
    ...(choice.handOver === null && choice.bodies === null
      ? []
      : [["hand-over", "Hand-over"] as [string, string]]),
    ["method", "Method"],
    ["cautions", "Cautions"],
    ["provenance", "Provenance"],
  ];
  return html`<nav class="contents" aria-label="On this page"><ul>${entries.map(
    ([id, words]) => html`<li><a href="#${id}">${words}</a></li>`,
  )}</ul></nav>`;
}

/** A script as it stands in the page, with the hash by which the policy lets it run. */
function inlineScript(source: string): { readonly code: Markup; readonly hash: string } {
  const code = source.replace(/<(?=\/script|!--)/gi, "\\x3c");
  return { code: trusted(code), hash: `sha256-${createHash("sha256").update(code).digest("base64")}` };
}
