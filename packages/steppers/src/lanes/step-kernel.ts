import { isCall, type Program } from "../program/program.ts";
import { compileLanes } from "./compile-lanes.ts";
import { LANES, ROW_BYTES } from "./lane-layout.ts";
import { stepCode } from "./step-code.ts";
import { stepRows } from "./step-rows.ts";
import { type LaneMemory, laneMemory } from "./web-assembly.ts";

/**
 * A step program compiled for blocks of up to 16 trajectories, two to a vector: the same operations in the same order on each as in
 * `interpret`, so the same bits (all NaNs alike), whatever the neighbours hold.
 *
 * Its working rows begin at address 0 of the memory; the stream lies where the caller puts it. A row holds one number of each lane.
 */
export interface StepKernel {
  /** Bytes from address 0 that the kernel works in. */
  readonly workBytes: number;
  /** Loop variables that every step writes to the stream, in its order; the first four (or six) are the state. */
  readonly streamed: readonly number[];
  /** Bytes of the stream per step. */
  readonly streamBytes: number;
  /** Makes `steps` (>= 1) steps of the first `lanes` lanes, from row 0 of the stream at `stream` on; the last step stays to be moved to row 0. */
  advance(steps: number, stream: number, lanes: number): void;
  /** Puts a trajectory at its start into a lane: its step and its loop variables; those streamed go to row 0 of the stream. */
  setLane(lane: number, step: number, variables: Float64Array, stream: number): void;
  /** Moves a trajectory to another lane. */
  moveLane(from: number, to: number, stream: number): void;
}

/** @throws Error where the host has no WebAssembly with vectors, or the program calls a force from outside. */
export function stepKernel(program: Program, memory: LaneMemory): StepKernel {
  if (program.operations.some(isCall)) throw new Error("lanes: the force must be written into the program");
  const rows = stepRows(program);
  const advance = compileLanes([stepCode(program)], memory).advance!;
  const doubles = (): Float64Array => new Float64Array(memory.buffer);
  const rowLength = ROW_BYTES / 8;
  const placesOf = (stream: number): number[] => [
    rows.stepAt / 8,
    ...rows.streamed.map((_, k) => stream / 8 + k * rowLength),
    ...rows.carried.map((_, k) => rows.carriedAt[0] / 8 + k * rowLength),
  ];
  return {
    workBytes: rows.bytes,
    streamed: rows.streamed,
    streamBytes: rows.streamed.length * ROW_BYTES,
    advance: (steps, stream, lanes) => {
      advance(steps, stream, 16 * Math.ceil(Math.min(lanes, LANES) / 2));
    },
    setLane: (lane, step, variables, stream) => {
      const values = doubles();
      const source = [step, ...[...rows.streamed, ...rows.carried].map((index) => variables[index]!)];
      placesOf(stream).forEach((place, i) => {
        values[place + lane] = source[i]!;
      });
    },
    moveLane: (from, to, stream) => {
      const values = doubles();
      for (const place of placesOf(stream)) values[place + to] = values[place + from]!;
    },
  };
}

let available: boolean | undefined;

/** Whether this host runs WebAssembly with vectors. */
export function lanesAvailable(): boolean {
  available ??= probe();
  return available;
}

function probe(): boolean {
  try {
    const program: Program = {
      dimension: 2,
      inputs: 4,
      operations: [{ kind: "variable", index: 0, args: [] }],
      outputs: [0, 0, 0, 0],
      stageEnds: [],
      time: null,
    };
    stepKernel(program, laneMemory(65536));
    return true;
  } catch {
    return false;
  }
}
