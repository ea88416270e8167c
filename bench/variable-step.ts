import { fileURLToPath } from "node:url";
import { attemptKernel, findStepper, LANES, laneMemory, type PairStepper } from "@perigauge/steppers";
import { Solver } from "odex";
import { type Cell, CellPool, FULL_PLAN, runCell } from "perigauge";
import { processorTime, type Timing, timed } from "./rounds.ts";

/** A mixed batch of variable-step runs, lanes against one by one; and one run against a general-purpose library at equal accuracy. */
export interface VariableStepSpeed {
  readonly stepper: string;
  readonly cells: number;
  readonly steps: number;
  /** One accepted step of one trajectory, energy scored. */
  readonly lanes: Timing;
  readonly scalar: Timing;
  readonly fasterThanScalar: number;
  readonly library: LibrarySpeed;
}

/** Ten orbits of e = 0.3 to an end position no worse than the library's; per trajectory. */
export interface LibrarySpeed {
  readonly name: string;
  readonly error: number;
  readonly microseconds: number;
  readonly stepper: string;
  readonly stepperError: number;
  readonly lanesMicroseconds: number;
  readonly scalarMicroseconds: number;
  readonly lanesFaster: number;
  readonly scalarFaster: number;
}

const STEPPER = "dormand-prince-54";
const ENERGY = { ...FULL_PLAN, measures: new Set(["energy"] as const), summaries: "maxima" as const };

/** Eccentricities 0 to 0.9 and tolerances 1e-5 to 1e-10, in an order that follows neither. */
const cells = Array.from(
  { length: 256 },
  (_, i): Cell => ({
    stepper: STEPPER,
    eccentricity: 0.9 * ((i * 0.6180339887498949) % 1),
    tolerance: 10 ** (-5 - 5 * ((i * 0.7548776662466927) % 1)),
    orbits: 50,
    startAnomalyDeg: 0,
    summation: "plain",
  }),
);

export async function variableStepBench(): Promise<VariableStepSpeed> {
  const stepper = findStepper(STEPPER) as PairStepper;
  const pool = new CellPool({ workers: 1 });
  const jobs = cells.map((cell) => ({ cell, horizons: [] }));
  let steps = 0;
  // Tables are built and code compiled before the clock runs.
  for (let run = 0; run < 5; run++) await pool.run(jobs, { measures: ["energy"], summaries: "maxima" });
  const times = await timed({
    lanes: async () => {
      const from = processorTime();
      const scores = await pool.run(jobs, { measures: ["energy"], summaries: "maxima" });
      const taken = processorTime() - from;
      steps = scores.reduce((sum, score) => sum + score.steps, 0);
      return taken / steps;
    },
    scalar: () => {
      const from = processorTime();
      const made = cells.reduce((sum, cell) => sum + runCell(cell, stepper, ENERGY).steps, 0);
      return (processorTime() - from) / made;
    },
  });
  await pool.close();
  return {
    stepper: STEPPER,
    cells: cells.length,
    steps,
    lanes: times.lanes,
    scalar: times.scalar,
    fasterThanScalar: times.scalar.nanoseconds / times.lanes.nanoseconds,
    library: libraryBench(),
  };
}

const E = 0.3;
const END = 20 * Math.PI;
const START = Float64Array.of(1 - E, 0, 0, Math.sqrt((1 + E) / (1 - E)));
const LIBRARY_TOLERANCE = 1e-9;

/** After whole orbits the body is back at its start. */
const endError = (x: number, y: number): number => Math.sqrt((x - START[0]!) ** 2 + (y - START[1]!) ** 2);

function libraryBench(): LibrarySpeed {
  let end: readonly number[] = [];
  const library = best(() => {
    const solver = new Solver(4);
    solver.absoluteTolerance = LIBRARY_TOLERANCE;
    solver.relativeTolerance = LIBRARY_TOLERANCE;
    end = solver.solve(motion, 0, [...START], END).y;
  });
  const error = endError(end[0]!, end[1]!);
  const stepper = findStepper("dormand-prince-853") as PairStepper;
  let tolerance = 1e-3;
  while (endOf(stepper, tolerance) > error) tolerance /= 2;
  const lanes = inLanes(stepper, tolerance);
  const scalar = best(() => void endOf(stepper, tolerance));
  return {
    name: "odex",
    error,
    microseconds: library,
    stepper: stepper.id,
    stepperError: endOf(stepper, tolerance),
    lanesMicroseconds: lanes / LANES,
    scalarMicroseconds: scalar,
    lanesFaster: (library * LANES) / lanes,
    scalarFaster: library / scalar,
  };
}

function motion(_t: number, state: number[]): number[] {
  const [x, y, vx, vy] = state as [number, number, number, number];
  const r2 = x * x + y * y;
  const w = -1 / (r2 * Math.sqrt(r2));
  return [vx, vy, w * x, w * y];
}

function endOf(stepper: PairStepper, tolerance: number): number {
  const run = stepper.begin({ state: START, step: 0, tolerance, endTime: [END, 0] });
  const rows = new Float64Array(4 * 4096);
  const made = run.advance(4096, rows, new Float64Array(2 * 4096));
  return endError(rows[4 * made - 4]!, rows[4 * made - 3]!);
}

/** Sixteen equal runs from start to end. */
function inLanes(stepper: PairStepper, tolerance: number): number {
  const stream = 1024 * 1024;
  const chunk = 64;
  const memory = laneMemory(2 * stream);
  const kernel = attemptKernel(stepper, memory);
  const values = new Float64Array(memory.buffer);
  const row = kernel.streamBytes / 8;
  return best(() => {
    for (let lane = 0; lane < LANES; lane++) {
      const start = { state: START, tolerance, end: [END, 0], longest: Number.POSITIVE_INFINITY } as const;
      kernel.setLane(lane, start, stream);
    }
    do {
      kernel.advance(chunk, stream, LANES);
      values.copyWithin(stream / 8, stream / 8 + chunk * row, stream / 8 + (chunk + 1) * row);
    } while (values[stream / 8 + 4 * LANES]! < END);
  });
}

/** Microseconds of the fastest of many calls. */
function best(run: () => void): number {
  let least = Number.POSITIVE_INFINITY;
  const until = performance.now() + 1500;
  while (performance.now() < until) {
    const from = performance.now();
    run();
    least = Math.min(least, performance.now() - from);
  }
  return least * 1000;
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  process.stdout.write(`${JSON.stringify(await variableStepBench())}\n`);
}
