import {
  ddAdd,
  ddArctangent2,
  ddDivide,
  ddMultiply,
  ddSinCos,
  ddSinCosDegrees,
  ddSqrt,
  ddSubtract,
  halfPi,
  pi,
  quickTwoSum,
  twoPi,
  twoProduct,
  twoSum,
} from "@perigauge/kepler";
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { Decimal, exactly, type Precise, precisePair, precisePi } from "../support/precise.ts";
import { seeded } from "../support/random.ts";

const u2 = 2 ** -106;
const moderate: fc.Arbitrary<number> = fc
  .double({ min: -1e100, max: 1e100, noNaN: true })
  .map((x) => (Math.abs(x) < 1e-100 ? 0 : x));

function relative(value: { readonly hi: number; readonly lo: number }, exact: Precise): number {
  if (exact.isZero()) return Math.abs(value.hi + value.lo);
  return precisePair(value).sub(exact).div(exact).abs().toNumber();
}

describe("error-free sums and products", () => {
  test("a sum and its error are the exact sum (Knuth, theorem 4.2.2 B)", () => {
    fc.assert(
      fc.property(moderate, moderate, (a, b) => {
        const s = twoSum(a, b);
        expect(s.hi).toBe(a + b);
        expect(
          exactly(s.hi)
            .add(exactly(s.lo))
            .eq(exactly(a).add(exactly(b))),
        ).toBe(true);
        const [big, small] = Math.abs(a) >= Math.abs(b) ? [a, b] : [b, a];
        expect(quickTwoSum(big, small)).toEqual(s);
      }),
      { seed: 1, numRuns: 300 },
    );
  });

  test("a product and its error are the exact product (Dekker 1971, section 5)", () => {
    fc.assert(
      fc.property(moderate, moderate, (a, b) => {
        const p = twoProduct(a, b);
        expect(p.hi).toBe(a * b);
        expect(
          exactly(p.hi)
            .add(exactly(p.lo))
            .eq(exactly(a).mul(exactly(b))),
        ).toBe(true);
      }),
      { seed: 2, numRuns: 300 },
    );
  });
});

describe("double-double operations stay within their bounds (Joldes, Muller & Popescu 2017)", () => {
  const random = seeded(3);
  const pairs = Array.from({ length: 400 }, () => {
    const hi = (random() - 0.5) * 2 ** Math.floor(random() * 40 - 20);
    return twoSum(hi, hi * (random() - 0.5) * 2 ** -53);
  });

  test.each([
    ["add", ddAdd, (a: Precise, b: Precise) => a.add(b), 3],
    ["subtract", ddSubtract, (a: Precise, b: Precise) => a.sub(b), 3],
    ["multiply", ddMultiply, (a: Precise, b: Precise) => a.mul(b), 7],
    ["divide", ddDivide, (a: Precise, b: Precise) => a.div(b), 15],
  ] as const)("%s", (_, own, exact, bound) => {
    let worst = 0;
    for (let k = 0; k + 1 < pairs.length; k++) {
      const a = pairs[k]!;
      const b = pairs[k + 1]!;
      worst = Math.max(worst, relative(own(a, b), exact(precisePair(a), precisePair(b))));
    }
    expect(worst).toBeGreaterThan(0);
    expect(worst / u2).toBeLessThan(bound * 1.001);
  });

  test("square root", () => {
    for (const a of pairs) {
      const size = a.hi < 0 ? { hi: -a.hi, lo: -a.lo } : a;
      expect(relative(ddSqrt(size), precisePair(size).sqrt()) / u2).toBeLessThan(8);
    }
    expect(ddSqrt({ hi: 0, lo: 0 })).toEqual({ hi: 0, lo: 0 });
  });
});

describe("pi", () => {
  test("two words hold pi/2, pi and 2 pi to 2^-106", () => {
    expect(relative(halfPi, precisePi.div(2))).toBeLessThan(u2);
    expect(relative(pi, precisePi)).toBeLessThan(u2);
    expect(relative(twoPi, precisePi.mul(2))).toBeLessThan(u2);
  });
});

describe("sine, cosine and angle in double-double", () => {
  test("within 2^-98 over 1e6 radians", () => {
    const random = seeded(4);
    for (let k = 0; k < 300; k++) {
      const hi = (random() - 0.5) * 2 ** Math.floor(random() * 24 - 3);
      const x = twoSum(hi, hi * (random() - 0.5) * 2 ** -53);
      const exact = precisePair(x);
      const { sin, cos } = ddSinCos(x);
      expect(precisePair(sin).sub(Decimal.sin(exact)).abs().toNumber(), `sin ${x.hi}`).toBeLessThan(2 ** -98);
      expect(precisePair(cos).sub(Decimal.cos(exact)).abs().toNumber(), `cos ${x.hi}`).toBeLessThan(2 ** -98);
    }
  });

  test("the angle of a direction gives the direction back", () => {
    const random = seeded(5);
    for (let k = 0; k < 200; k++) {
      const x = { hi: (random() - 0.5) * 6.28, lo: 0 };
      const { sin, cos } = ddSinCos(x);
      const back = ddArctangent2(sin, cos);
      expect(Math.abs(ddSubtract(back, x).hi), `angle ${x.hi}`).toBeLessThan(2 ** -97);
    }
  });

  test("multiples of 90 degrees are exact", () => {
    expect([0, 90, 180, 270, 360, -90, 720].map((d) => ddSinCosDegrees(d).sin.hi + 0)).toEqual([
      0, 1, 0, -1, 0, -1, 0,
    ]);
    expect([0, 90, 180, 270, 360, -90, 720].map((d) => ddSinCosDegrees(d).cos.hi + 0)).toEqual([
      1, 0, -1, 0, 1, 0, 1,
    ]);
    expect(ddSinCosDegrees(30).sin.hi).toBe(0.5);
    expect(Math.abs(ddSinCosDegrees(30).sin.lo)).toBeLessThan(2 ** -100);
  });
});
