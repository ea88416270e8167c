import { Decimal } from "decimal.js";
import { describe, expect, it } from "vitest";
import { compose, factorsOf } from "../src/build/composition.ts";
import { operationsOf, type SplittingOperation } from "../src/build/splitting.ts";
import { parseRow } from "../src/exact/coefficients.ts";
import type { Rational } from "../src/exact/rational.ts";
import { gaussLegendre } from "../src/methods/collocation/gauss-legendre.ts";
import { gaussRadau15 } from "../src/methods/collocation/gauss-radau-15.ts";
import { compositions, splittings } from "../src/registry.ts";

const D = Decimal.clone({ precision: 50 });
const decimal = ({ numerator, denominator }: Rational): Decimal =>
  new D(`${numerator}`).div(`${denominator}`);
const weightsOf = (id: string): Decimal[] => {
  const composition = compositions.find((method) => method.id === id);
  const rows =
    composition === undefined
      ? operationsOf(splittings.find((m) => m.id === id)!).map((o) => o.weight)
      : factorsOf(composition);
  return rows.map(decimal);
};
/** Digits are printed to 40 figures. */
const close = (a: Decimal, b: Decimal): void => expect(a.minus(b).abs().toNumber()).toBeLessThan(2e-39);

describe("digits against closed forms", () => {
  it("triple jump (Yoshida 1990; Forest & Ruth 1990): 1 / (2 - 2^(1/3))", () => {
    const cube = new D(2).cbrt();
    const [w1, w2] = weightsOf("forest-ruth-4");
    close(w1!, new D(1).div(new D(2).minus(cube)));
    close(w2!, cube.neg().div(new D(2).minus(cube)));
  });
  it("Suzuki 1990: 1 / (4 - 4^(1/3))", () => {
    const cube = new D(4).cbrt();
    const [w1, w2, w3] = weightsOf("suzuki-4");
    close(w1!, new D(1).div(new D(4).minus(cube)));
    close(w2!, w1!);
    close(w3!, cube.neg().div(new D(4).minus(cube)));
  });
  it("McLachlan & Atela 1992, order 2: 1 / sqrt 2 and 1 - 1 / sqrt 2", () => {
    const root = new D(1).div(new D(2).sqrt());
    const [b1, a1, b2, a2] = weightsOf("mclachlan-atela-2");
    close(b1!, new D(1).minus(root));
    close(a1!, root);
    close(b2!, root);
    close(a2!, new D(1).minus(root));
  });
  it("McLachlan 1995, four kicks", () => {
    const root = new D(471).sqrt();
    const [a1, b1, a2, b2] = weightsOf("mclachlan-4-four");
    close(a1!, root.plus(642).div(3924));
    close(b1!, new D(6).div(11));
    close(a2!, new D(12).minus(root).times(121).div(3924));
    close(b2!, new D(1).div(2).minus(b1!));
  });
  it("McLachlan 1995, five kicks", () => {
    const root = new D(19).sqrt();
    const [a1, , a2] = weightsOf("mclachlan-4-five");
    close(a1!, new D(14).minus(root).div(108));
    close(a2!, new D(20).minus(root.times(7)).div(108));
  });
});

describe("collocation nodes are the zeros that define them", () => {
  /** Legendre polynomials P_0 ... P_n at x, by their recurrence. */
  const legendre = (n: number, x: Decimal): Decimal[] => {
    const p = [new D(1), x];
    for (let k = 2; k <= n; k += 1) {
      p.push(
        x
          .times(p[k - 1]!)
          .times(2 * k - 1)
          .minus(p[k - 2]!.times(k - 1))
          .div(k),
      );
    }
    return p;
  };
  it.each(gaussLegendre.map((method) => [method.id, method] as const))("%s: P_s(2c - 1) = 0", (_, method) => {
    const nodes = parseRow(method.nodes).map(decimal);
    expect(nodes).toHaveLength(method.order / 2);
    // |P_s'| is below s (s + 1) / 2 = 21, and x has twice the error of c.
    for (const c of nodes) {
      const value = legendre(nodes.length, c.times(2).minus(1))[nodes.length]!;
      expect(value.abs().toNumber()).toBeLessThan(21 * 2e-39);
    }
  });
  it("gauss-radau-15: (P_7 + P_8)(2c - 1) = 0, the first node at 0", () => {
    const nodes = parseRow(gaussRadau15.nodes).map(decimal);
    expect(nodes[0]!.isZero()).toBe(true);
    for (const c of nodes) {
      const p = legendre(8, c.times(2).minus(1));
      expect(p[7]!.plus(p[8]!).abs().toNumber()).toBeLessThan(64 * 2e-39);
    }
  });
});

/**
 * Order of a splitting of any two flows: in the free algebra on A (drift) and B (kick), the product of the exponentials must agree with
 * exp(A + B) on all words of up to `order` letters (E. Hairer, C. Lubich, G. Wanner 2006, sect. III.5). A word of n letters has the
 * coefficient 1 / n! there.
 */
function genericOrder(operations: readonly SplittingOperation[], upTo: number): number {
  const scale = 10n ** 60n;
  let series = new Map<string, bigint>([["", scale]]);
  for (const { kind, weight } of operations) {
    const w = (weight.numerator * scale) / weight.denominator;
    const letter = kind === "drift" ? "A" : "B";
    const next = new Map<string, bigint>();
    for (const [word, coefficient] of series) {
      let term = coefficient;
      for (let k = 0; word.length + k <= upTo; k += 1) {
        const key = word + letter.repeat(k);
        next.set(key, (next.get(key) ?? 0n) + term);
        term = (term * w) / scale / BigInt(k + 1);
      }
    }
    series = next;
  }
  const factorial = (n: number): bigint => (n <= 1 ? 1n : BigInt(n) * factorial(n - 1));
  let order = upTo;
  for (const [word, coefficient] of series) {
    const defect = Math.abs(Number(coefficient - scale / factorial(word.length))) / 1e60;
    if (defect > 1e-30) order = Math.min(order, word.length - 1);
  }
  return order;
}

describe("order for any two flows", () => {
  it.each(splittings.map((method) => [method.id, method] as const))("%s", (_, method) => {
    const claimed = method.genericOrder ?? method.order;
    expect(genericOrder(operationsOf(method), claimed + 1)).toBe(claimed);
  });
  it.each(compositions.filter(({ order }) => order <= 8).map((method) => [method.id, method] as const))(
    "%s",
    (_, method) => {
      const { order } = method;
      expect(genericOrder(compose(method, "drift"), order)).toBe(order);
      expect(genericOrder(compose(method, "kick"), order)).toBe(order);
    },
  );
});
