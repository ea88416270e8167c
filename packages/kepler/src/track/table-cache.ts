import type { DoubleDouble } from "../arithmetic/double-double.ts";
import { type AnomalyTable, buildAnomalyTable } from "./anomaly-table.ts";

/** Memory of all tables kept, in bytes. */
const largestTotal = 16 * 1024 * 1024;

const tables: Map<string, AnomalyTable> = new Map();
let total = 0;

/**
 * The table of an eccentricity, shared by all tracks with the same e (both words equal). Tables stay while their total is within 16
 * MB (about 150 at e = 0.9); beyond, the one unused for longest is dropped. A track keeps its own table alive.
 */
export function anomalyTable(eccentricity: DoubleDouble): AnomalyTable {
  const key = `${eccentricity.hi} ${eccentricity.lo}`;
  let table = tables.get(key);
  if (table === undefined) {
    table = buildAnomalyTable(eccentricity);
    total += table.rows.byteLength;
  } else {
    tables.delete(key);
  }
  tables.set(key, table);
  for (const [oldest, old] of tables) {
    if (total <= largestTotal || old === table) break;
    tables.delete(oldest);
    total -= old.rows.byteLength;
  }
  return table;
}

/** Bytes of the tables kept at present. */
export function tableBytes(): number {
  return total;
}
