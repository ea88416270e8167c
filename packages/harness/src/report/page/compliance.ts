import type { Choice, LimitErrors, RankedStepper } from "../../choose/choice.ts";
import { html, type Markup } from "../text/html.ts";
import { formatCount, formatNumber, formatTimes } from "../text/number.ts";
import { commandCode } from "../text/whole-words.ts";
import { limitValue, limitWords } from "../text/words.ts";
import { type Column, table } from "./table.ts";
import { worstCellWords } from "./worst-cell.ts";

const COLUMNS: readonly Column[] = [
  { heading: "requirement" },
  { heading: "limit", number: true },
  { heading: "result", number: true },
  { heading: "factor", number: true },
  { heading: "share of the limit" },
  { heading: "worst case, and the command that measures it again" },
];

/** Each requirement against what was found, with the worst case and its command. */
export function complianceTable(choice: Choice, subject: RankedStepper, caption: string): Markup {
  return table(caption, COLUMNS, [
    ...limitRows(subject.errors, choice.scenario.designFactor ?? 2),
    ...requirementRows(choice, subject),
  ]);
}

function limitRows(errors: LimitErrors, designFactor: number): Markup[][] {
  return Object.entries(errors).map(([key, error]) => [
    html`${limitWords(key)}`,
    html`${limitValue(key, error.limit)}`,
    html`${error.value === null ? "diverged or not defined" : limitValue(key, error.value)}${uncertainty(error)}`,
    factorCell(error.value === 0 ? Number.POSITIVE_INFINITY : error.factor),
    gauge(error.value === 0 ? Number.POSITIVE_INFINITY : error.factor, designFactor),
    html`${worstCellWords(error)}<br>${commandCode(error.command)}`,
  ]);
}

/** An extrapolated value says by how much theory allows it to be exceeded. */
function uncertainty({ uncertaintyFactor }: LimitErrors[string]): Markup | null {
  return uncertaintyFactor > 1.005
    ? html`<span class="title">extrapolated, up to ${formatTimes(uncertaintyFactor)} times larger</span>`
    : null;
}

/** What the scenario asks beside errors, where the result can be read off the stepper. */
function requirementRows(choice: Choice, subject: RankedStepper): Markup[][] {
  const { step, require } = choice.scenario;
  const rows: Markup[][] = [];
  const add = (words: string, limit: string, result: string, factor: Markup): void => {
    rows.push([html`${words}`, html`${limit}`, html`${result}`, factor, html``, html``]);
  };
  if (step?.maxSeconds !== undefined && subject.stepSeconds !== null) {
    add(
      "step at most",
      `${formatNumber(step.maxSeconds, 5)} s`,
      `${formatNumber(subject.stepSeconds, 5)} s`,
      factorCell(step.maxSeconds / subject.stepSeconds),
    );
  }
  if (step?.multipleOfSeconds !== undefined && subject.stepSeconds !== null) {
    const times = subject.stepSeconds / step.multipleOfSeconds;
    const whole = Math.abs(times - Math.round(times)) < 1e-9;
    add(
      "step a whole multiple of",
      `${formatNumber(step.multipleOfSeconds, 5)} s`,
      `${formatNumber(times, 5)} times`,
      yesNo(whole),
    );
  }
  if (require?.evaluationsPerOrbit !== undefined) {
    const allowed = require.evaluationsPerOrbit;
    add(
      "force evaluations per orbit",
      formatCount(allowed),
      formatCount(subject.evaluationsPerOrbit),
      factorCell(allowed / subject.evaluationsPerOrbit),
    );
  }
  if (require?.fixedStep === true) {
    const fixed = subject.stepSeconds !== null;
    add("fixed step", "required", fixed ? "fixed" : "variable", yesNo(fixed));
  }
  if (require?.symplectic === true) {
    add(
      "symplectic",
      "required",
      subject.symplectic ? "symplectic" : "not symplectic",
      yesNo(subject.symplectic),
    );
  }
  return rows;
}

function factorCell(factor: number): Markup {
  return html`<span class="${factor >= 1 ? "holds" : "fails"}">${Number.isFinite(factor) ? formatTimes(factor) : "no error"} ${
    factor >= 1 ? "✓" : "✗"
  }<span class="unseen">${factor >= 1 ? " holds" : " fails"}</span></span>`;
}

function yesNo(holds: boolean): Markup {
  return html`<span class="${holds ? "holds" : "fails"}">${holds ? "✓" : "✗"}<span class="unseen">${holds ? " holds" : " fails"}</span></span>`;
}

/** Error as a share of its limit: the whole length is the limit, the stroke the design line. */
function gauge(factor: number, designFactor: number): Markup {
  const share = factor > 0 ? 1 / factor : Number.POSITIVE_INFINITY;
  const words = Number.isFinite(share) ? `${formatNumber(100 * share, 2)} %` : "over";
  return html`<span class="gauge${share > 1 ? " over" : ""}"><svg viewBox="0 0 100 10" preserveAspectRatio="none" aria-hidden="true"><rect class="track" width="100" height="10"/><rect class="fill" width="${Number(
    Math.min(100, 100 * share).toFixed(2),
  )}" height="10"/><rect class="design" x="${Number((100 / designFactor).toFixed(2))}" width="1" height="10"/></svg>${words}</span>`;
}
