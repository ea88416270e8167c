import { Decimal } from "decimal.js";
import { describe, expect, it } from "vitest";
import { one, rational } from "../src/exact/rational.ts";
import { pointMass } from "../src/index.ts";
import { ProgramBuilder } from "../src/program/builder.ts";
import { Accumulator } from "./support/double-double.ts";
import { exactPairs } from "./support/exact-arc.ts";
import { evaluateExactly, force, type Pairs, pairs } from "./support/interpret-double-double.ts";
import { runSteps } from "./support/observed-order.ts";
import { programStepper } from "./support/runs.ts";

/** v^2 / 2 - 1 / r as a program, so that it can be had in double-double arithmetic. */
const energyProgram = (() => {
  const b = new ProgramBuilder(2, 4, pointMass);
  const square = (first: number): number => {
    const [x, y] = b.vector(first);
    return b.add(b.mul(x!, x!), b.mul(y!, y!));
  };
  const half = b.mul(b.constant(rational(1n, 2n)), square(2));
  return b.finish([b.sub(half, b.div(b.constant(one), b.sqrt(square(0))))]);
})();

function energyOf(state: Pairs): [number, number] {
  const out = pairs(1);
  evaluateExactly(energyProgram, [0, 0], state, out);
  return [out.hi[0]!, out.lo[0]!];
}

/** Change of energy over the second orbit, divided by h^power. */
function driftConstant(id: string, e: string, power: number, stepsPerOrbit: number): number {
  const program = programStepper(id).program({ dimension: 2, summation: "plain", force });
  const accumulator = new Accumulator();
  accumulator.div(2 * Math.PI, 2.4492935982947064e-16, stepsPerOrbit, 0);
  const h: [number, number] = [accumulator.hi, accumulator.lo];
  const start = exactPairs(e, new Decimal(0));
  const [first, second] = [1, 2].map((orbits) =>
    energyOf(runSteps(program, start, orbits * stepsPerOrbit, h)),
  );
  return (second![0] - first![0] + (second![1] - first![1])) / h[0] ** power;
}

/**
 * Secular energy change per orbit, dE = C h^q, between periapses 1 and 2 (measured at 45 digits with Richardson extrapolation, two to four
 * digits given). Here energies are taken after whole periods; the numerical orbit is then some h^p away from periapsis, which changes
 * dE at the next order of h.
 */
const constants: readonly (readonly [string, string, number, number, number])[] = [
  ["explicit-midpoint", "0.2", 3, 0.87275, 4000],
  ["ralston-2", "0.2", 3, 1.08, 4000],
  ["rk4", "0.2", 5, -0.2633, 400],
  ["rk4", "0.5", 5, -15.2, 800],
  ["bogacki-shampine-5", "0.2", 5, 0.000565, 800],
  ["verner-6-1978", "0.2", 7, 0.0899, 400],
  ["nystrom-4", "0.2", 5, -0.115, 400],
  ["dormand-nystrom-4", "0.2", 5, -0.02103, 400],
  ["dormand-nystrom-6", "0.2", 7, -0.00062, 200],
  ["dormand-nystrom-8", "0.2", 9, 3.76e-5, 200],
  // One evaluation a step, the corrected state's acceleration taken from the predicted one; evaluating again there would give 0.0111.
  ["hermite-4", "0.2", 5, -0.6452, 400],
];

describe("secular energy change per orbit", () => {
  it.each(constants)("%s at e = %s: C h^%d", (id, e, power, constant, stepsPerOrbit) => {
    const [coarse, fine] = [stepsPerOrbit, 2 * stepsPerOrbit].map((n) => driftConstant(id, e, power, n));
    // Next terms are of relative size h; the constants have as few as two digits: half a unit of those is up to 5%.
    expect(Math.abs((2 * fine! - coarse!) / constant - 1)).toBeLessThan(0.06);
  });
});
