import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { LANES, type Operation, type Program } from "../../src/index.ts";
import { bits, type LaneStart, runInterpreted, runLanes } from "./support.ts";

const INPUTS = 6;
const STEPS = 3;

/** Doubles that break careless emitters, and ordinary ones. */
const value = fc.oneof(
  fc.double(),
  fc.double({ min: -4, max: 4 }),
  fc.constantFrom(0, -0, 1, -1, Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY),
  fc.constantFrom(Number.MIN_VALUE, -Number.MIN_VALUE, 2 ** -1022, 2 ** -540, Number.MAX_VALUE),
);

const binary = ["add", "sub", "mul", "div", "max", "less-equal"] as const;

interface Draft {
  readonly kind: number;
  readonly args: readonly [number, number, number];
  readonly constant: number;
  readonly stageEnd: boolean;
}

const draft: fc.Arbitrary<Draft> = fc.record({
  kind: fc.nat(11),
  args: fc.tuple(fc.nat(10_000), fc.nat(10_000), fc.nat(10_000)),
  constant: value,
  stageEnd: fc.boolean(),
});

/** A program of any shape: operations on any earlier ones, cuts and outputs anywhere. */
function programOf(drafts: readonly Draft[], outputs: readonly number[]): Program {
  const operations: Operation[] = [
    { kind: "step", args: [] },
    ...Array.from({ length: INPUTS }, (_, index): Operation => ({ kind: "variable", index, args: [] })),
  ];
  const stageEnds: number[] = [];
  for (const { kind, args, constant, stageEnd } of drafts) {
    const [a, b, c] = args.map((arg) => arg % operations.length) as [number, number, number];
    if (kind < binary.length) operations.push({ kind: binary[kind]!, args: [a, b] });
    else if (kind === 6) operations.push({ kind: "sqrt", args: [a] });
    else if (kind === 7) operations.push({ kind: "abs", args: [a] });
    else if (kind === 8) operations.push({ kind: "select", args: [a, b, c] });
    else if (kind === 9) operations.push({ kind: "constant", value: constant, tail: 0, args: [] });
    else operations.push({ kind: "mul", args: [a, b] });
    if (stageEnd) stageEnds.push(operations.length - 1);
  }
  return {
    dimension: 2,
    inputs: INPUTS,
    operations,
    outputs: outputs.map((output) => output % operations.length),
    stageEnds,
    time: null,
  };
}

describe("random programs in vector lanes", () => {
  it("give the interpreter's bits in every lane", () => {
    const lane = fc.record({
      step: value,
      variables: fc.array(value, { minLength: INPUTS, maxLength: INPUTS }),
    });
    fc.assert(
      fc.property(
        fc.array(draft, { minLength: 1, maxLength: 60 }),
        fc.array(fc.nat(10_000), { minLength: INPUTS, maxLength: INPUTS }),
        fc.array(lane, { minLength: 1, maxLength: LANES }),
        (drafts, outputs, lanes) => {
          const program = programOf(drafts, outputs);
          const starts: LaneStart[] = lanes.map(({ step, variables }) => ({
            step,
            variables: Float64Array.from(variables),
          }));
          runLanes(program, starts, STEPS).forEach((rows, i) => {
            expect(bits(rows)).toEqual(bits(runInterpreted(program, starts[i]!, STEPS)));
          });
        },
      ),
      { numRuns: 400, seed: 20240229 },
    );
  });
});
