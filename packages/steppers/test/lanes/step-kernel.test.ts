import { describe, expect, it } from "vitest";
import {
  catalogue,
  laneMemory,
  type ProgramStepper,
  pointMass,
  stepKernel,
  suppliedForce,
} from "../../src/index.ts";
import { bits, mixedStarts, runInterpreted, runLanes } from "./support.ts";

const steppers = catalogue.filter((stepper): stepper is ProgramStepper => "program" in stepper);
const STEPS = 6;

describe("steps in vector lanes", () => {
  it.each(steppers.map((stepper) => [stepper.id, stepper] as const))(
    "%s: the interpreter's bits in every lane, whatever the neighbours hold",
    (_, stepper) => {
      for (const setting of [
        { dimension: 2, summation: "plain" },
        { dimension: 2, summation: "compensated" },
        { dimension: 3, summation: "plain" },
      ] as const) {
        const { start, step } = stepper.program({ ...setting, force: pointMass });
        const starts = mixedStarts(step, start);
        const lanes = runLanes(step, starts, STEPS);
        // Every lane holds another state; the interpreter is slow, so each setting looks at some of them, strange ones among them.
        const looked = setting.dimension === 2 ? [0, 3, 6, 7, 9, 12, 15] : [1, 6, 14];
        for (const lane of looked) {
          expect(bits(lanes[lane]!), `${setting.summation}, ${setting.dimension}D, lane ${lane}`).toEqual(
            bits(runInterpreted(step, starts[lane]!, STEPS)),
          );
        }
      }
    },
  );

  const rk4 = steppers.find(({ id }) => id === "rk4")!;
  const multistep = steppers.find(({ id }) => id === "gauss-jackson-8")!;

  it.each([rk4, multistep])("any number of lanes gives the same bits ($id)", (stepper) => {
    const { start, step } = stepper.program({ dimension: 2, summation: "plain", force: pointMass });
    const starts = mixedStarts(step, start);
    const all = runLanes(step, starts, 9);
    for (let count = 1; count < 16; count++) {
      const some = runLanes(step, starts.slice(0, count), 9);
      some.forEach((rows, lane) => {
        expect(bits(rows)).toEqual(bits(all[lane]!));
      });
    }
  });

  it("refuses a program that calls a force from outside", () => {
    const { step } = rk4.program({ dimension: 2, summation: "plain", force: suppliedForce });
    expect(() => stepKernel(step, laneMemory(65536))).toThrow("force");
  });
});
