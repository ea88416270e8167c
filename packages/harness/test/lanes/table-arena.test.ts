import { describe, expect, it } from "vitest";
import { TABLES_AT, TABLES_BYTES } from "../../src/lanes/memory-map.ts";
import { TableArena } from "../../src/lanes/table-arena.ts";

describe("tables in the lanes' memory", () => {
  it("each lies there once, and all are dropped where the next does not fit", () => {
    const doubles = new Float64Array((TABLES_AT + TABLES_BYTES) / 8);
    const arena = new TableArena(doubles);
    const third = TABLES_BYTES / 24;
    const tables = [1, 2, 3, 4].map((value) => new Float64Array(third - 8).fill(value));
    const places = tables.slice(0, 3).map((table) => arena.addressOf(table));
    expect(new Set(places).size).toBe(3);
    expect(arena.addressOf(tables[1] as Float64Array)).toBe(places[1]);
    expect(arena.generation).toBe(0);
    const place = arena.addressOf(tables[3] as Float64Array);
    expect(arena.generation).toBe(1);
    expect(place).toBe(TABLES_AT);
    expect(doubles[place / 8]).toBe(4);
    const again = arena.addressOf(tables[0] as Float64Array);
    expect(doubles[again / 8]).toBe(1);
    expect(arena.generation).toBe(1);
  });
});
