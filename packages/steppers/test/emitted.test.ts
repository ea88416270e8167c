import { describe, expect, it } from "vitest";
import {
  type Acceleration,
  catalogue,
  countEvaluations,
  type Executable,
  emitJavaScript,
  type ImplicitStepper,
  interpret,
  type Jerk,
  type PairStepper,
  type Program,
  type ProgramStepper,
  pointMass,
  type Setting,
  type StepProgram,
  type Stepper,
  suppliedForce,
  supply,
} from "../src/index.ts";
import { periapsis } from "./support/runs.ts";

const programs = catalogue
  .filter((stepper): stepper is ProgramStepper => "program" in stepper)
  .map((stepper) => [stepper.id, stepper] as const);

const steps = 12;
const h = 0.03;

/** The point mass, written as the programs write it. */
const supplied: Acceleration = (q, out) => {
  let r2 = q[0]! * q[0]! + q[1]! * q[1]!;
  if (q.length === 3) r2 += q[2]! * q[2]!;
  const w = -1 / (r2 * Math.sqrt(r2));
  for (let k = 0; k < q.length; k += 1) out[k] = q[k]! * w;
};

/** Its jerk, likewise. */
const suppliedJerk: Jerk = (q, v, out) => {
  let r2 = q[0]! * q[0]! + q[1]! * q[1]!;
  let qv = q[0]! * v[0]! + q[1]! * v[1]!;
  if (q.length === 3) {
    r2 += q[2]! * q[2]!;
    qv += q[2]! * v[2]!;
  }
  const w = -1 / (r2 * Math.sqrt(r2));
  const stretch = 3 * (qv / r2);
  for (let k = 0; k < q.length; k += 1) out[k] = w * (v[k]! - stretch * q[k]!);
};

function run(
  program: StepProgram,
  make: (p: StepProgram["step"]) => Executable,
  dimension: 2 | 3,
): Float64Array {
  const variables = new Float64Array(program.step.inputs);
  const force = supply(dimension, supplied, suppliedJerk);
  const rows = new Float64Array(2 * dimension * steps);
  const times = new Float64Array(2 * steps);
  // Starts of multistep methods are thousands of operations long and never compiled.
  const start = program.start.operations.length > 1000 ? interpret(program.start) : make(program.start);
  start.evaluate(h, periapsis(0.4, dimension), variables, force);
  make(program.step).advance(steps, h, variables, rows, times, force);
  return Float64Array.of(...rows, ...times, ...variables);
}

const bits = (numbers: Float64Array): string => Buffer.from(numbers.buffer).toString("hex");

describe("emitted JavaScript gives the interpreter's bits", () => {
  it.each(programs)("%s", (_, stepper) => {
    for (const dimension of [2, 3] as const) {
      for (const summation of ["plain", "compensated"] as const) {
        const ends: string[] = [];
        for (const force of [pointMass, suppliedForce]) {
          const setting: Setting = { dimension, summation, force };
          const program = stepper.program(setting);
          const emitted = bits(run(program, emitJavaScript, dimension));
          expect(emitted, `${dimension}D ${summation}`).toBe(bits(run(program, interpret, dimension)));
          ends.push(emitted);
        }
        expect(ends[1], "a supplied point mass is the built-in one").toBe(ends[0]);
      }
    }
  });
});

describe("so do the parts of variable-step and implicit steppers", () => {
  const parts = (found: Stepper, setting: Setting): Program[] => {
    if ("pair" in found) {
      const { first, trial } = (found as PairStepper).pair(setting);
      return [first, trial];
    }
    const { first, sweep, finish } = (found as ImplicitStepper).collocation(setting);
    return [first, sweep, finish];
  };
  const others = catalogue
    .filter((found) => !("program" in found))
    .map((found) => [found.id, found] as const);
  it.each(others)("%s", (_, found) => {
    for (const dimension of [2, 3] as const) {
      for (const force of [pointMass, suppliedForce]) {
        for (const program of parts(found, { dimension, summation: "plain", force })) {
          const inputs = Float64Array.from({ length: program.inputs }, (_, k) => 1 / (k + 1.5));
          const [emitted, interpreted] = [emitJavaScript, interpret].map((make) => {
            const outputs = new Float64Array(program.outputs.length);
            make(program).evaluate(h, inputs, outputs, supply(dimension, supplied, suppliedJerk));
            return bits(outputs);
          });
          expect(emitted).toBe(interpreted);
        }
      }
    }
  });
});

describe("what is counted is what is made", () => {
  it.each(programs)("%s", (_, stepper) => {
    let calls = 0;
    const acceleration: Acceleration = (q, out) => {
      calls += 1;
      supplied(q, out);
    };
    const trajectory = stepper.begin({ state: periapsis(0.4), step: h, acceleration, jerk: suppliedJerk });
    expect(trajectory.evaluations).toBe(calls);
    trajectory.advance(steps, new Float64Array(4 * steps), new Float64Array(2 * steps));
    expect(trajectory.evaluations).toBe(calls);
    const { step } = stepper.program({ dimension: 2, summation: "plain", force: pointMass });
    const roots = step.operations.filter(({ kind }) => kind === "sqrt").length;
    expect(countEvaluations(step), "one square root to each force evaluation").toBe(roots);
  });
});

describe("a planar orbit stays planar in space", () => {
  it.each(programs)("%s", (_, stepper) => {
    const [x, y, vx, vy] = periapsis(0.4);
    const plane = new Float64Array(4 * steps);
    const space = new Float64Array(6 * steps);
    const times = new Float64Array(2 * steps);
    stepper.begin({ state: Float64Array.of(x!, y!, vx!, vy!), step: h }).advance(steps, plane, times);
    stepper.begin({ state: Float64Array.of(x!, y!, 0, vx!, vy!, 0), step: h }).advance(steps, space, times);
    for (let n = 0; n < steps; n += 1) {
      const [a, b, c, d, e, f] = space.subarray(6 * n, 6 * n + 6);
      expect([a, b, d, e]).toEqual([...plane.subarray(4 * n, 4 * n + 4)]);
      expect([c! + 0, f! + 0]).toEqual([0, 0]);
    }
  });
});
