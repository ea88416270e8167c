import { describe, expect, it } from "vitest";
import { packTable } from "../../src/report/page/pack-table.ts";

describe("tables of the page", () => {
  it("name repeated texts by place and keep other columns as they are", () => {
    expect(
      packTable([
        { stepper: "rk4", error: 1e-9, note: null },
        { stepper: "leapfrog", error: null, note: "x" },
        { stepper: "rk4", error: 2, note: "y" },
      ]),
    ).toEqual({
      rows: 3,
      columns: { stepper: [0, 1, 0], error: [1e-9, null, 2], note: [null, "x", "y"] },
      texts: { stepper: ["rk4", "leapfrog"] },
    });
  });

  it("take rows of different shapes", () => {
    expect(packTable([{ a: 1 }, { b: "z" }]).columns).toEqual({ a: [1, null], b: [null, "z"] });
    expect(packTable([]).rows).toBe(0);
  });
});
