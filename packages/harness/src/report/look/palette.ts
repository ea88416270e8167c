/**
 * Colours by purpose, on paper and in the dark. The light value of each is unlike every other, so that a page can put a variable in its
 * place. Text colours reach 4.5:1 and marks 3:1 against their paper; the eight stepper colours keep apart under the common forms of
 * colour blindness, and no chart relies on them alone: each stepper has a shape and a dash too.
 */
export const palette = {
  paper: { light: "#fcfbf8", dark: "#14181d" },
  ink: { light: "#1c2126", dark: "#eceae4" },
  soft: { light: "#555c64", dark: "#aab0b6" },
  rule: { light: "#e4e1d9", dark: "#2d343b" },
  others: { light: "#a09d94", dark: "#666e76" },
  limit: { light: "#a3142c", dark: "#ff8a92" },
  body: { light: "#d6d2c6", dark: "#3b444d" },
  heat0: { light: "#f1f3f2", dark: "#1d2329" },
  heat1: { light: "#e9e6d6", dark: "#2a2d2f" },
  heat2: { light: "#e5d6b4", dark: "#3c3730" },
  heat3: { light: "#e3bd8a", dark: "#54412e" },
  heat4: { light: "#de9e68", dark: "#6e4a2c" },
  heat5: { light: "#d4825a", dark: "#8a5029" },
  stepper0: { light: "#0b5fa5", dark: "#6db3f2" },
  stepper1: { light: "#b45309", dark: "#f0a04b" },
  stepper2: { light: "#00775b", dark: "#4cc9a0" },
  stepper3: { light: "#87479b", dark: "#cf9fe6" },
  stepper4: { light: "#857000", dark: "#dcc24a" },
  stepper5: { light: "#2a86b1", dark: "#86d3ee" },
  stepper6: { light: "#b34d7d", dark: "#f094bd" },
  stepper7: { light: "#4c5866", dark: "#bcc6d0" },
} as const satisfies Readonly<Record<string, { readonly light: string; readonly dark: string }>>;

export type ColourName = keyof typeof palette;

/** The light value: what files and specifications carry. */
export function colour(name: ColourName): string {
  return palette[name].light;
}

/** Custom properties of one scheme, for a style sheet. */
export function colourVariables(scheme: "light" | "dark"): string {
  return Object.entries(palette)
    .map(([name, value]) => `--${name}:${value[scheme]}`)
    .join(";");
}

const nameOfLight: ReadonlyMap<string, string> = new Map(
  Object.entries(palette).map(([name, value]) => [value.light, name]),
);

/** Put the page's variables in place of the light colours, in the text of a compiled chart or of a drawing. */
export function withColourVariables(text: string): string {
  return text.replace(/#[0-9a-f]{6}\b/g, (value) => {
    const name = nameOfLight.get(value);
    return name === undefined ? value : `var(--${name})`;
  });
}
