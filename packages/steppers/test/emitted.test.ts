import { describe, expect, it } from "vitest";
import {
  type Acceleration,
  catalogue,
  countEvaluations,
  type Executable,
  emitJavaScript,
  interpret,
  type Jerk,
  type ProgramStepper,
  pointMass,
  type Setting,
  type StepProgram,
  suppliedForce,
  supply,
} from "../src/index.ts";
import { periapsis } from "./support/runs.ts";

const programs = catalogue
  .filter((stepper): stepper is ProgramStepper => "program" in stepper)
  .map((stepper) => [stepper.id, stepper] as const);

const steps = 40;
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
  make(program.start).evaluate(h, periapsis(0.4, dimension), variables, force);
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
