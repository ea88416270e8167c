import { arctangent2, cos, sin, sinCosInto } from "@perigauge/kepler";
import { describe, expect, test } from "vitest";
import { Decimal, precise, ulpsFrom } from "../support/precise.ts";
import { seeded } from "../support/random.ts";

/** 160 digits: a double of 1e100 less the nearest multiple of pi/2 still leaves 40. */
const Wide = Decimal.clone({ precision: 160 });
const widePi = Wide.acos(-1);

describe("sine and cosine of the package", () => {
  test("within 0.9 ulp, near zeros and far out too (60 digits)", () => {
    const random = seeded(11);
    let worst = 0;
    let at = "";
    for (let k = 0; k < 500; k++) {
      const r = random();
      const choices = [
        (r - 0.5) * 2 * Math.PI,
        (r - 0.5) * 3e6,
        Math.round(r * 1e5) * (Math.PI / 2),
        r * 2 ** -Math.floor(60 * random()),
      ];
      const x = choices[k % choices.length]!;
      const exact = new Wide(precise(x).toString());
      const s = ulpsFrom(sin(x), new Decimal(Wide.sin(exact).toString()));
      const c = ulpsFrom(cos(x), new Decimal(Wide.cos(exact).toString()));
      if (Math.max(s, c) > worst) {
        worst = Math.max(s, c);
        at = `x = ${x}: ${s}, ${c}`;
      }
    }
    expect(worst, at).toBeLessThan(0.9);
  });

  test("arguments up to 1e100 are reduced exactly", () => {
    for (const x of [1e16, 1e22, 123456789012345680000, 1e60, 3e99, -1e40]) {
      const exact = new Wide(BigInt(x).toString());
      const rest = exact.sub(widePi.mul(2).mul(exact.div(widePi.mul(2)).round()));
      expect(ulpsFrom(sin(x), new Decimal(Wide.sin(rest).toString())), `sin ${x}`).toBeLessThan(0.9);
      expect(ulpsFrom(cos(x), new Decimal(Wide.cos(rest).toString())), `cos ${x}`).toBeLessThan(0.9);
    }
    // The classic hard case: the double nearest to a multiple of pi/2, Muller et al., Handbook of Floating-Point Arithmetic, section 11.
    expect(Math.abs(cos(6381956970095103 * 2 ** 797))).toBeCloseTo(4.687165924254628e-19, 33);
  });

  test("odd, even, and not a number outside the finite", () => {
    const out = new Float64Array(2);
    for (const x of [0.3, 2.5, 1e5, 1e20]) {
      expect(sin(-x)).toBe(-sin(x));
      expect(cos(-x)).toBe(cos(x));
    }
    sinCosInto(Number.POSITIVE_INFINITY, out);
    expect([...out]).toEqual([Number.NaN, Number.NaN]);
  });
});

describe("arctangent of the package", () => {
  test("within 1.1 ulp in every octant (60 digits)", () => {
    const random = seeded(12);
    let worst = 0;
    let at = "";
    for (let k = 0; k < 500; k++) {
      const y = (random() - 0.5) * 2 ** Math.floor(random() * 30 - 15);
      const x = random() - 0.5;
      const px = precise(x);
      const py = precise(y);
      let exact = Decimal.atan(py.div(px));
      if (x < 0) exact = y < 0 ? exact.sub(Decimal.acos(-1)) : exact.add(Decimal.acos(-1));
      const error = ulpsFrom(arctangent2(y, x), exact);
      if (error > worst) {
        worst = error;
        at = `y = ${y}, x = ${x}`;
      }
    }
    expect(worst, at).toBeLessThan(1.1);
  });

  test("axes, the origin and what is not finite", () => {
    expect(arctangent2(0, 1)).toBe(0);
    expect(arctangent2(0, -1)).toBe(Math.PI);
    expect(arctangent2(1, 0)).toBe(Math.PI / 2);
    expect(arctangent2(-1, 0)).toBe(-Math.PI / 2);
    expect(arctangent2(0, 0)).toBe(0);
    expect(arctangent2(Number.NaN, 1)).toBeNaN();
  });
});
