import { html, type Markup } from "./html.ts";

/** A sentence whose hyphenated words (ids of steppers, mostly) stay on one line where there is room. */
export function wholeWords(text: string): Markup {
  const parts = text.split(/(\s+)/);
  return html`${parts.map((part) => (/\w-\w/.test(part) ? html`<span class="whole">${part}</span>` : part))}`;
}

/** A command that breaks before its options and not inside them. */
export function commandCode(command: string): Markup {
  const parts = command.split(/\s+(?=--)/);
  return html`<code>${parts.map((part, index) => html`${index === 0 ? "" : " "}<span>${part}</span>`)}</code>`;
}
