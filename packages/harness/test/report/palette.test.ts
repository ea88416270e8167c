import { describe, expect, it } from "vitest";
import { type ColourName, palette, withColourVariables } from "../../src/report/look/palette.ts";

/** Relative luminance and contrast ratio: WCAG 2.2, definitions. */
function luminance(hex: string): number {
  const [red, green, blue] = [1, 3, 5].map((place) => {
    const share = Number.parseInt(hex.slice(place, place + 2), 16) / 255;
    return share <= 0.04045 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * red! + 0.7152 * green! + 0.0722 * blue!;
}

function contrast(a: string, b: string): number {
  const [low, high] = [luminance(a), luminance(b)].sort((x, y) => x - y);
  return (high! + 0.05) / (low! + 0.05);
}

describe.each(["light", "dark"] as const)("palette, %s", (scheme) => {
  const of = (name: ColourName): string => palette[name][scheme];
  const names = Object.keys(palette) as ColourName[];

  it("has text at 4.5:1 (WCAG 2.2, 1.4.3)", () => {
    for (const name of ["ink", "soft", "limit", "stepper2"] as const) {
      expect(contrast(of(name), of("paper")), name).toBeGreaterThanOrEqual(4.5);
    }
  });

  it("has marks at 3:1 (WCAG 2.2, 1.4.11)", () => {
    for (const name of names.filter((candidate) => candidate.startsWith("stepper"))) {
      expect(contrast(of(name), of("paper")), name).toBeGreaterThanOrEqual(3);
    }
  });

  it("has heats that ink is readable on (WCAG 2.2, 1.4.3) and that run one way in lightness", () => {
    const heats = names.filter((candidate) => candidate.startsWith("heat")).map(of);
    expect(heats).toHaveLength(6);
    for (const heat of heats) expect(contrast(of("ink"), heat), heat).toBeGreaterThanOrEqual(4.5);
    const fromPaper = heats.map((heat) => contrast(of("paper"), heat));
    expect(fromPaper).toEqual([...fromPaper].sort((a, b) => a - b));
  });

  it("uses no colour twice", () => {
    expect(new Set(names.map(of)).size).toBe(names.length);
  });
});

it("puts variables in place of the palette's colours and leaves others", () => {
  expect(withColourVariables(`fill="${palette.ink.light}" stroke="#123456"`)).toBe(
    'fill="var(--ink)" stroke="#123456"',
  );
});
