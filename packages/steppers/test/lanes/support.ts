import {
  interpret,
  LANES,
  type LaneMemory,
  laneMemory,
  type Program,
  ROW_BYTES,
  stepKernel,
  supply,
} from "../../src/index.ts";

/** One trajectory of a block: its step and its loop variables at the start. */
export interface LaneStart {
  readonly step: number;
  readonly variables: Float64Array;
}

const stream = 1024 * 1024;
let memory: LaneMemory | undefined;

/** Streamed variables after each of `steps` steps: [lane][step * width + variable]. */
export function runLanes(program: Program, starts: readonly LaneStart[], steps: number): Float64Array[] {
  memory ??= laneMemory(4 * 1024 * 1024);
  const kernel = stepKernel(program, memory);
  starts.forEach(({ step, variables }, lane) => {
    kernel.setLane(lane, step, variables, stream);
  });
  const width = kernel.streamed.length;
  const values = new Float64Array(memory.buffer);
  const made = starts.map(() => new Float64Array(width * steps));
  // In two calls: carried variables must survive an odd number of steps as well as an even one.
  for (let done = 0; done < steps; ) {
    const count = done === 0 ? Math.min(3, steps) : steps - done;
    kernel.advance(count, stream, starts.length);
    for (let n = 0; n < count; n++) {
      for (let k = 0; k < width; k++) {
        const row = (stream + (n + 1) * kernel.streamBytes + k * ROW_BYTES) / 8;
        made.forEach((rows, lane) => {
          rows[(done + n) * width + k] = values[row + lane]!;
        });
      }
    }
    const last = (stream + count * kernel.streamBytes) / 8;
    values.copyWithin(stream / 8, last, last + kernel.streamBytes / 8);
    done += count;
  }
  return made;
}

/** The same by the interpreter, one trajectory. */
export function runInterpreted(
  program: Program,
  { step, variables }: LaneStart,
  steps: number,
): Float64Array {
  const width = 2 * program.dimension;
  const rows = new Float64Array(width * steps);
  const times = new Float64Array(2 * steps);
  interpret(program).advance(steps, step, variables.slice(), rows, times, supply(program.dimension));
  if (program.time === null) return rows;
  const both = new Float64Array((width + 2) * steps);
  for (let n = 0; n < steps; n++) {
    both.set(rows.subarray(n * width, (n + 1) * width), n * (width + 2));
    both.set(times.subarray(2 * n, 2 * n + 2), n * (width + 2) + width);
  }
  return both;
}

/** Starts for all lanes: orbits of growing eccentricity, and states that no orbit has in lanes 3, 6, 9 and 12. */
export function mixedStarts(program: Program, start: Program, count = LANES): LaneStart[] {
  const strange = [
    [Number.NaN, 0, 0, 1],
    [2 ** -1070, -0, -0, 2 ** -1060],
    [0, 0, 0, 0],
    [Number.POSITIVE_INFINITY, 1, -1e200, 1e300],
  ] as const;
  const d = program.dimension;
  return Array.from({ length: count }, (_, lane) => {
    const e = 0.05 * lane;
    const planar = lane % 3 === 0 && lane > 0 ? strange[lane / 3 - 1] : undefined;
    const [x, y, vx, vy] = planar ?? [1 - e, 0, 0.01 * lane, Math.sqrt((1 + e) / (1 - e))];
    const state =
      d === 2
        ? Float64Array.of(x!, y!, vx!, vy!)
        : Float64Array.of(x!, y!, 0.1 * lane, vx!, vy!, -0.01 * lane);
    const step = 0.01 + 0.002 * lane;
    const variables = new Float64Array(program.inputs);
    interpret(start).evaluate(step, state, variables, supply(d));
    return { step, variables };
  });
}

/** Bits of doubles with every NaN alike. */
export function bits(values: Float64Array): string[] {
  const words = new BigUint64Array(1);
  const double = new Float64Array(words.buffer);
  return [...values].map((value) => {
    double[0] = value;
    return Number.isNaN(value) ? "NaN" : words[0]!.toString(16);
  });
}
