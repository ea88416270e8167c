import { describe, expect, it } from "vitest";
import { attemptKernel, catalogue, LANES, laneMemory, type PairStepper } from "../../src/index.ts";
import { bits } from "./support.ts";

const pairs = catalogue.filter((stepper): stepper is PairStepper => "pair" in stepper);
const stream = 1024 * 1024;
const CHUNK = 37;
const WIDTH = 6;
const memory = laneMemory(2 * stream);

/** Eccentricities 0 to 0.9, five tolerances, three ends, and a longest step in every fifth lane. */
const starts = Array.from({ length: LANES }, (_, lane) => {
  const e = 0.06 * lane;
  return {
    state: Float64Array.of(1 - e, 0, 0.001 * lane, Math.sqrt((1 + e) / (1 - e))),
    tolerance: 10 ** (-3 - (lane % 5)),
    end: [2 * (1 + (lane % 3)), 1e-17] as const,
    longest: lane % 5 === 0 ? 0.05 : Number.POSITIVE_INFINITY,
  };
});

describe("variable steps in vector lanes", () => {
  it.each(pairs.map((stepper) => [stepper.id, stepper] as const))(
    "%s: each lane takes the steps of a run by itself, at the same cost",
    (_, stepper) => {
      const kernel = attemptKernel(stepper, memory);
      starts.forEach((start, lane) => {
        kernel.setLane(lane, start, stream);
      });
      const values = new Float64Array(memory.buffer);
      const taken: number[][] = starts.map(() => []);
      const at = (n: number, k: number, lane: number): number =>
        values[stream / 8 + (n * WIDTH + k) * LANES + lane]!;
      const running = (): boolean => starts.some(({ end }, lane) => at(0, 4, lane) < end[0]);
      while (running()) {
        kernel.advance(CHUNK, stream, LANES);
        for (let n = 1; n <= CHUNK; n++) {
          taken.forEach((rows, lane) => {
            const moved = at(n, 4, lane) !== at(n - 1, 4, lane) || at(n, 5, lane) !== at(n - 1, 5, lane);
            if (moved) for (let k = 0; k < WIDTH; k++) rows.push(at(n, k, lane));
          });
        }
        const last = (stream + CHUNK * kernel.streamBytes) / 8;
        values.copyWithin(stream / 8, last, last + kernel.streamBytes / 8);
      }
      starts.forEach(({ state, tolerance, end, longest }, lane) => {
        const run = stepper.begin({ state, step: 0, tolerance, endTime: end, maxStep: longest });
        const [rows, times] = [new Float64Array(4 * 8192), new Float64Array(2 * 8192)];
        const made = run.advance(8192, rows, times);
        const alone: number[] = [];
        for (let n = 0; n < made; n++) {
          alone.push(...rows.subarray(4 * n, 4 * n + 4), ...times.subarray(2 * n, 2 * n + 2));
        }
        expect(bits(Float64Array.from(taken[lane]!)), `lane ${lane}`).toEqual(bits(Float64Array.from(alone)));
        expect(kernel.counts(lane), `lane ${lane}`).toEqual({
          evaluations: run.evaluations,
          rejectedSteps: run.rejectedSteps,
          smallestStep: run.smallestStep,
        });
      });
    },
  );
});
