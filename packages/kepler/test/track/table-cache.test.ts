import { orbitThrough, periapsisState, referenceTrack } from "@perigauge/kepler";
import { expect, test } from "vitest";
import { anomalyTable, tableBytes } from "../../src/track/table-cache.ts";

test("tracks of equal eccentricity share a table", () => {
  const { eccentricity } = orbitThrough(periapsisState(0.31));
  expect(anomalyTable(eccentricity)).toBe(anomalyTable({ ...eccentricity }));
});

test("memory stays bounded however many eccentricities pass, and old tracks keep working", () => {
  const first = referenceTrack(orbitThrough(periapsisState(0.2)));
  const before = new Float64Array(4);
  first.stateAt(1, 0, before);
  for (let k = 0; k < 300; k++) referenceTrack(orbitThrough(periapsisState(0.99 + k * 3e-5)));
  expect(tableBytes()).toBeGreaterThan(8 * 1024 * 1024);
  expect(tableBytes()).toBeLessThanOrEqual(16 * 1024 * 1024);
  const after = new Float64Array(4);
  first.stateAt(1, 0, after);
  expect([...after]).toEqual([...before]);
});
