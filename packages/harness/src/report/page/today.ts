import type { Choice, CurrentChoice } from "../../choose/choice.ts";
import { html, type Markup } from "../text/html.ts";
import { formatNumber, formatTimes } from "../text/number.ts";
import { knobWords, limitWords } from "../text/words.ts";
import { complianceTable } from "./compliance.ts";

/** Is the integrator and step used today enough, by what factor, and what does switching save? */
export function today(choice: Choice): Markup | null {
  const { current } = choice;
  if (current === null) return null;
  return html`<section aria-labelledby="today"><h2 id="today">Is today’s choice enough?</h2>
<p class="answer"><b class="${current.enough ? "holds" : "fails"}">${current.enough ? "Yes" : "No"}.</b> ${current.stepper} with ${knobWords(current)} ${marginWords(current)}. ${costWords(choice, current)}</p>
${
  Object.keys(current.errors).length === 0
    ? null
    : html`<details><summary>Today’s choice against each requirement</summary>${complianceTable(choice, current, `${current.stepper} with ${knobWords(current)}, used today`)}</details>`
}</section>`;
}

function marginWords(current: CurrentChoice): string {
  const limit = current.bindingLimit === null ? "" : ` on ${limitWords(current.bindingLimit)}`;
  if (current.margin >= 1)
    return `holds every limit ${formatTimes(current.margin)} times over; the limit${limit} binds`;
  return current.margin > 0
    ? `exceeds the limit${limit} ${formatTimes(1 / current.margin)} times`
    : `does not stay in orbit, or its error${limit} is not defined`;
}

function costWords(choice: Choice, current: CurrentChoice): string {
  const ratio = current.costAgainstChoice;
  if (ratio === null || choice.choice === null) return "";
  return ratio >= 1
    ? `Switching to ${choice.choice} saves ${formatNumber(100 * (1 - 1 / ratio), 2)} % of the force evaluations.`
    : `Switching to ${choice.choice} takes ${formatTimes(1 / ratio)} times the force evaluations.`;
}
