import { html, type Markup, trusted } from "../text/html.ts";

export interface Column {
  readonly heading: string;
  readonly number?: boolean;
}

/**
 * A table that becomes a list of cards on a narrow screen. The roles are written out because that change of display would take them away
 * from assistive technology.
 */
export function table(
  caption: string,
  columns: readonly Column[],
  rows: readonly (readonly Markup[])[],
  marked = -1,
): Markup {
  return html`<table role="table"><caption>${caption}</caption>
<thead role="rowgroup"><tr role="row">${columns.map(
    (column) => html`<th role="columnheader" scope="col"${numberClass(column)}>${column.heading}</th>`,
  )}</tr></thead>
<tbody role="rowgroup">${rows.map(
    (cells, index) => html`<tr role="row"${trusted(index === marked ? ' class="marked"' : "")}>${cells.map(
      (cell, place) => {
        const column = columns[place];
        if (column === undefined) return null;
        return place === 0
          ? html`<th role="rowheader" scope="row"${numberClass(column)}>${cell}</th>`
          : html`<td role="cell"${numberClass(column)}${trusted(cell.markup === "" ? ' data-empty=""' : "")} data-heading="${column.heading}">${cell}</td>`;
      },
    )}</tr>
`,
  )}</tbody></table>`;
}

function numberClass(column: Column): Markup {
  return trusted(column.number === true ? ' class="number"' : "");
}
