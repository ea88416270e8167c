import type { PairProgram } from "../build/pair.ts";
import { countEvaluations } from "../program/count.ts";
import { supply } from "../program/executable.ts";
import { pointMass } from "../program/force.ts";
import { interpret } from "../program/interpret.ts";
import type { Program } from "../program/program.ts";
import { exponentsOf, power64, smallestPrevious } from "../run/controller.ts";
import { firstStep } from "../run/first-step.ts";
import type { PairStepper } from "../run/variable-step.ts";
import { ATTEMPT_WIDTH, attemptCode } from "./attempt-code.ts";
import { type AttemptRow, attemptRows } from "./attempt-rows.ts";
import { compileLanes } from "./compile-lanes.ts";
import { LANES, ROW_BYTES } from "./lane-layout.ts";
import type { LaneMemory } from "./web-assembly.ts";

/** A planar run of variable step at its start. */
export interface AttemptStart {
  readonly state: Float64Array;
  readonly tolerance: number;
  readonly end: readonly [hi: number, lo: number];
  readonly longest: number;
}

/** What a lane has spent so far. */
export interface AttemptCounts {
  readonly evaluations: number;
  readonly rejectedSteps: number;
  readonly smallestStep: number;
}

/**
 * A variable-step stepper compiled for blocks of up to 16 trajectories, each with its own tolerance, step and end: trials are made
 * together and accepted or rejected lane by lane. The same bits as a run by itself.
 */
export interface AttemptKernel {
  readonly workBytes: number;
  /** Bytes of the stream per trial: rows of x, y, vx, vy and the time's hi and lo. */
  readonly streamBytes: number;
  /** Makes `count` (>= 1) trials of the first `lanes` lanes, from row 0 of the stream on. */
  advance(count: number, stream: number, lanes: number): void;
  setLane(lane: number, start: AttemptStart, stream: number): void;
  moveLane(from: number, to: number, stream: number): void;
  counts(lane: number): AttemptCounts;
}

/** @throws Error where the host has no WebAssembly with vectors. */
export function attemptKernel(stepper: PairStepper, memory: LaneMemory): AttemptKernel {
  const pair = stepper.pair({ dimension: 2, summation: "plain", force: pointMass });
  const lowerOrder = Math.min(stepper.order, stepper.embeddedOrder);
  const programs = { ...pair, trial: withoutSlopes(pair), lowerOrder };
  const rows = attemptRows(programs.trial, programs.first);
  const attempt = compileLanes([attemptCode(programs)], memory).attempt!;
  const trialEvaluations = countEvaluations(pair.trial);
  const firstEvaluations = countEvaluations(pair.first);
  const first = interpret(pair.first);
  const firstPower = power64(smallestPrevious, exponentsOf(lowerOrder).integral);
  const noForce = supply(2);
  const doubles = (): Float64Array => new Float64Array(memory.buffer);
  const streamPlaces = (stream: number): number[] =>
    Array.from({ length: ATTEMPT_WIDTH }, (_, k) => (stream + k * ROW_BYTES) / 8);

  return {
    workBytes: rows.bytes,
    streamBytes: ATTEMPT_WIDTH * ROW_BYTES,
    advance(count, stream, lanes): void {
      attempt(count, stream, 16 * Math.ceil(Math.min(lanes, LANES) / 2));
    },
    setLane(lane, { state, tolerance, end, longest }, stream): void {
      const values = doubles();
      const inputs = new Float64Array(6);
      inputs.set(state);
      const acceleration = new Float64Array(2);
      first.evaluate(0, inputs, acceleration, noForce);
      inputs.set(acceleration, 4);
      const start: Partial<Record<AttemptRow, number>> = {
        step: Math.min(firstStep(inputs, 2, tolerance, lowerOrder), end[0]),
        endHi: end[0],
        endLo: end[1],
        tolerance,
        longest,
        smallest: end[0] * 2 ** -60,
        previousPower: firstPower,
        smallestStep: Number.POSITIVE_INFINITY,
        ax: acceleration[0]!,
        ay: acceleration[1]!,
      };
      for (const [name, offset] of Object.entries(rows.at))
        values[offset / 8 + lane] = start[name as AttemptRow] ?? 0;
      const streamed = [...state, 0, 0];
      streamPlaces(stream).forEach((place, k) => {
        values[place + lane] = streamed[k]!;
      });
    },
    moveLane(from, to, stream): void {
      const values = doubles();
      const own = Object.values(rows.at).map((offset) => offset / 8);
      // As bits: some rows hold masks.
      for (const place of [...own, ...streamPlaces(stream)])
        values.copyWithin(place + to, place + from, place + from + 1);
    },
    counts(lane): AttemptCounts {
      const values = doubles();
      const read = (name: AttemptRow): number => values[rows.at[name] / 8 + lane]!;
      const accepted = read("acceptedCount");
      const rejected = read("rejectedCount");
      const restarts = pair.lastIsFirst ? 1 : 1 + accepted;
      return {
        evaluations: (accepted + rejected) * trialEvaluations + restarts * firstEvaluations,
        rejectedSteps: rejected,
        smallestStep: read("smallestStep"),
      };
    },
  };
}

/** The trial up to the acceleration at the new state: slopes serve dense output only. */
function withoutSlopes({ trial, lastIsFirst }: PairProgram): Program {
  return { ...trial, outputs: trial.outputs.slice(0, lastIsFirst ? 7 : 5) };
}
