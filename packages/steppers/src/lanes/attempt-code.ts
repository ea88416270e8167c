import { lower } from "../program/lower.ts";
import type { Program } from "../program/program.ts";
import {
  exponentsOf,
  largestFactor,
  power64,
  safety,
  smallestFactor,
  smallestPrevious,
} from "../run/controller.ts";
import { type AttemptRow, type AttemptRows, attemptRows } from "./attempt-rows.ts";
import type { FunctionCode } from "./encoder.ts";
import { LaneCode } from "./lane-code.ts";
import { type Operand, PAIR_BYTES, type Pointer, ROW_BYTES } from "./lane-layout.ts";
import { writePowers } from "./power-code.ts";
import { type Place, type ProgramPlaces, StageWriter } from "./stage-writer.ts";

/** Rows of the stream: the state, then hi and lo of the time. */
export const ATTEMPT_WIDTH = 6;

/** What the code of a variable step is made from: `trial` without the outputs that only dense output needs. */
export interface AttemptPrograms {
  readonly trial: Program;
  readonly first: Program;
  readonly lastIsFirst: boolean;
  readonly lowerOrder: number;
}

/**
 * The function `attempt(count, stream, width)`: `count` trial steps of every lane, each accepted or rejected on its own by the rules of
 * `VariableStepRun`, operation for operation. Row n of the stream is the state and time after trial n: those of row n - 1 where the trial
 * was rejected, or the end was reached before.
 */
export function attemptCode(programs: AttemptPrograms): FunctionCode {
  const rows = attemptRows(programs.trial, programs.first);
  const code = new LaneCode(3, 2);
  const [count, stream, width] = [code.parameter(0), code.parameter(1), code.parameter(2)];
  const [lane, place] = [code.pointer(), code.pointer()];
  const overLanes = (stage: (writer: AttemptWriter) => void): void => {
    code.set(lane, 0);
    code.set(place, stream);
    code.repeat(lane, width, () => {
      stage(new AttemptWriter(code, programs, rows, lane, place));
      code.advance(lane, PAIR_BYTES);
      code.advance(place, PAIR_BYTES);
    });
  };
  const { trial, first } = programs;
  code.countDown(count, () => {
    overLanes((writer) => writer.chooseStep());
    const { prologue, segments } = lower(trial);
    // What depends on the step alone changes with every trial.
    [prologue, ...segments].forEach((segment, i) => {
      if (segment.length > 0) overLanes((writer) => writer.trial(segment, i === segments.length));
    });
    overLanes((writer) => writer.judge());
    if (!programs.lastIsFirst) {
      lower(first).segments.forEach((segment, i, all) => {
        overLanes((writer) => writer.first(segment, i === all.length - 1));
      });
    }
    code.advance(stream, ATTEMPT_WIDTH * ROW_BYTES);
  });
  return code.finish("attempt");
}

class AttemptWriter {
  readonly #code: LaneCode;
  readonly #programs: AttemptPrograms;
  readonly #rows: AttemptRows;
  readonly #lane: Pointer;
  readonly #stream: Pointer;

  constructor(code: LaneCode, programs: AttemptPrograms, rows: AttemptRows, lane: Pointer, stream: Pointer) {
    this.#code = code;
    this.#programs = programs;
    this.#rows = rows;
    this.#lane = lane;
    this.#stream = stream;
  }

  /** `timeUntil` and `trialStep`. */
  chooseStep(): void {
    const code = this.#code;
    const hi = code.sub(this.#row("endHi"), this.#now(4));
    const remaining = code.add(hi, code.sub(this.#row("endLo"), this.#now(5)));
    const step = this.#load("step");
    const longest = this.#load("longest");
    const reach = this.#smaller(code.mul(step, code.constant(1.0001)), longest);
    const h = code.select(code.lessEqual(remaining, reach), remaining, this.#smaller(step, longest));
    this.#store("remaining", remaining);
    this.#store("h", h);
  }

  trial(segment: readonly number[], last: boolean): void {
    const { trial } = this.#programs;
    const outputs = ["newX", "newY", "newVx", "newVy", "error", "newAx", "newAy"] as const;
    const input = (index: number): Place =>
      index < 4
        ? { pointer: this.#stream, offset: index * ROW_BYTES }
        : this.#place(index === 4 ? "ax" : "ay");
    this.#write(trial, this.#rows.trial.rowOf, segment, last, input, (slot) => this.#place(outputs[slot]!));
  }

  /** The acceleration at the state that the trial has left. */
  first(segment: readonly number[], last: boolean): void {
    const input = (index: number): Place => ({
      pointer: this.#stream,
      offset: (ATTEMPT_WIDTH + index) * ROW_BYTES,
    });
    const output = (slot: number): Place => this.#place(slot === 0 ? "ax" : "ay");
    this.#write(this.#programs.first, this.#rows.first.rowOf, segment, last, input, output);
  }

  #write(
    program: Program,
    rowOf: ProgramPlaces["rowOf"],
    segment: readonly number[],
    last: boolean,
    input: (index: number) => Place,
    output: (slot: number) => Place,
  ): void {
    const places = { lane: this.#lane, rowOf, stepAt: this.#rows.at.h, input, output };
    const writer = new StageWriter(this.#code, program, places);
    writer.write(segment);
    if (last) writer.storeUnmade();
  }

  /** Accepts or rejects the trial and sets the next step. */
  judge(): void {
    const code = this.#code;
    const c = (value: number): Operand => code.constant(value);
    const infinity = c(Number.POSITIVE_INFINITY);
    const finite = (values: readonly Operand[]): Operand =>
      values.map((x) => code.less(code.abs(x), infinity)).reduce((all, mask) => code.and(all, mask));
    const states = [0, 1, 2, 3].map((k) => this.#now(k));
    const made = (["newX", "newY", "newVx", "newVy"] as const).map((name) => this.#load(name));
    const h = this.#load("h");
    const remaining = this.#load("remaining");

    const ratio = code.div(this.#row("error"), this.#row("tolerance"));
    const sound = code.and(finite(made), code.greaterEqual(ratio, c(0)));
    const error = code.select(sound, ratio, infinity);
    const within = code.lessEqual(error, c(1));
    const hopeless = code.not(finite(states));
    const shortest = code.lessEqual(h, this.#row("smallest"));
    const active = code.greater(remaining, c(0));
    const accepted = code.and(code.or(code.or(within, hopeless), shortest), active);
    const rejected = code.andNot(active, accepted);

    const last = code.equal(h, remaining);
    this.#writeTime(h, last, accepted);
    states.forEach((old, k) => {
      this.#next(k, code.select(accepted, made[k]!, old));
    });
    if (this.#programs.lastIsFirst) {
      for (const [name, next] of [
        ["ax", "newAx"],
        ["ay", "newAy"],
      ] as const) {
        this.#store(name, code.select(accepted, this.#row(next), this.#row(name)));
      }
    }

    const count = (name: AttemptRow, mask: Operand): void => {
      this.#store(name, code.add(this.#row(name), code.and(mask, c(1))));
    };
    count("acceptedCount", accepted);
    count("rejectedCount", rejected);
    const smallest = this.#load("smallestStep");
    const counts = code.and(accepted, code.or(code.not(last), code.equal(smallest, infinity)));
    this.#store("smallestStep", code.select(counts, this.#smaller(smallest, h), smallest));
    this.#writeController(error, h, accepted, rejected, active);
  }

  /** `advanceTime`, or the end itself. */
  #writeTime(h: Operand, last: Operand, accepted: Operand): void {
    const code = this.#code;
    const [hi, lo] = [this.#now(4), this.#now(5)];
    const sum = code.add(hi, h);
    const part = code.sub(sum, hi);
    const error = code.add(code.add(code.sub(hi, code.sub(sum, part)), code.sub(h, part)), lo);
    const newHi = code.add(sum, error);
    const newLo = code.sub(error, code.sub(newHi, sum));
    this.#next(4, code.select(accepted, code.select(last, this.#row("endHi"), newHi), hi));
    this.#next(5, code.select(accepted, code.select(last, this.#row("endLo"), newLo), lo));
  }

  /** `makeController`; the powers of an error share their square roots, and that of the last accepted error is kept. */
  #writeController(error: Operand, h: Operand, accepted: Operand, rejected: Operand, active: Operand): void {
    const code = this.#code;
    const c = (value: number): Operand => code.constant(value);
    const { proportional, integral, plain } = exponentsOf(this.#programs.lowerOrder);
    const bounded = this.#smaller(error, c(1));
    const base = code.select(accepted, bounded, error);
    const powers = writePowers(code, base, [proportional, integral, plain]);
    const previousPower = this.#load("previousPower");
    const grown = code.div(code.mul(c(safety), previousPower), powers[0]!);
    const most = code.select(this.#row("afterRejection"), c(1), c(largestFactor));
    const afterAccepted = this.#smaller(code.larger(grown, c(smallestFactor)), most);
    const afterRejected = code.larger(code.div(c(safety), powers[2]!), c(smallestFactor));
    const next = code.mul(h, code.select(accepted, afterAccepted, afterRejected));
    this.#store("step", code.select(active, next, this.#row("step")));
    this.#store("afterRejection", code.select(active, rejected, this.#row("afterRejection")));
    const least = power64(smallestPrevious, integral);
    const kept = code.select(code.less(base, c(smallestPrevious)), c(least), powers[1]!);
    this.#store("previousPower", code.select(accepted, kept, previousPower));
  }

  /** Math.min of two numbers, neither of them NaN. */
  #smaller(a: Operand, b: Operand): Operand {
    return this.#code.select(this.#code.less(a, b), a, b);
  }

  #place(name: AttemptRow): Place {
    return { pointer: this.#lane, offset: this.#rows.at[name] };
  }
  #row(name: AttemptRow): Operand {
    return this.#code.row(this.#lane, this.#rows.at[name]);
  }
  #load(name: AttemptRow): Operand {
    return this.#code.load(this.#lane, this.#rows.at[name]);
  }
  #store(name: AttemptRow, value: Operand): void {
    this.#code.store(this.#lane, this.#rows.at[name], value);
  }
  #now(k: number): Operand {
    return this.#code.load(this.#stream, k * ROW_BYTES);
  }
  #next(k: number, value: Operand): void {
    this.#code.store(this.#stream, (ATTEMPT_WIDTH + k) * ROW_BYTES, value);
  }
}
