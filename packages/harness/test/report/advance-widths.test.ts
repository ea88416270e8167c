import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { AdvanceWidths } from "../../src/report/render/advance-widths.ts";
import { regularFontFile } from "../../src/report/render/font-files.ts";

describe("widths of text in the bundled font", () => {
  const widths = new AdvanceWidths(readFileSync(regularFontFile));

  // Advances of DejaVu Sans as its own AFM-style metrics give them, of 2048 units per em: space 651, digits 1303, M 1767, i 569.
  it.each([
    [" ", 651],
    ["0123456789", 13_030],
    ["M", 1767],
    ["i", 569],
  ])("%j", (text, units) => {
    expect(widths.width(text) * 2048).toBeCloseTo(units, 6);
  });

  it("knows the raised digits and signs that labels need", () => {
    const missing = widths.width("\uffff");
    for (const character of "⁰¹²³⁴⁵⁶⁷⁸⁹⁻×÷−–°\u202f") {
      expect(widths.width(character), character).toBeGreaterThan(0);
      expect(widths.width(character), character).not.toBe(missing);
    }
  });
});
