import { describe, expect, it } from "vitest";
import { catalogue, type ProgramStepper, type StepProgram } from "../src/index.ts";
import { arcs } from "./support/exact-arc.ts";
import { force, type Pairs, pairs } from "./support/interpret-double-double.ts";
import { runExactly, stateError } from "./support/observed-order.ts";

const programs = catalogue
  .filter((stepper): stepper is ProgramStepper => "program" in stepper && !stepper.uneven)
  .map((stepper) => {
    const program = stepper.program({ dimension: 2, summation: "plain", force });
    return [stepper.id, stepper, program] as const;
  });

const onlyState = (from: Pairs): Pairs => ({ hi: from.hi.slice(0, 4), lo: from.lo.slice(0, 4) });

describe("four steps of 1/8 forward and four back, in double-double arithmetic", () => {
  it.each(programs)("%s returns if and only if it claims to be time-reversible", (_, stepper, program) => {
    const { start } = arcs[1]!;
    const there = onlyState(runExactly(program, start, 4, 0.5));
    const closure = stateError(runExactly(program, there, 4, -0.5), start);
    // A reversible step closes to rounding, 2^-100 or so; any other one misses by its own error, 1e-20 at the least.
    if (stepper.timeReversible) expect(closure).toBeLessThan(1e-28);
    else expect(closure).toBeGreaterThan(1e-25);
  });
});

describe("Jacobian of one step of 1/2 on an eccentric arc", () => {
  it.each(programs)("%s is symplectic if and only if it claims so", (_, stepper, program) => {
    const defect = symplecticityDefect(program, arcs[1]!.start);
    // Central differences of width 1e-9 in 31 digits: truncation 1e-18 times third derivatives, rounding 1e-22.
    if (stepper.symplectic) expect(defect).toBeLessThan(1e-12);
    else expect(defect).toBeGreaterThan(1e-11);
  });
});

/** Largest entry of J^T Omega J - Omega, J by central differences. */
function symplecticityDefect(program: StepProgram, start: Pairs): number {
  const width = 1e-9;
  const columns = [0, 1, 2, 3].map((k) => {
    const [ahead, behind] = [width, -width].map((change) => {
      const moved = pairs(4);
      moved.hi.set(start.hi);
      moved.lo.set(start.lo);
      moved.lo[k] = moved.lo[k]! + change;
      // Restore a proper pair: the shift is far larger than the tail it was added to.
      const hi = moved.hi[k]! + moved.lo[k]!;
      moved.lo[k] = moved.lo[k]! - (hi - moved.hi[k]!);
      moved.hi[k] = hi;
      return { end: runExactly(program, moved, 1, 0.5), change: moved };
    });
    return [0, 1, 2, 3].map((j) => {
      const rise = ahead!.end.hi[j]! - behind!.end.hi[j]! + (ahead!.end.lo[j]! - behind!.end.lo[j]!);
      const run =
        ahead!.change.hi[k]! - behind!.change.hi[k]! + (ahead!.change.lo[k]! - behind!.change.lo[k]!);
      return rise / run;
    });
  });
  let worst = 0;
  for (let i = 0; i < 4; i += 1) {
    for (let j = 0; j < 4; j += 1) {
      const [a, b] = [columns[i]!, columns[j]!];
      const form = a[0]! * b[2]! - a[2]! * b[0]! + a[1]! * b[3]! - a[3]! * b[1]!;
      const omega = j === i + 2 ? 1 : i === j + 2 ? -1 : 0;
      worst = Math.max(worst, Math.abs(form - omega));
    }
  }
  return worst;
}
