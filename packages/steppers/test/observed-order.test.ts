import { describe, expect, it } from "vitest";
import { catalogue, type ProgramStepper } from "../src/index.ts";
import { force } from "./support/interpret-double-double.ts";
import { observedOrder } from "./support/observed-order.ts";

const programs = catalogue.filter((stepper): stepper is ProgramStepper => "program" in stepper);

describe("observed order on a Kepler arc, in double-double arithmetic", () => {
  it.each(programs.map((stepper) => [stepper.id, stepper] as const))("%s", (id, stepper) => {
    const program = stepper.program({ dimension: 2, summation: "plain", force });
    const { order, error } = observedOrder(program, stepper.order >= 10 ? 24 : 128);
    expect(error, "above the rounding floor").toBeGreaterThan(1e-29);
    expect(Math.abs(order - stepper.order), `${id}: ${order}`).toBeLessThan(0.15);
  });
});
