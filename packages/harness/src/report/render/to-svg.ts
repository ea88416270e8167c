import { parse, resetSVGDefIds, type Spec, View } from "vega";
import { compile, type TopLevelSpec } from "vega-lite";
import type { Chart } from "../chart.ts";
import { HOVER_MARKS } from "../charts/hover-marks.ts";
import { escapeText } from "../text/html.ts";
import { useFontWidths } from "./text-widths.ts";

interface Logger {
  readonly level: () => Logger;
  readonly error: (...messages: readonly unknown[]) => Logger;
  readonly warn: (...messages: readonly unknown[]) => Logger;
  readonly info: () => Logger;
  readonly debug: () => Logger;
}

/** The chart language of the specification, compiled to that of the runtime. Warnings of the compiler are errors here. */
export function compileSpec(spec: TopLevelSpec): Spec {
  const warnings: string[] = [];
  const logger: Logger = {
    level: () => logger,
    error: (...messages) => logger.warn(...messages),
    warn: (...messages) => {
      warnings.push(messages.join(" "));
      return logger;
    },
    info: () => logger,
    debug: () => logger,
  };
  const compiled = compile(spec, { logger: logger as never }).spec;
  if (warnings.length > 0) throw new Error(`chart specification: ${warnings.join("; ")}`);
  return compiled;
}

/** The chart as a drawing that stands alone, with its title and text alternative as the drawing's own. */
export async function toSvg(chart: Chart): Promise<string> {
  const svg = await drawSpec(compileSpec(withoutLayers(chart.spec, [HOVER_MARKS])), chart.name);
  return svg.replace(
    /^<svg([^>]*)>/,
    (_, attributes: string) =>
      `<svg${attributes} role="img"><title>${escapeText(chart.title)}</title><desc>${escapeText(chart.description)}</desc>`,
  );
}

/** The specification without the layers of these names. */
export function withoutLayers(spec: TopLevelSpec, names: readonly string[]): TopLevelSpec {
  if (!("layer" in spec)) return spec;
  return { ...spec, layer: spec.layer.filter(({ name }) => name === undefined || !names.includes(name)) };
}

/** Draw a compiled chart; ids inside start with `name`, so that several drawings fit on one page. The same input gives the same bytes. */
export async function drawSpec(spec: Spec, name: string): Promise<string> {
  useFontWidths();
  resetSVGDefIds();
  const view = new View(parse(spec), { renderer: "none" });
  const svg = await view.toSVG();
  view.finalize();
  // A hundredth of a pixel is not seen; digits beyond differ between engines and make a third of the file. Only inside tags: text stays.
  const rounded = svg.replace(/<[^>]+>/g, (tag) =>
    tag.replace(/-?\d+\.\d{3,}(?:e-?\d+)?/g, (number) => String(Number(Number(number).toFixed(2)))),
  );
  return rounded.replace(/(\bid="|url\(#)(?=[a-z]+_?\d)/g, `$1${name}-`);
}
