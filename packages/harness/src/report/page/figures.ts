import type { Spec } from "vega";
import type { TopLevelSpec } from "vega-lite";
import type { Chart, ChartSection } from "../chart.ts";
import { HOVER_MARKS, MUTED_MARKS } from "../charts/hover-marks.ts";
import type { Row } from "../charts/make-chart.ts";
import { withColourVariables } from "../look/palette.ts";
import { compileSpec, withoutLayers } from "../render/to-svg.ts";
import { html, type Markup } from "../text/html.ts";
import { wholeWords } from "../text/whole-words.ts";
import { type PackedTable, packTable } from "./pack-table.ts";

const SECTIONS: readonly {
  readonly section: ChartSection;
  readonly heading: string;
  readonly wide: boolean;
}[] = [
  { section: "cost", heading: "What does holding the limits cost?", wide: true },
  { section: "plane", heading: "Over which eccentricities and steps do the limits hold?", wide: false },
  { section: "duration", heading: "How do the errors grow over the duration?", wide: false },
  { section: "eccentricity", heading: "How do the errors grow with eccentricity?", wide: false },
  { section: "step", heading: "How do the errors fall with the step?", wide: false },
  { section: "orbit", heading: "Is the orbit resolved?", wide: true },
];

/** Charts by question. */
export function figures(charts: readonly Chart[], drawingOf: (name: string) => Markup): Markup[] {
  return SECTIONS.flatMap(({ section, heading, wide }) => {
    const own = charts.filter((chart) => chart.section === section);
    if (own.length === 0) return [];
    return [
      html`<h3>${heading}</h3><div class="figures${wide ? " wide" : ""}">${own.map((chart) => figure(chart, drawingOf(chart.name)))}</div>`,
    ];
  });
}

function figure(chart: Chart, drawing: Markup): Markup {
  const id = `chart-${chart.name}`;
  return html`<figure id="${id}"><h4 id="${id}-title">${wholeWords(chart.title)}</h4>
<div class="drawing" role="img" aria-labelledby="${id}-title" aria-describedby="${id}-text" data-chart="${chart.name}"><div aria-hidden="true">${drawing}</div></div>
${hasInput(chart) ? html`<div class="input" data-input="${chart.name}"></div>` : null}<figcaption id="${id}-text">${chart.description} ${chart.note}</figcaption></figure>
`;
}

/** Whether the chart has a value that the reader can set; the runtime puts the input where the figure leaves room for it. */
function hasInput({ spec }: Chart): boolean {
  return (spec.params ?? []).some((param) => "bind" in param && param.bind !== "legend");
}

/** What the page's script draws: compiled charts, whose data tables are pooled because several charts share one. */
export interface PageCharts {
  readonly charts: readonly { readonly name: string; readonly spec: Spec }[];
  readonly tables: readonly PackedTable[];
}

export function pageCharts(charts: readonly Chart[]): PageCharts {
  const tables: PackedTable[] = [];
  const places = new Map<string, number>();
  const pooled = charts.map((chart) => {
    const spec = JSON.parse(withColourVariables(JSON.stringify(compileSpec(pageSpec(chart.spec))))) as Spec;
    for (const data of spec.data ?? []) {
      if (!("values" in data)) continue;
      const key = JSON.stringify(data.values);
      const place = places.get(key) ?? tables.push(packTable(data.values as readonly Row[])) - 1;
      places.set(key, place);
      Object.assign(data, { values: place });
    }
    return { name: chart.name, spec };
  });
  return { charts: pooled, tables };
}

/** On the page a chart's title is a heading and the steppers' legend stands above all charts. */
export function pageSpec(spec: TopLevelSpec): TopLevelSpec {
  const { title: _title, ...rest } = spec;
  return {
    ...rest,
    config: { ...spec.config, legend: { ...spec.config?.legend, disable: true } },
  } as TopLevelSpec;
}

/** The same without the marks that only carry tooltips. */
export function drawingSpec(spec: TopLevelSpec): TopLevelSpec {
  return withoutLayers(pageSpec(spec), [HOVER_MARKS, MUTED_MARKS]);
}
