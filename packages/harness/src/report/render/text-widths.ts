import { readFileSync } from "node:fs";
import * as vega from "vega";
import { AdvanceWidths } from "./advance-widths.ts";
import { boldFontFile, regularFontFile } from "./font-files.ts";

interface TextItem {
  readonly fontSize?: number;
  readonly fontWeight?: string | number;
  readonly limit?: number;
}

let measured = false;

/**
 * Let charts laid out in Node measure text with the bundled font. Without a canvas the runtime guesses 0.8 em a character, some 1.6 times
 * too wide, and drops labels that would fit.
 */
export function useFontWidths(): void {
  if (measured) return;
  const regular = new AdvanceWidths(readFileSync(regularFontFile));
  const bold = new AdvanceWidths(readFileSync(boldFontFile));
  // The runtime documents this replacement but its types leave it out.
  const { textMetrics } = vega as unknown as {
    textMetrics: { width: (item: TextItem, text: unknown) => number };
  };
  textMetrics.width = (item, text) => {
    const font = item.fontWeight === "bold" || Number(item.fontWeight) >= 600 ? bold : regular;
    const width = font.width(String(text ?? "").trim()) * (item.fontSize ?? 11);
    return item.limit !== undefined && item.limit > 0 ? Math.min(width, item.limit) : width;
  };
  measured = true;
}
