import { mkdir, writeFile } from "node:fs/promises";
import { join } from "node:path";
import type { Chart } from "./chart.ts";
import { describeCharts } from "./describe-charts.ts";
import type { ChoiceEvidence } from "./evidence.ts";
import { asStored } from "./evidence-schema.ts";
import { drawingSpec } from "./page/figures.ts";
import { renderPage } from "./page/render-page.ts";
import { toPng } from "./render/to-png.ts";
import { compileSpec, drawSpec, toSvg } from "./render/to-svg.ts";

/**
 * Write `report.html` and `charts/NAME.vl.json`, `.svg` and `.png` into a folder that exists, with further files (name to content) beside them.
 * The same evidence gives the same bytes.
 */
export async function writeReport(
  directory: string,
  given: ChoiceEvidence,
  extraFiles: Readonly<Record<string, string | Uint8Array>> = {},
): Promise<void> {
  // What cannot be stored is not drawn: the same picture comes out of the file later.
  const evidence = asStored(given);
  const charts = describeCharts(evidence);
  const folder = join(directory, "charts");
  await mkdir(folder, { recursive: true });
  const pictures: Promise<void>[] = [];
  const drawings = new Map<string, string>();
  for (const chart of charts) {
    drawings.set(chart.name, await drawSpec(compileSpec(drawingSpec(chart.spec)), chart.name));
    pictures.push(writeChart(folder, chart, await toSvg(chart)));
  }
  await writeFile(join(directory, "report.html"), renderPage(evidence, charts, drawings));
  await Promise.all(pictures);
  for (const [name, content] of Object.entries(extraFiles)) await writeFile(join(directory, name), content);
}

async function writeChart(folder: string, chart: Chart, svg: string): Promise<void> {
  await writeFile(join(folder, `${chart.name}.vl.json`), `${JSON.stringify(chart.spec, null, 1)}\n`);
  await writeFile(join(folder, `${chart.name}.svg`), `${svg}\n`);
  await writeFile(join(folder, `${chart.name}.png`), await toPng(svg));
}
