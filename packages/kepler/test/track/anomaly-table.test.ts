import { ddOf, solveKepler } from "@perigauge/kepler";
import { expect, test } from "vitest";
import { buildAnomalyTable, cellShift, cellSize } from "../../src/track/anomaly-table.ts";

const bits = new Float64Array(1);
const words = new Uint32Array(bits.buffer);

/** Lower bound of a cell, in turns. */
function boundOf(cell: number, offset: number): number {
  words[0] = 0;
  words[1] = cell * 2 ** cellShift;
  return Math.min(0.5, Math.max(0, bits[0]! - offset));
}

test("no cell leaves more than the correction about its node is made for, from e = 0 to 1 - 1e-15", () => {
  let [widest, bend, twist] = [0, 0, 0];
  for (let i = 0; i <= 60; i++) {
    const e = 1 - 10 ** ((-15 * i) / 60);
    const { rows, firstCell, offset } = buildAnomalyTable(ddOf(e));
    for (let k = 0; k < rows.length / cellSize; k++) {
      const [, , cos, sin, , , , inverse] = rows.subarray(k * cellSize, (k + 1) * cellSize);
      const angle = Math.atan2(sin!, cos!);
      const node = angle < 0 ? angle + 2 * Math.PI : angle;
      for (const edge of [boundOf(firstCell + k, offset), boundOf(firstCell + k + 1, offset)]) {
        const delta = solveKepler(e, 2 * Math.PI * edge) - node;
        widest = Math.max(widest, Math.abs(delta));
        bend = Math.max(bend, Math.abs(e * sin! * inverse! * delta));
        twist = Math.max(twist, Math.abs(e * cos! * inverse! * delta * delta));
      }
    }
  }
  expect(widest).toBeGreaterThan(0.01);
  expect(widest).toBeLessThan(0.03);
  expect(bend).toBeLessThan(0.02);
  expect(twist).toBeLessThan(3e-4);
});

test("memory: 128 cells an octave of 64 bytes, less than 140 kB at e = 0.999", () => {
  expect(buildAnomalyTable(ddOf(0)).rows.byteLength).toBeLessThan(16_000);
  expect(buildAnomalyTable(ddOf(0.9)).rows.byteLength).toBeLessThan(55_000);
  expect(buildAnomalyTable(ddOf(0.999)).rows.byteLength).toBeLessThan(140_000);
});
