import { describe, expect, it } from "vitest";
import { catalogue, type ProgramStepper } from "../src/index.ts";
import { force } from "./support/interpret-double-double.ts";
import { observedOrder } from "./support/observed-order.ts";

const programs = catalogue.filter((stepper): stepper is ProgramStepper => "program" in stepper);
const slow = new Set(["multistep", "time-transformed"]);

describe("observed order on a Kepler arc, in double-double arithmetic", () => {
  it.each(programs.map((stepper) => [stepper.id, stepper] as const))("%s", (id, stepper) => {
    const program = stepper.program({ dimension: 2, summation: "plain", force });
    const coarse = stepper.order >= 10 ? 24 : 128;
    // Where the next term of the error is only one power of h away and large, slopes near their limit like h: one step of extrapolation.
    const slopes = slow.has(stepper.family)
      ? [observedOrder(program, 256), observedOrder(program, 512)]
      : [observedOrder(program, coarse)];
    const last = slopes.at(-1)!;
    const order = slopes.length === 1 ? last.order : 2 * last.order - slopes[0]!.order;
    expect(last.error, "above the rounding floor").toBeGreaterThan(5e-30);
    expect(Math.abs(order - stepper.order), `${id}: ${order}`).toBeLessThan(0.15);
  });
});
