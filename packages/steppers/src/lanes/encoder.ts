/** The few parts of a WebAssembly module (W3C, WebAssembly Core Specification 2.0, sect. 5) that kernels need: bytes in, bytes out. */

export type Bytes = readonly number[];

/** Unsigned LEB128. */
export function unsigned(value: number): number[] {
  const bytes: number[] = [];
  let rest = value;
  do {
    const low = rest % 128;
    rest = Math.floor(rest / 128);
    bytes.push(rest > 0 ? low | 0x80 : low);
  } while (rest > 0);
  return bytes;
}

/** Signed LEB128 of a 32-bit integer. */
export function signed(value: number): number[] {
  const bytes: number[] = [];
  let rest = value | 0;
  for (;;) {
    const low = rest & 0x7f;
    rest >>= 7;
    const done = (rest === 0 && (low & 0x40) === 0) || (rest === -1 && (low & 0x40) !== 0);
    bytes.push(done ? low : low | 0x80);
    if (done) return bytes;
  }
}

/** The eight bytes of a double, lowest first. */
export function doubleBytes(value: number): number[] {
  return [...new Uint8Array(Float64Array.of(value).buffer)];
}

export const valueType = { i32: 0x7f, v128: 0x7b } as const;

/** Instructions without operands in the code stream, or with those that `LaneCode` writes after them. */
export const opcode = {
  if: [0x04, 0x40],
  loop: [0x03, 0x40],
  end: [0x0b],
  branchIf: [0x0d],
  localGet: [0x20],
  localSet: [0x21],
  i32Store: [0x36],
  i32Const: [0x41],
  i32LessUnsigned: [0x49],
  i32Add: [0x6a],
  i32Sub: [0x6b],
  i32Multiply: [0x6c],
  i32Or: [0x72],
  i32ShiftLeft: [0x74],
  i32ShiftRightUnsigned: [0x76],
  i32WrapI64: [0xa7],
} as const;

/** Vector instructions: the prefix 0xfd and an LEB128 number. */
const vector = (number: number): number[] => [0xfd, ...unsigned(number)];

export const simd = {
  load: vector(0x00),
  store: vector(0x0b),
  constant: vector(0x0c),
  shuffle: vector(0x0d),
  equal: vector(0x47),
  notEqual: vector(0x48),
  less: vector(0x49),
  greater: vector(0x4a),
  lessEqual: vector(0x4b),
  greaterEqual: vector(0x4c),
  not: vector(0x4d),
  and: vector(0x4e),
  andNot: vector(0x4f),
  or: vector(0x50),
  bitSelect: vector(0x52),
  anyTrue: vector(0x53),
  floor: vector(0x75),
  i64Bitmask: vector(0xc4),
  i64ShiftLeft: vector(0xcb),
  i64ShiftRightUnsigned: vector(0xcd),
  i64Add: vector(0xce),
  i64ExtractLane: vector(0x1d),
  abs: vector(0xec),
  negate: vector(0xed),
  sqrt: vector(0xef),
  add: vector(0xf0),
  sub: vector(0xf1),
  mul: vector(0xf2),
  div: vector(0xf3),
  /** b < a ? a : b of the operands (b, a): exactly JavaScript's `a > b ? a : b` when pushed in that order. */
  pmax: vector(0xf7),
} as const;

/** One exported function: i32 parameters, then groups of locals. */
export interface FunctionCode {
  readonly name: string;
  readonly parameters: number;
  readonly returnsI32: boolean;
  readonly i32Locals: number;
  readonly v128Locals: number;
  readonly body: Bytes;
}

/** A module that imports `lanes.memory` and exports the functions. */
export function encodeModule(functions: readonly FunctionCode[]): Uint8Array<ArrayBuffer> {
  const types = functions.map(({ parameters, returnsI32 }) => [
    0x60,
    ...vectorOf(Array.from({ length: parameters }, () => [valueType.i32])),
    ...vectorOf(returnsI32 ? [[valueType.i32]] : []),
  ]);
  const memory = [...text("lanes"), ...text("memory"), 0x02, 0x00, 0x01];
  const exports = functions.map(({ name }, index) => [...text(name), 0x00, ...unsigned(index)]);
  const codes = functions.map(({ i32Locals, v128Locals, body }) => {
    const locals = vectorOf([
      [...unsigned(i32Locals), valueType.i32],
      [...unsigned(v128Locals), valueType.v128],
    ]);
    const size = locals.length + body.length + 1;
    return { size, bytes: [locals, body, opcode.end] as const };
  });
  const parts: Bytes[] = [
    [0x00, 0x61, 0x73, 0x6d, 0x01, 0x00, 0x00, 0x00],
    section(1, vectorOf(types)),
    section(2, vectorOf([memory])),
    section(3, vectorOf(functions.map((_, index) => unsigned(index)))),
    section(7, vectorOf(exports)),
  ];
  const codeSize = codes.reduce((sum, { size }) => sum + size + unsigned(size).length, 0);
  const count = unsigned(codes.length);
  parts.push([10, ...unsigned(codeSize + count.length), ...count]);
  for (const { size, bytes } of codes) parts.push(unsigned(size), ...bytes);
  const module = new Uint8Array(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of parts) {
    module.set(part, at);
    at += part.length;
  }
  return module;
}

function vectorOf(items: readonly Bytes[]): number[] {
  return [...unsigned(items.length), ...items.flat()];
}

function text(name: string): number[] {
  const bytes = [...new TextEncoder().encode(name)];
  return [...unsigned(bytes.length), ...bytes];
}

function section(id: number, content: Bytes): number[] {
  return [id, ...unsigned(content.length), ...content];
}
