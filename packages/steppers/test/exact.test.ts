import { Decimal } from "decimal.js";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { parseCoefficient, parseRow } from "../src/exact/coefficients.ts";
import {
  add,
  divide,
  equal,
  fromDouble,
  multiply,
  rational,
  subtract,
  toDouble,
  toDoubleDouble,
} from "../src/exact/rational.ts";
import { InvalidInputError } from "../src/index.ts";
import { advanceTime, timeUntil } from "../src/run/double-double.ts";

const whole = fc.bigInt({ min: -(10n ** 30n), max: 10n ** 30n });
const fraction = fc.tuple(whole, fc.bigInt({ min: 1n, max: 10n ** 30n })).map(([n, d]) => rational(n, d));

describe("rational numbers", () => {
  it("round to the nearest double, as division of exact doubles does", () => {
    const exact = fc.integer({ min: -(2 ** 31), max: 2 ** 31 - 1 });
    fc.assert(
      fc.property(exact, exact, (n, d) => {
        if (d !== 0) expect(toDouble(rational(BigInt(n), BigInt(d)))).toBe(n === 0 ? 0 : n / d);
      }),
      { seed: 1 },
    );
  });
  it("leave a double-double within 2^-105", () => {
    fc.assert(
      fc.property(fraction, (a) => {
        const [hi, lo] = toDoubleDouble(a);
        const rest = subtract(subtract(a, fromDouble(hi)), fromDouble(lo));
        expect(Math.abs(toDouble(rest))).toBeLessThanOrEqual(2 ** -105 * Math.abs(hi));
      }),
      { seed: 2 },
    );
  });
  it("form a field", () => {
    fc.assert(
      fc.property(fraction, fraction, fraction, (a, b, c) => {
        expect(equal(multiply(a, add(b, c)), add(multiply(a, b), multiply(a, c)))).toBe(true);
        if (b.numerator !== 0n) expect(equal(multiply(divide(a, b), b), a)).toBe(true);
      }),
      { seed: 3 },
    );
  });
  it("do not divide by zero", () => {
    expect(() => rational(1n, 0n)).toThrow(InvalidInputError);
  });
});

describe("coefficients as text", () => {
  it.each([
    ["1/3", 1 / 3],
    ["-355/33", -355 / 33],
    ["0.1", 0.1],
    ["-8.298e-3", -0.008298],
    ["0.526001519587677318785587544488e-01", 0.05260015195876773],
    ["12", 12],
  ])("%s", (text, value) => {
    expect(toDouble(parseCoefficient(text))).toBe(value);
  });
  it("keep every digit", () => {
    const text = "0.1234567890123456789012345678901234567890";
    const { numerator, denominator } = parseCoefficient(text);
    const exact = new (Decimal.clone({ precision: 60 }))(`${numerator}`).div(`${denominator}`);
    expect(exact.toFixed(40)).toBe(text);
  });
  it.each(["", "x", "1/", "1e", "1..2", "--1", "1/0"])("refuse %j", (text) => {
    expect(() => parseCoefficient(text)).toThrow(InvalidInputError);
  });
  it("stand in rows, over several lines", () => {
    expect(parseRow("\n 1 2/3\n  0.5 ").map(toDouble)).toEqual([1, 2 / 3, 0.5]);
    expect(parseRow("")).toEqual([]);
  });
});

describe("time as a pair", () => {
  it("sums a million steps to 2^-104 a step", () => {
    const time = { hi: 0, lo: 0 };
    for (let n = 0; n < 1e6; n += 1) advanceTime(time, 0.1);
    const exact = multiply(fromDouble(0.1), rational(1000000n));
    const rest = subtract(subtract(exact, fromDouble(time.hi)), fromDouble(time.lo));
    expect(Math.abs(toDouble(rest))).toBeLessThan(1e6 * 2 ** -104 * 1e5);
    expect(timeUntil(time, time.hi, time.lo + 2 ** -60)).toBe(2 ** -60);
  });
});
