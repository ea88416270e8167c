import { readFileSync } from "node:fs";
import { expect, it } from "vitest";
import * as steppers from "../src/index.ts";

it("the README's example runs and prints what its comment says", () => {
  const readme = readFileSync(new URL("../README.md", import.meta.url), "utf8");
  const code = /```ts\n([\s\S]*?)```/.exec(readme)![1]!;
  const body = code.replace(/^import .*$/m, "").replaceAll("!.", ".");
  const printed: unknown[][] = [];
  const log = { log: (...values: unknown[]) => printed.push(values) };
  new Function("findStepper", "console", body)(steppers.findStepper, log);
  const [x, y, evaluations] = printed[0] as [number, number, number];
  expect(x.toFixed(5)).toBe("0.39657");
  expect(y.toFixed(5)).toBe("-0.06618");
  expect(evaluations).toBe(3400);
  expect(code).toContain("0.39657..., -0.06618..., 3400");
});
