import { describe, expect, it } from "vitest";
import { doubleBytes, signed, unsigned } from "../../src/lanes/encoder.ts";

describe("numbers in a module", () => {
  // DWARF Debugging Information Format, version 5, section 7.6, tables 7.7 and 7.8.
  it.each([
    [2, [2]],
    [127, [127]],
    [128, [0x80, 1]],
    [129, [0x81, 1]],
    [12857, [57 + 0x80, 100]],
  ])("unsigned LEB128 of %i", (value, bytes) => {
    expect(unsigned(value)).toEqual(bytes);
  });

  it.each([
    [2, [2]],
    [-2, [0x7e]],
    [127, [127 + 0x80, 0]],
    [-127, [1 + 0x80, 0x7f]],
    [128, [0x80, 1]],
    [-128, [0x80, 0x7f]],
    [129, [1 + 0x80, 1]],
    [-129, [0x7f + 0x80, 0x7e]],
  ])("signed LEB128 of %i", (value, bytes) => {
    expect(signed(value)).toEqual(bytes);
  });

  // IEEE 754: 1 is 0x3ff0000000000000.
  it("a double lies lowest byte first", () => {
    expect(doubleBytes(1)).toEqual([0, 0, 0, 0, 0, 0, 0xf0, 0x3f]);
    expect(doubleBytes(-0)).toEqual([0, 0, 0, 0, 0, 0, 0, 0x80]);
  });
});
