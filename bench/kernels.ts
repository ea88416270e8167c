import { fileURLToPath } from "node:url";
import {
  emitJavaScript,
  findStepper,
  interpret,
  LANES,
  laneMemory,
  type ProgramStepper,
  pointMass,
  type Summation,
  stepKernel,
  supply,
} from "@perigauge/steppers";
import { cLoop, compilerVersion, hex } from "./c-loop.ts";
import { type Contestant, inProcess, type Timing, timed } from "./rounds.ts";

/** One step of one planar trajectory, ways of making it compared. */
export interface KernelSpeed {
  readonly stepper: string;
  readonly c: Timing | null;
  readonly javaScript: Timing;
  readonly lanes: Timing;
  readonly compensatedLanes: Timing;
  /** C over lanes: how many times faster lanes are. */
  readonly lanesAgainstC: number | null;
  /** Emitted JavaScript over C. */
  readonly javaScriptAgainstC: number | null;
  readonly lanesAgainstJavaScript: number;
  readonly compensatedAgainstPlain: number;
  /** Whether C, JavaScript and lanes ended on the same bits. */
  readonly sameBits: boolean;
}

export const KERNEL_STEPPERS = ["leapfrog", "rk4", "dormand-prince-5", "yoshida-8"] as const;

const STEPS = 4096;
const CHUNK = 1024;
const STREAM = 1024 * 1024;
const H = (2 * Math.PI) / 200;
const eccentricityOf = (lane: number): number => 0.3 + 0.02 * lane;

export async function kernelsBench(): Promise<readonly KernelSpeed[]> {
  const speeds: KernelSpeed[] = [];
  for (const id of KERNEL_STEPPERS) speeds.push(await kernelBench(id));
  return speeds;
}

async function kernelBench(id: string): Promise<KernelSpeed> {
  const stepper = findStepper(id) as ProgramStepper;
  const { start, step } = stepper.program({ dimension: 2, summation: "plain", force: pointMass });
  const variables = startOf(start, step.inputs, 0);
  const c = compilerVersion() === null ? null : cLoop(step, H, variables, STEPS);
  const lanes = lanesOf(stepper, "plain");
  const contestants: Record<"javaScript" | "lanes" | "compensated", Contestant> & { c?: Contestant } = {
    javaScript: inProcess(STEPS, javaScriptOf(stepper).run),
    lanes: inProcess(CHUNK * LANES, lanes.run),
    compensated: inProcess(CHUNK * LANES, lanesOf(stepper, "compensated").run),
  };
  if (c !== null) contestants.c = c.contestant;
  const times = await timed(contestants as Record<"c" | "javaScript" | "lanes" | "compensated", Contestant>);
  const ns = (name: keyof typeof times): number => times[name].nanoseconds;
  const states = [javaScriptOf(stepper).finalState(), lanesOf(stepper, "plain").finalState()];
  if (c !== null) states.push(c.finalState(CHUNK));
  return {
    stepper: id,
    c: c === null ? null : times.c,
    javaScript: times.javaScript,
    lanes: times.lanes,
    compensatedLanes: times.compensated,
    lanesAgainstC: c === null ? null : ns("c") / ns("lanes"),
    javaScriptAgainstC: c === null ? null : ns("javaScript") / ns("c"),
    lanesAgainstJavaScript: ns("javaScript") / ns("lanes"),
    compensatedAgainstPlain: ns("compensated") / ns("lanes"),
    sameBits: states.every((state) => state === states[0]),
  };
}

interface Runner {
  readonly run: () => void;
  /** State of the first trajectory after CHUNK steps from its start, as bits. */
  readonly finalState: () => string;
}

function startOf(start: Parameters<typeof interpret>[0], inputs: number, lane: number): Float64Array {
  const e = eccentricityOf(lane);
  const variables = new Float64Array(inputs);
  const state = Float64Array.of(1 - e, 0, 0, Math.sqrt((1 + e) / (1 - e)));
  interpret(start).evaluate(H, state, variables, supply(2));
  return variables;
}

function javaScriptOf(stepper: ProgramStepper): Runner {
  const { start, step } = stepper.program({ dimension: 2, summation: "plain", force: pointMass });
  const executable = emitJavaScript(step);
  const first = startOf(start, step.inputs, 0);
  const variables = new Float64Array(step.inputs);
  const rows = new Float64Array(4 * STEPS);
  const advance = (steps: number): void => {
    variables.set(first);
    executable.advance(steps, H, variables, rows, new Float64Array(0), supply(2));
  };
  return {
    run: () => advance(STEPS),
    finalState: () => {
      advance(CHUNK);
      return [...variables.subarray(0, 4)].map(hex).join(" ");
    },
  };
}

function lanesOf(stepper: ProgramStepper, summation: Summation): Runner {
  const { start, step } = stepper.program({ dimension: 2, summation, force: pointMass });
  const memory = laneMemory(STREAM + (CHUNK + 1) * 4 * 128);
  const kernel = stepKernel(step, memory);
  const starts = Array.from({ length: LANES }, (_, lane) => startOf(start, step.inputs, lane));
  const values = new Float64Array(memory.buffer);
  const begin = (): void => {
    starts.forEach((variables, lane) => {
      kernel.setLane(lane, H, variables, STREAM);
    });
  };
  begin();
  return {
    // Goes on from where the last call ended.
    run: () => {
      kernel.advance(CHUNK, STREAM, LANES);
      const last = (STREAM + CHUNK * kernel.streamBytes) / 8;
      values.copyWithin(STREAM / 8, last, last + kernel.streamBytes / 8);
    },
    finalState: () => {
      begin();
      kernel.advance(CHUNK, STREAM, LANES);
      const last = (STREAM + CHUNK * kernel.streamBytes) / 8;
      return [0, 1, 2, 3].map((k) => hex(values[last + k * LANES]!)).join(" ");
    },
  };
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  for (const speed of await kernelsBench()) process.stdout.write(`${JSON.stringify(speed)}\n`);
}
