import { lower } from "../program/lower.ts";
import type { Program } from "../program/program.ts";
import { type FunctionCode, opcode, signed } from "./encoder.ts";
import { LaneCode } from "./lane-code.ts";
import { PAIR_BYTES, type Pointer, ROW_BYTES } from "./lane-layout.ts";
import { type ProgramPlaces, StageWriter } from "./stage-writer.ts";
import { type StepRows, stepRows } from "./step-rows.ts";

/** Pointers to the pair of lanes at work: in the working rows, in the stream, in the two buffers of carried variables. */
interface Places {
  readonly lane: Pointer;
  readonly stream: Pointer;
  readonly from: Pointer;
  readonly to: Pointer;
}

/**
 * The function `advance(steps, stream, width)` of a step program, steps >= 1. Row 0 of the stream holds the streamed loop variables (the
 * state, then the time where steps are uneven); step n writes row n. `width` is 16 bytes times the pairs of lanes in use.
 *
 * Each stage is a loop over pairs of lanes; what a later stage needs crosses in memory, so that the size of the code does not depend on
 * the number of lanes and little is spilled. Carried variables are read from one buffer and written to another; the two change places at
 * every step, and the first holds the newest values at the end.
 */
export function stepCode(program: Program): FunctionCode {
  const rows = stepRows(program);
  const code = new LaneCode(3, 6);
  const [steps, stream, width] = [code.parameter(0), code.parameter(1), code.parameter(2)];
  const places = { lane: code.pointer(), stream: code.pointer(), from: code.pointer(), to: code.pointer() };
  const [carriedIn, carriedOut] = [code.pointer(), code.pointer()];
  const { segments, prologue } = lower(program);
  const carries = rows.carried.length > 0;
  const programPlaces = stepPlaces(rows, places);

  const overLanes = (body: () => void): void => {
    code.set(places.lane, 0);
    code.set(places.stream, stream);
    if (carries) {
      code.set(places.from, carriedIn);
      code.set(places.to, carriedOut);
    }
    const { lane, stream: place, from, to } = places;
    code.repeat(lane, width, () => {
      body();
      for (const pointer of carries ? [lane, place, from, to] : [lane, place])
        code.advance(pointer, PAIR_BYTES);
    });
  };

  code.set(carriedIn, rows.carriedAt[0]);
  code.set(carriedOut, rows.carriedAt[1]);
  overLanes(() => new StageWriter(code, program, programPlaces).write(prologue));
  code.countDown(steps, () => {
    segments.forEach((segment, i) => {
      overLanes(() => {
        const writer = new StageWriter(code, program, programPlaces);
        writer.write(segment);
        if (i === segments.length - 1) writer.storeUnmade();
      });
    });
    if (carries) {
      code.set(places.from, carriedIn);
      code.set(carriedIn, carriedOut);
      code.set(carriedOut, places.from);
    }
    code.advance(stream, rows.streamed.length * ROW_BYTES);
  });
  if (carries) {
    // After an odd number of steps the newest values stand in the second buffer.
    code.when([...carriedIn.push, ...opcode.i32Const, ...signed(rows.carriedAt[0]), ...opcode.i32Sub], () => {
      overLanes(() => {
        rows.carried.forEach((_, k) => {
          code.store(places.to, k * ROW_BYTES, code.row(places.from, k * ROW_BYTES));
        });
      });
    });
  }
  return code.finish("advance");
}

/** Where a step finds its loop variables and leaves the next ones. */
function stepPlaces({ streamed, carried, rowOf, stepAt }: StepRows, places: Places): ProgramPlaces {
  const { lane, stream, from, to } = places;
  const place = (index: number, next: boolean): { pointer: Pointer; offset: number } => {
    const at = streamed.indexOf(index);
    if (at >= 0) return { pointer: stream, offset: (at + (next ? streamed.length : 0)) * ROW_BYTES };
    return { pointer: next ? to : from, offset: carried.indexOf(index) * ROW_BYTES };
  };
  return {
    lane,
    rowOf,
    stepAt,
    input: (index) => place(index, false),
    output: (slot) => place(slot, true),
  };
}
