import { describe, expect, it } from "vitest";
import {
  buildCollocation,
  type CollocationRows,
  firstOrder,
  gaussRows,
  radauRows,
} from "../src/build/collocation.ts";
import { type CollocationProgram, catalogue, type ImplicitStepper } from "../src/index.ts";
import { gaussLegendre } from "../src/methods/collocation/gauss-legendre.ts";
import { gaussRadau15 } from "../src/methods/collocation/gauss-radau-15.ts";
import type { Collocation } from "../src/methods/method.ts";
import { arcs } from "./support/exact-arc.ts";
import { dot, fixed, over, size, times, whole } from "./support/fixed-point.ts";
import { evaluateExactly, force, type Pairs, pairs } from "./support/interpret-double-double.ts";
import { nystromResiduals } from "./support/nystrom-trees.ts";
import { stateError } from "./support/observed-order.ts";
import { energy, periapsis, stateAfter, stepper } from "./support/runs.ts";

const implicits = catalogue.filter(
  (found): found is ImplicitStepper => "collocation" in found && found.knob === "step",
);
const gauss = gaussLegendre.map((method) => [method.id, method] as const);
const all = [...gauss, [gaussRadau15.id, gaussRadau15] as const];
const rowsOf = (method: Collocation): CollocationRows =>
  method === gaussRadau15 ? radauRows(method) : gaussRows(method);
/** Nodes are printed to 40 digits. */
const printed = 1e-36;

describe("collocation, from the nodes alone", () => {
  it.each(all)("%s: special Nystrom trees to its order and no further", (_, method) => {
    const rows = rowsOf(method);
    const exact = {
      c: rows.c.map(fixed),
      a: rows.a.map((row) => row.map(fixed)),
      position: rows.position.map(fixed),
      velocity: rows.velocity.map(fixed),
    };
    const residuals = nystromResiduals(exact, method.order);
    expect(Math.max(...residuals)).toBeLessThan(printed);
    // At the next order already the quadrature sum b_i c_i^p = 1 / (p + 1) fails.
    let powers = exact.c.map(() => whole(1));
    for (let k = 0; k < method.order; k += 1) powers = powers.map((power, i) => times(power, exact.c[i]!));
    const quadrature = dot(exact.velocity, powers) - over(whole(1), method.order + 1);
    expect(size(quadrature)).toBeGreaterThan(1e8 * printed);
  });
  it.each(gauss)("%s: symplectic, b_i a_ij + b_j a_ji = b_i b_j, and symmetric", (_, method) => {
    const { a, b: weights } = firstOrder(method);
    const [A, b] = [a.map((row) => row.map(fixed)), weights.map(fixed)];
    const last = b.length - 1;
    for (let i = 0; i <= last; i += 1) {
      for (let j = 0; j <= last; j += 1) {
        const defect = times(b[i]!, A[i]![j]!) + times(b[j]!, A[j]![i]!) - times(b[i]!, b[j]!);
        expect(size(defect)).toBeLessThan(printed);
        expect(size(A[i]![j]! + A[last - i]![last - j]! - b[j]!)).toBeLessThan(printed);
      }
    }
  });
});

/** The implicit step in double-double arithmetic, iterated until it no longer changes. */
function runImplicit(program: CollocationProgram, startsAtNode: boolean, start: Pairs, steps: number): Pairs {
  const h: [number, number] = [1 / steps, 0];
  if (Math.fround(h[0]) !== h[0]) throw new Error("steps must be a power of two here");
  const state = pairs(4);
  state.hi.set(start.hi);
  state.lo.set(start.lo);
  const nodes = 2 * program.stages;
  const first = pairs(2);
  evaluateExactly(program.first, h, state, first);
  const inputs = pairs(4 + nodes);
  for (let i = 0; i < nodes; i += 1) inputs.hi[4 + i] = first.hi[i % 2]!;
  const swept = pairs(nodes + 2);
  const finished = pairs(program.finish.outputs.length);
  for (let n = 0; n < steps; n += 1) {
    inputs.hi.set(state.hi);
    inputs.lo.set(state.lo);
    if (startsAtNode) {
      evaluateExactly(program.first, h, state, first);
      inputs.hi.set(first.hi, 4);
      inputs.lo.set(first.lo, 4);
    }
    for (let sweep = 0; sweep < 100; sweep += 1) {
      evaluateExactly(program.sweep, h, inputs, swept);
      inputs.hi.set(swept.hi.subarray(0, nodes), 4);
      inputs.lo.set(swept.lo.subarray(0, nodes), 4);
      if (swept.hi[nodes]! < 1e-30) break;
    }
    evaluateExactly(program.finish, h, inputs, finished);
    state.hi.set(finished.hi.subarray(0, 4));
    state.lo.set(finished.lo.subarray(0, 4));
    inputs.hi.set(finished.hi.subarray(4, 4 + nodes), 4);
    inputs.lo.set(finished.lo.subarray(4, 4 + nodes), 4);
  }
  return state;
}

describe("observed order on a Kepler arc, in double-double arithmetic", () => {
  it.each(all)("%s", (_, method) => {
    const program = buildCollocation(rowsOf(method), { dimension: 2, summation: "plain", force });
    const coarse = method.order === 15 ? 8 : method.order >= 10 ? 16 : method.order >= 6 ? 32 : 128;
    const [first, second] = [coarse, 2 * coarse].map((steps) =>
      Math.sqrt(
        arcs.reduce(
          (t, arc) =>
            t + stateError(runImplicit(program, method === gaussRadau15, arc.start, steps), arc.end) ** 2,
          0,
        ),
      ),
    );
    const order = Math.log2(first! / second!);
    expect(Math.abs(order - method.order), `${method.id}: ${order}`).toBeLessThan(0.15);
  });
});

describe("runs in doubles", () => {
  it("gauss-legendre-4 ends where exact arithmetic does (computed at 40 digits): e = 0.6, h = 1/32, 200 steps", () => {
    const end = stateAfter("gauss-legendre-4", 200, { state: periapsis(0.6), step: 1 / 32 });
    expect(Math.abs(end[0]! - 0.396574843386643)).toBeLessThan(6.2e-13);
    expect(Math.abs(end[1]! + 0.06615868623898)).toBeLessThan(6.2e-13);
    expect(Math.abs(energy(end) + 0.5 - 6.01183773983e-8)).toBeLessThan(6.2e-13);
  });
  it.each(implicits.map((found) => [found.id]))(
    "%s counts the evaluations it makes, and comes back",
    (id) => {
      let calls = 0;
      const acceleration = (q: Float64Array, out: Float64Array): void => {
        calls += 1;
        const w = -1 / (q[0]! ** 2 + q[1]! ** 2) ** 1.5;
        out[0] = w * q[0]!;
        out[1] = w * q[1]!;
      };
      const start = periapsis(0.3);
      const run = stepper(id).begin({ state: start, step: 0.05, acceleration });
      const rows = new Float64Array(4 * 100);
      run.advance(100, rows);
      expect(run.evaluations).toBe(calls);
      const back = stateAfter(id, 100, { state: rows.slice(-4), step: -0.05 });
      // Iterated to rounding: some ulps a step, growing with time.
      for (let k = 0; k < 4; k += 1) expect(Math.abs(back[k]! - start[k]!)).toBeLessThan(1e-12);
    },
  );
  it("a step far too large ends, and says so by its state alone", () => {
    const run = stepper("gauss-legendre-4").begin({ state: periapsis(0.9), step: 50 });
    expect(run.advance(3, new Float64Array(12))).toBe(3);
    expect(run.evaluations).toBeLessThanOrEqual(1 + 3 * 2 * 100);
  });
});
