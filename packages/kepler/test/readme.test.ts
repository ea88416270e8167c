import { readFileSync } from "node:fs";
import * as kepler from "@perigauge/kepler";
import { expect, test } from "vitest";

test("the example of the README prints what its comments say", () => {
  const readme = readFileSync(new URL("../README.md", import.meta.url), "utf8");
  const example = /```ts\n([\s\S]*?)```/.exec(readme)![1]!;
  const said = [...example.matchAll(/console\.log\(.*\); \/\/ (.*)/g)].map((match) => match[1]);
  const body = example.replace(/import (\{[^}]*\}) from "@perigauge\/kepler";/, "const $1 = kepler;");
  const printed: string[] = [];
  const log = (...values: unknown[]): void => {
    printed.push(values.join(" "));
  };
  new Function("kepler", "console", body)(kepler, { log });
  expect(said.length).toBe(2);
  expect(printed).toEqual(said);
});
