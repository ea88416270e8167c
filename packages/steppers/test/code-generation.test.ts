import { afterEach, expect, it, vi } from "vitest";
import { findStepper, type interpret, type ProgramStepper, pointMass, supply } from "../src/index.ts";
import { compile } from "../src/program/compile.ts";
import { periapsis } from "./support/runs.ts";

afterEach(() => vi.unstubAllGlobals());

const { step } = (findStepper("leapfrog") as ProgramStepper).program({
  dimension: 2,
  summation: "plain",
  force: pointMass,
});
const run = (advance: ReturnType<typeof interpret>["advance"]): number[] => {
  const rows = new Float64Array(40);
  advance(10, 0.1, periapsis(0.2), rows, new Float64Array(0), supply(2));
  return [...rows];
};

it("a host that forbids code generation gets the interpreter, and the same bits", () => {
  const usual = run(compile(step).advance);
  vi.stubGlobal("Function", function refuse(): never {
    throw new EvalError("code generation from strings disallowed for this context");
  });
  expect(run(compile(step).advance)).toEqual(usual);
});

it("any other fault of compilation is not hidden", () => {
  vi.stubGlobal("Function", function refuse(): never {
    throw new SyntaxError("unexpected token");
  });
  expect(() => compile(step)).toThrow(SyntaxError);
});
