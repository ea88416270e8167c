import { describe, expect, it } from "vitest";
import { gaussJacksonWeights } from "../src/build/gauss-jackson.ts";
import { type Rational, rational } from "../src/exact/rational.ts";
import { cumulative, logarithm, product, reciprocal } from "../src/exact/series.ts";
import { adamsBashforth, adamsMoulton, cowell, stormer } from "../src/methods/multistep/multistep.ts";

const text = ({ numerator, denominator }: Rational): string =>
  denominator === 1n ? `${numerator}` : `${numerator}/${denominator}`;
const adams = reciprocal(logarithm(8));

describe("series of Hairer, Nørsett & Wanner, Solving ODEs I, sects. III.1 and III.10", () => {
  it("Adams-Bashforth gamma", () => {
    expect(cumulative(adams).slice(0, 7).map(text).join(" ")).toBe(
      "1 1/2 5/12 3/8 251/720 95/288 19087/60480",
    );
  });
  it("Adams-Moulton gamma*", () => {
    expect(adams.slice(0, 7).map(text).join(" ")).toBe("1 -1/2 -1/12 -1/24 -19/720 -3/160 -863/60480");
  });
  it("Størmer sigma and Cowell sigma*", () => {
    const series = product(adams, adams);
    expect(series.map(text).join(" ")).toBe("1 -1 1/12 0 -1/240 -1/240 -221/60480 -19/6048");
    expect(cumulative(series).map(text).join(" ")).toBe("1 0 1/12 1/12 19/240 3/40 863/12096 275/4032");
  });
});

describe("weights", () => {
  it("four-step Adams-Bashforth and the corrector beside it", () => {
    expect(adamsBashforth(4).map(text).join(" ")).toBe("55/24 -59/24 37/24 -3/8");
    expect(adamsMoulton(4).map(text).join(" ")).toBe("3/8 19/24 -5/24 1/24");
  });
  it("Gauss-Jackson with eighth differences: first and last weights of the published table rows", () => {
    const { velocity, position, nextPosition } = gaussJacksonWeights(9);
    expect([velocity[0]!, velocity[8]!].map(text)).toEqual(["-63887/89600", "-8183/1036800"]);
    expect([position[0]!, position[8]!].map(text)).toEqual(["3250433/53222400", "-330157/159667200"]);
    expect([nextPosition[0]!, nextPosition[8]!].map(text)).toEqual([
      "103798439/159667200",
      "3250433/53222400",
    ]);
  });
  it.each([4, 8, 13])("%d terms are exact for polynomials of degree below that", (terms) => {
    // f = x^m: y' = f over one step, y'' = f over two, exactly; points 0, -1, -2, ... and, implicit, 1, 0, -1, ...
    for (let m = 0n; m < BigInt(terms); m += 1n) {
      const at = (weights: readonly Rational[], first: bigint): Rational => {
        let n = rational(0n);
        weights.forEach((w, k) => {
          const x = (first - BigInt(k)) ** m;
          n = rational(
            n.numerator * w.denominator + w.numerator * x * n.denominator,
            n.denominator * w.denominator,
          );
        });
        return n;
      };
      const single = rational(1n, m + 1n);
      const second = m % 2n === 0n ? rational(2n, (m + 1n) * (m + 2n)) : rational(0n);
      expect(text(at(adamsBashforth(terms), 0n))).toBe(text(single));
      expect(text(at(adamsMoulton(terms), 1n))).toBe(text(single));
      expect(text(at(stormer(terms), 0n))).toBe(text(second));
      expect(text(at(cowell(terms), 1n))).toBe(text(second));
    }
  });
});
