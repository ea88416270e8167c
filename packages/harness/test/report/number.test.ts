import { describe, expect, it } from "vitest";
import { formatCount, formatNumber, formatTimes, superscript } from "../../src/report/text/number.ts";

const GROUP = "\u202f";
const GAP = "\u00a0";

describe("numbers for people", () => {
  it.each([
    [1.2e-9, `1.2${GAP}×${GAP}10⁻⁹`],
    [-1.25e-12, `−1.25${GAP}×${GAP}10⁻¹²`],
    [0.001, "0.001"],
    // Rounding carries into the next decade.
    [0.00099994, "0.001"],
    [0.0009994, `9.99${GAP}×${GAP}10⁻⁴`],
    [6378.137, `6${GROUP}380`],
    [99_949, `99${GROUP}900`],
    [99_960, `1${GAP}×${GAP}10⁵`],
    [2, "2"],
    [-0.5, "−0.5"],
    [0, "0"],
  ])("%d reads %s", (value, words) => {
    expect(formatNumber(value)).toBe(words);
  });

  it("shows what is not a number as a dash", () => {
    for (const value of [null, undefined, Number.NaN, Number.POSITIVE_INFINITY]) {
      expect(formatNumber(value)).toBe("–");
    }
  });

  it("keeps every digit of a count", () => {
    expect(formatCount(1234567)).toBe(`1${GROUP}234${GROUP}567`);
    expect(formatCount(999)).toBe("999");
  });

  it("gives ratios two digits, and a third just above 1", () => {
    expect(formatTimes(2.345)).toBe("2.3");
    expect(formatTimes(1.047)).toBe("1.05");
    expect(formatTimes(63_686)).toBe(`64${GROUP}000`);
  });

  it("raises every digit of an exponent", () => {
    expect(superscript(-1234567890)).toBe("⁻¹²³⁴⁵⁶⁷⁸⁹⁰");
  });
});
