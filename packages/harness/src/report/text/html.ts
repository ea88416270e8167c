/** Markup that is safe to insert as it stands. */
export interface Markup {
  readonly markup: string;
}

export type Insertion = Markup | string | number | null | readonly Insertion[];

/** Template tag: every inserted text is escaped, markup made by this tag is kept, lists are joined, null is nothing. */
export function html(parts: TemplateStringsArray, ...insertions: readonly Insertion[]): Markup {
  let markup = parts[0] ?? "";
  insertions.forEach((insertion, index) => {
    markup += insert(insertion) + (parts[index + 1] ?? "");
  });
  return { markup };
}

/** Text that is markup already: only for what this package writes itself. */
export function trusted(markup: string): Markup {
  return { markup };
}

export function escapeText(text: string): string {
  return text
    .replaceAll("&", "&amp;")
    .replaceAll("<", "&lt;")
    .replaceAll(">", "&gt;")
    .replaceAll('"', "&quot;")
    .replaceAll("'", "&#39;");
}

/** JSON for a data block: no character can end the block or open a comment in it. */
export function jsonBlock(value: unknown): Markup {
  return trusted(JSON.stringify(value).replaceAll("<", "\\u003c").replaceAll(">", "\\u003e"));
}

function insert(insertion: Insertion): string {
  if (insertion === null) return "";
  if (typeof insertion === "string") return escapeText(insertion);
  if (typeof insertion === "number") return String(insertion);
  if (isList(insertion)) return insertion.map(insert).join("");
  return insertion.markup;
}

function isList(insertion: Markup | readonly Insertion[]): insertion is readonly Insertion[] {
  return Array.isArray(insertion);
}
