import { argv } from "node:process";
import { fileURLToPath } from "node:url";
import {
  type Executable,
  emitJavaScript,
  findStepper,
  interpret,
  type ProgramStepper,
  pointMass,
  supply,
} from "@perigauge/steppers";
import { Bench } from "tinybench";

export interface StepperSpeed {
  readonly stepper: string;
  /** Median time of one step of the emitted JavaScript, rows written. */
  readonly nsPerStep: number;
  /** Emitted over hand-unrolled time: 1 is as fast. */
  readonly againstHandWritten: number;
  /** Interpreter over emitted time. */
  readonly fasterThanInterpreter: number;
}

type Loop = (steps: number, h: number, state: Float64Array, rows: Float64Array) => void;

const steps = 4096;
const step = (2 * Math.PI) / 200;
const start = Float64Array.of(0.7, 0, 0, Math.sqrt(1.3 / 0.7));

/** Emitted JavaScript against a loop unrolled by hand and against the interpreter, for two methods, planar, plain summation. */
export async function steppersBench(milliseconds = 1000): Promise<readonly StepperSpeed[]> {
  const speeds: StepperSpeed[] = [];
  for (const [id, byHand] of [["leapfrog", leapfrogByHand] as const, ["rk4", rk4ByHand] as const]) {
    const found = findStepper(id) as ProgramStepper;
    const { step: program } = found.program({ dimension: 2, summation: "plain", force: pointMass });
    const bench = new Bench({ time: milliseconds, warmupTime: milliseconds / 4 });
    bench.add("emitted", run(asLoop(emitJavaScript(program))));
    bench.add("by hand", run(byHand));
    bench.add("interpreted", run(asLoop(interpret(program)), steps / 64));
    await bench.run();
    const [emitted, hand, interpreted] = bench.tasks.map(({ result }) => {
      if (result.state !== "completed") throw new Error(`${id}: a benchmark did not complete`);
      return result.latency.p50;
    });
    speeds.push({
      stepper: id,
      nsPerStep: (emitted! * 1e6) / steps,
      againstHandWritten: emitted! / hand!,
      fasterThanInterpreter: (interpreted! * 64) / emitted!,
    });
  }
  return speeds;
}

function asLoop(executable: Executable): Loop {
  const times = new Float64Array(0);
  const force = supply(2);
  return (count, h, state, rows) => executable.advance(count, h, state, rows, times, force);
}

function run(loop: Loop, count = steps): () => void {
  const state = new Float64Array(4);
  const rows = new Float64Array(4 * steps);
  return () => {
    state.set(start);
    loop(count, step, state, rows);
  };
}

function leapfrogByHand(count: number, h: number, state: Float64Array, rows: Float64Array): void {
  let x = state[0]!;
  let y = state[1]!;
  let vx = state[2]!;
  let vy = state[3]!;
  const half = 0.5 * h;
  for (let n = 0, o = 0; n < count; n += 1, o += 4) {
    x += half * vx;
    y += half * vy;
    const r2 = x * x + y * y;
    const kick = h / (r2 * Math.sqrt(r2));
    vx -= kick * x;
    vy -= kick * y;
    x += half * vx;
    y += half * vy;
    rows[o] = x;
    rows[o + 1] = y;
    rows[o + 2] = vx;
    rows[o + 3] = vy;
  }
}

function rk4ByHand(count: number, h: number, state: Float64Array, rows: Float64Array): void {
  let x = state[0]!;
  let y = state[1]!;
  let vx = state[2]!;
  let vy = state[3]!;
  const half = 0.5 * h;
  const sixth = h / 6;
  for (let n = 0, o = 0; n < count; n += 1, o += 4) {
    let r2 = x * x + y * y;
    let w = -1 / (r2 * Math.sqrt(r2));
    const ax1 = w * x;
    const ay1 = w * y;
    const x2 = x + half * vx;
    const y2 = y + half * vy;
    const vx2 = vx + half * ax1;
    const vy2 = vy + half * ay1;
    r2 = x2 * x2 + y2 * y2;
    w = -1 / (r2 * Math.sqrt(r2));
    const ax2 = w * x2;
    const ay2 = w * y2;
    const x3 = x + half * vx2;
    const y3 = y + half * vy2;
    const vx3 = vx + half * ax2;
    const vy3 = vy + half * ay2;
    r2 = x3 * x3 + y3 * y3;
    w = -1 / (r2 * Math.sqrt(r2));
    const ax3 = w * x3;
    const ay3 = w * y3;
    const x4 = x + h * vx3;
    const y4 = y + h * vy3;
    const vx4 = vx + h * ax3;
    const vy4 = vy + h * ay3;
    r2 = x4 * x4 + y4 * y4;
    w = -1 / (r2 * Math.sqrt(r2));
    x += sixth * (vx + 2 * (vx2 + vx3) + vx4);
    y += sixth * (vy + 2 * (vy2 + vy3) + vy4);
    vx += sixth * (ax1 + 2 * (ax2 + ax3) + w * x4);
    vy += sixth * (ay1 + 2 * (ay2 + ay3) + w * y4);
    rows[o] = x;
    rows[o + 1] = y;
    rows[o + 2] = vx;
    rows[o + 3] = vy;
  }
}

if (argv[1] === fileURLToPath(import.meta.url)) {
  for (const speed of await steppersBench()) {
    const { stepper, nsPerStep, againstHandWritten, fasterThanInterpreter } = speed;
    console.log(
      `${stepper}: ${nsPerStep.toFixed(1)} ns a step, ${againstHandWritten.toFixed(2)} of a hand-unrolled loop, ` +
        `${fasterThanInterpreter.toFixed(0)} times faster than the interpreter`,
    );
  }
}
