import { parseRow } from "../exact/coefficients.ts";
import { add, multiply, type Rational, rational } from "../exact/rational.ts";
import type { Composition } from "../methods/method.ts";
import type { SplittingOperation } from "./splitting.ts";

const half = rational(1n, 2n);

/** All factors of a composition, the mirrored half included. */
export function factorsOf(method: Composition): readonly Rational[] {
  const first = parseRow(method.factors);
  return [...first, ...first.slice(0, -1).reverse()];
}

/** The composition as drifts and kicks, over leapfrog (`first` drift) or velocity Verlet (`first` kick); neighbours are merged. */
export function compose(method: Composition, first: "drift" | "kick"): readonly SplittingOperation[] {
  const factors = factorsOf(method);
  const other = first === "drift" ? "kick" : "drift";
  const operations: SplittingOperation[] = [{ kind: first, weight: multiply(half, factors[0]!) }];
  factors.forEach((factor, i) => {
    const next = factors[i + 1];
    operations.push({ kind: other, weight: factor });
    operations.push({ kind: first, weight: multiply(half, next === undefined ? factor : add(factor, next)) });
  });
  return operations;
}
