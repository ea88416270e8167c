import { fileURLToPath } from "node:url";
import {
  findStepper,
  LANES,
  laneMemory,
  type ProgramStepper,
  pointMass,
  stepKernel,
} from "@perigauge/steppers";
import { type Cell, CellPool, FULL_PLAN, MEASURES, type MeasureName, runCell } from "perigauge";
import { type Contestant, inProcess, processorTime, type Timing, timed } from "./rounds.ts";

/** Time of one step of one trajectory with scoring at every step, in blocks of 16, from the start of the run to its score. */
export interface ScoringSpeed {
  readonly stepper: string;
  readonly stepsPerOrbit: number;
  readonly stepping: Timing;
  /** Along-track, timing and energy: what choosing asks for. */
  readonly threeMeasures: Timing;
  readonly everyMeasure: Timing;
  /** The same cells one by one. */
  readonly everyMeasureScalar: Timing;
  readonly threeAgainstStepping: number;
  readonly everyAgainstStepping: number;
  /** Scoring alone, every measure, nanoseconds a point and trajectory. */
  readonly scoringNanoseconds: number;
  readonly fasterThanScalar: number;
}

const THREE: readonly MeasureName[] = ["energy", "alongTrack", "timing"];
const ORBITS = 100;
const CHUNK = 1024;
const STREAM = 1024 * 1024;

export async function scoringBench(): Promise<readonly ScoringSpeed[]> {
  const speeds: ScoringSpeed[] = [];
  for (const stepper of ["leapfrog", "rk4"]) {
    for (const stepsPerOrbit of [400, 400.3]) speeds.push(await scoringOf(stepper, stepsPerOrbit));
  }
  return speeds;
}

async function scoringOf(id: string, stepsPerOrbit: number): Promise<ScoringSpeed> {
  const stepper = findStepper(id) as ProgramStepper;
  const cells = Array.from(
    { length: LANES },
    (_, lane): Cell => ({
      stepper: id,
      eccentricity: 0.3 + 0.02 * lane,
      stepsPerOrbit,
      orbits: ORBITS,
      startAnomalyDeg: 0,
      summation: "plain",
    }),
  );
  const steps = Math.floor(ORBITS * stepsPerOrbit) * LANES;
  const pool = new CellPool({ workers: 1 });
  const pooled = (measures: readonly MeasureName[]): Contestant => {
    const once = async (): Promise<number> => {
      const from = processorTime();
      await pool.run(
        cells.map((cell) => ({ cell, horizons: [] })),
        { measures, summaries: "maxima" },
      );
      return (processorTime() - from) / steps;
    };
    return async () => Math.min(await once(), await once(), await once(), await once(), await once());
  };
  const scalar = (): number => {
    const from = processorTime();
    const score = runCell(cells[0] as Cell, stepper, { ...FULL_PLAN, summaries: "maxima" });
    return (processorTime() - from) / score.steps;
  };
  const times = await timed({
    stepping: inProcess(CHUNK * LANES, steppingOf(stepper, stepsPerOrbit)),
    three: pooled(THREE),
    every: pooled(MEASURES),
    scalar: () => Math.min(...Array.from({ length: 5 }, scalar)),
  });
  await pool.close();
  const ns = (name: keyof typeof times): number => times[name].nanoseconds;
  return {
    stepper: id,
    stepsPerOrbit,
    stepping: times.stepping,
    threeMeasures: times.three,
    everyMeasure: times.every,
    everyMeasureScalar: times.scalar,
    threeAgainstStepping: ns("three") / ns("stepping"),
    everyAgainstStepping: ns("every") / ns("stepping"),
    scoringNanoseconds: ns("every") - ns("stepping"),
    fasterThanScalar: ns("scalar") / ns("every"),
  };
}

function steppingOf(stepper: ProgramStepper, stepsPerOrbit: number): () => void {
  const { step } = stepper.program({ dimension: 2, summation: "plain", force: pointMass });
  const memory = laneMemory(STREAM + (CHUNK + 1) * 4 * 128);
  const kernel = stepKernel(step, memory);
  const values = new Float64Array(memory.buffer);
  const begin = (): void => {
    for (let lane = 0; lane < LANES; lane++) {
      const e = 0.3 + 0.02 * lane;
      const variables = new Float64Array(step.inputs);
      variables.set([1 - e, 0, 0, Math.sqrt((1 + e) / (1 - e))]);
      kernel.setLane(lane, (2 * Math.PI) / stepsPerOrbit, variables, STREAM);
    }
  };
  begin();
  return () => {
    kernel.advance(CHUNK, STREAM, LANES);
    const last = (STREAM + CHUNK * kernel.streamBytes) / 8;
    values.copyWithin(STREAM / 8, last, last + kernel.streamBytes / 8);
  };
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  for (const speed of await scoringBench()) process.stdout.write(`${JSON.stringify(speed)}\n`);
}
