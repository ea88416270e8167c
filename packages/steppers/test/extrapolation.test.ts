import { describe, expect, it } from "vitest";
import { buildExtrapolation, extrapolationWeights, sequenceOf } from "../src/build/extrapolation.ts";
import { divide, equal, multiply, one, rational, sum, zero } from "../src/exact/rational.ts";
import { extrapolations } from "../src/registry.ts";
import { force } from "./support/interpret-double-double.ts";
import { observedOrder } from "./support/observed-order.ts";

const methods = extrapolations.map((method) => [method.id, method] as const);

describe("extrapolation", () => {
  it.each(methods)(
    "%s: weights give 1 for a constant and 0 for each power of 1/n^2 they remove",
    (_, method) => {
      const sequence = sequenceOf(method);
      const weights = extrapolationWeights(sequence);
      expect(method.order).toBe(2 * sequence.length);
      sequence.forEach((_, power) => {
        const terms = weights.map((weight, i) => {
          let term = weight;
          for (let k = 0; k < power; k += 1) term = divide(term, multiply(sequence[i]!, sequence[i]!));
          return term;
        });
        expect(equal(sum(terms), power === 0 ? one : zero)).toBe(true);
      });
    },
  );
  it("is the scheme of Aitken and Neville: two columns of n = 1, 2 weigh -1/3 and 4/3", () => {
    const weights = extrapolationWeights([rational(1n), rational(2n)]);
    expect(equal(weights[0]!, rational(-1n, 3n))).toBe(true);
    expect(equal(weights[1]!, rational(4n, 3n))).toBe(true);
  });
  it.each(methods)(
    "%s: the formula it is compared with at variable step has two orders less",
    (_, method) => {
      const shorter = { ...method, sequence: method.sequence.split(" ").slice(1).join(" ") };
      const program = buildExtrapolation(shorter, { dimension: 2, summation: "plain", force });
      const coarse = method.order - 2 >= 10 ? 24 : 64;
      expect(Math.abs(observedOrder(program, coarse).order - (method.order - 2))).toBeLessThan(0.15);
    },
  );
});
