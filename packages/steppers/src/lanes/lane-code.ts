import { type Bytes, doubleBytes, type FunctionCode, opcode, signed, simd, unsigned } from "./encoder.ts";
import type { Operand, Pointer } from "./lane-layout.ts";

const pushLocal = (local: number): number[] => [...opcode.localGet, ...unsigned(local)];
const memoryAt = (offset: number): number[] => [0x03, ...unsigned(offset)];

const unpackLow = [0, 1, 2, 3, 4, 5, 6, 7, 16, 17, 18, 19, 20, 21, 22, 23];
const unpackHigh = [8, 9, 10, 11, 12, 13, 14, 15, 24, 25, 26, 27, 28, 29, 30, 31];

/**
 * Writes the body of one function on pairs of lanes. Every operation makes a new value; an operation already made on the same operands is
 * not made again. Masks are vectors of all ones or all zeros per lane.
 */
export class LaneCode {
  #body: number[] = [];
  #known = new Map<string, Operand>();
  readonly #parameters: number;
  #i32Locals = 0;
  /** Bodies refer to v128 locals, which come after all i32 locals, before the number of those is known. */
  readonly #firstVector: number;
  #v128Locals = 0;

  /** `pointers`: how many i32 locals the body will ask for at most. */
  constructor(parameters: number, pointers: number) {
    this.#parameters = parameters;
    this.#firstVector = parameters + pointers;
  }

  parameter(index: number): Pointer {
    return { local: index, push: pushLocal(index) };
  }

  pointer(): Pointer {
    const local = this.#parameters + this.#i32Locals;
    if (local >= this.#firstVector) throw new Error("lane code: more pointers than were announced");
    this.#i32Locals += 1;
    return { local, push: pushLocal(local) };
  }

  emit(...parts: readonly Bytes[]): void {
    for (const part of parts) for (const byte of part) this.#body.push(byte);
  }

  // Integers.

  /** pointer = sum of the terms, each an operand or a number. */
  set(pointer: Pointer, ...terms: readonly (Operand | number)[]): void {
    terms.forEach((term, i) => {
      this.emit(typeof term === "number" ? [...opcode.i32Const, ...signed(term)] : term.push);
      if (i > 0) this.emit(opcode.i32Add);
    });
    this.emit(opcode.localSet, unsigned(pointer.local));
  }

  /** pointer = factor * count + base. */
  setScaled(pointer: Pointer, count: Operand, factor: number, base: number): void {
    this.emit(count.push, opcode.i32Const, signed(factor), opcode.i32Multiply);
    this.emit(opcode.i32Const, signed(base), opcode.i32Add, opcode.localSet, unsigned(pointer.local));
  }

  advance(pointer: Pointer, by: number): void {
    this.set(pointer, pointer, by);
  }

  storeInteger(pointer: Pointer, offset: number, value: Operand): void {
    this.emit(pointer.push, value.push, opcode.i32Store, [0x02, ...unsigned(offset)]);
  }

  /** Runs `body` while counter < limit, at least once; `body` advances the counter. Values made inside are not known outside. */
  repeat(counter: Pointer, limit: Operand, body: () => void): void {
    this.emit(opcode.loop);
    this.#within(new Map(), body);
    this.emit(counter.push, limit.push, opcode.i32LessUnsigned, opcode.branchIf, [0], opcode.end);
  }

  /** Runs `body` `counter` times, at least once, counting it down to zero. */
  countDown(counter: Pointer, body: () => void): void {
    this.emit(opcode.loop);
    this.#within(new Map(), body);
    this.set(counter, counter, -1);
    this.emit(counter.push, opcode.branchIf, [0], opcode.end);
  }

  /** Runs `body` if the condition, an i32 pushed by `condition`, is not zero. */
  when(condition: Bytes, body: () => void): void {
    this.emit(condition, opcode.if);
    this.#within(new Map(this.#known), body);
    this.emit(opcode.end);
  }

  anyTrue(mask: Operand): Bytes {
    return [...mask.push, ...simd.anyTrue];
  }

  #within(known: Map<string, Operand>, body: () => void): void {
    const outer = this.#known;
    this.#known = known;
    body();
    this.#known = outer;
  }

  // Vectors.

  constant(value: number): Operand {
    const bytes = doubleBytes(value);
    return { push: [...simd.constant, ...bytes, ...bytes] };
  }

  /** Row at pointer + offset, read anew at each use. */
  row(pointer: Pointer, offset: number): Operand {
    return { push: [...pointer.push, ...simd.load, ...memoryAt(offset)] };
  }

  /** Row at pointer + offset, read now. */
  load(pointer: Pointer, offset: number): Operand {
    return this.#value(this.row(pointer, offset).push);
  }

  store(pointer: Pointer, offset: number, value: Operand): void {
    this.emit(pointer.push, value.push, simd.store, memoryAt(offset));
  }

  /** A value that may be assigned again; not shared with equal ones. */
  variable(value: Operand): Operand & { readonly local: number } {
    const local = this.#newVector();
    this.emit(value.push, opcode.localSet, unsigned(local));
    return { local, push: pushLocal(local) };
  }

  assign(variable: { readonly local: number }, value: Operand): void {
    this.emit(value.push, opcode.localSet, unsigned(variable.local));
  }

  add(a: Operand, b: Operand): Operand {
    return this.#apply(simd.add, a, b);
  }
  sub(a: Operand, b: Operand): Operand {
    return this.#apply(simd.sub, a, b);
  }
  mul(a: Operand, b: Operand): Operand {
    return this.#apply(simd.mul, a, b);
  }
  div(a: Operand, b: Operand): Operand {
    return this.#apply(simd.div, a, b);
  }
  /** a > b ? a : b */
  larger(a: Operand, b: Operand): Operand {
    return this.#apply(simd.pmax, b, a);
  }
  sqrt(a: Operand): Operand {
    return this.#apply(simd.sqrt, a);
  }
  abs(a: Operand): Operand {
    return this.#apply(simd.abs, a);
  }
  negate(a: Operand): Operand {
    return this.#apply(simd.negate, a);
  }
  floor(a: Operand): Operand {
    return this.#apply(simd.floor, a);
  }
  less(a: Operand, b: Operand): Operand {
    return this.#apply(simd.less, a, b);
  }
  lessEqual(a: Operand, b: Operand): Operand {
    return this.#apply(simd.lessEqual, a, b);
  }
  greater(a: Operand, b: Operand): Operand {
    return this.#apply(simd.greater, a, b);
  }
  greaterEqual(a: Operand, b: Operand): Operand {
    return this.#apply(simd.greaterEqual, a, b);
  }
  equal(a: Operand, b: Operand): Operand {
    return this.#apply(simd.equal, a, b);
  }
  notEqual(a: Operand, b: Operand): Operand {
    return this.#apply(simd.notEqual, a, b);
  }
  and(a: Operand, b: Operand): Operand {
    return this.#apply(simd.and, a, b);
  }
  /** a and not b. */
  andNot(a: Operand, b: Operand): Operand {
    return this.#apply(simd.andNot, a, b);
  }
  or(a: Operand, b: Operand): Operand {
    return this.#apply(simd.or, a, b);
  }
  not(a: Operand): Operand {
    return this.#apply(simd.not, a);
  }
  /** `yes` where the mask is set. */
  select(mask: Operand, yes: Operand, no: Operand): Operand {
    return this.#apply(simd.bitSelect, yes, no, mask);
  }
  addIntegers(a: Operand, b: Operand): Operand {
    return this.#apply(simd.i64Add, a, b);
  }
  shiftRight(a: Operand, bits: number): Operand {
    return this.#value([...a.push, ...opcode.i32Const, ...signed(bits), ...simd.i64ShiftRightUnsigned]);
  }
  shiftLeft(a: Operand, bits: number): Operand {
    return this.#value([...a.push, ...opcode.i32Const, ...signed(bits), ...simd.i64ShiftLeft]);
  }
  /** (a of lane 0, b of lane 0). */
  lows(a: Operand, b: Operand): Operand {
    return this.#value([...a.push, ...b.push, ...simd.shuffle, ...unpackLow]);
  }
  /** (a of lane 1, b of lane 1). */
  highs(a: Operand, b: Operand): Operand {
    return this.#value([...a.push, ...b.push, ...simd.shuffle, ...unpackHigh]);
  }
  /** target |= the mask's bits of the pair, moved to the places of its lanes; `lane` counts lanes by eight bytes. */
  joinBits(target: Pointer, mask: Operand, lane: Pointer): void {
    this.emit(target.push, mask.push, simd.i64Bitmask);
    this.emit(lane.push, opcode.i32Const, signed(3), opcode.i32ShiftRightUnsigned, opcode.i32ShiftLeft);
    this.emit(opcode.i32Or, opcode.localSet, unsigned(target.local));
  }

  /** target |= source. */
  join(target: Pointer, source: Pointer): void {
    this.emit(target.push, source.push, opcode.i32Or, opcode.localSet, unsigned(target.local));
  }

  /** Lower 32 bits of a lane into a pointer. */
  extract(pointer: Pointer, a: Operand, lane: 0 | 1): void {
    this.emit(
      a.push,
      simd.i64ExtractLane,
      [lane],
      opcode.i32WrapI64,
      opcode.localSet,
      unsigned(pointer.local),
    );
  }

  finish(name: string, result?: Operand): FunctionCode {
    return {
      name,
      parameters: this.#parameters,
      returnsI32: result !== undefined,
      i32Locals: this.#firstVector - this.#parameters,
      v128Locals: this.#v128Locals,
      body: result === undefined ? this.#body : [...this.#body, ...result.push],
    };
  }

  #apply(operation: Bytes, ...operands: readonly Operand[]): Operand {
    return this.#value([...operands.flatMap(({ push }) => push), ...operation]);
  }

  #value(code: Bytes): Operand {
    const key = code.join(" ");
    const known = this.#known.get(key);
    if (known !== undefined) return known;
    const local = this.#newVector();
    this.emit(code, opcode.localSet, unsigned(local));
    const value = { push: pushLocal(local) };
    this.#known.set(key, value);
    return value;
  }

  #newVector(): number {
    const local = this.#firstVector + this.#v128Locals;
    this.#v128Locals += 1;
    return local;
  }
}
