import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import { fileURLToPath } from "node:url";
import { Ajv, type ValidateFunction } from "ajv";
import { beforeAll, describe, expect, it } from "vitest";
import { describeCharts } from "../packages/harness/src/report/describe-charts.ts";
import { inventedEvidence } from "../packages/harness/test/report/invented-evidence.ts";

/** The schema that the chart language publishes with its compiler. */
const require = createRequire(fileURLToPath(new URL("../packages/harness/package.json", import.meta.url)));

describe("chart specifications", () => {
  let valid: ValidateFunction;
  beforeAll(() => {
    const schema = JSON.parse(readFileSync(require.resolve("vega-lite/vega-lite-schema.json"), "utf8"));
    const ajv = new Ajv({ strict: false, allowUnionTypes: true, validateFormats: false });
    valid = ajv.compile(schema);
  }, 60_000);

  it.each([
    ["seven steppers", {}],
    ["sixty steppers", { steppers: 60 }],
    ["none that qualifies", { qualifies: false }],
    ["a hostile id", { id: "</script><img onerror=alert(1)>" }],
  ])("follow the published schema: %s", (_, invention) => {
    for (const { name, spec } of describeCharts(inventedEvidence(invention))) {
      const plain: unknown = JSON.parse(JSON.stringify(spec));
      const holds = valid(plain);
      expect(holds, `${name}: ${JSON.stringify(valid.errors?.slice(0, 3))}`).toBe(true);
    }
  });

  it("are refused where they break it", () => {
    const [first] = describeCharts(inventedEvidence());
    expect(valid({ ...first!.spec, width: "wide" })).toBe(false);
  });
});
