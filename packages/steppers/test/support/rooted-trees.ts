import { one } from "../../src/exact/rational.ts";
import { dot, type Fixed, fixed, over, size, times, whole } from "./fixed-point.ts";

/**
 * Rooted trees for y' = f(y): phi_i(tree) = product over children of sum_j a_ij phi_j(child); the method has order p if and only if
 * sum b_i phi_i = 1 / gamma for all trees of up to p vertices (J.C. Butcher 1963; Hairer, Nørsett & Wanner I, Theorem II.2.13).
 */
export interface Tree {
  readonly order: number;
  readonly children: readonly Tree[];
  /** gamma(tree). */
  readonly density: number;
}

const byOrder: Tree[][] = [[]];

/** All rooted trees with that many vertices. */
export function treesOfOrder(order: number): readonly Tree[] {
  for (let n = byOrder.length; n <= order; n += 1) {
    byOrder[n] = forests(n - 1, byOrder.slice(0, n).flat()).map((children) => ({
      order: n,
      children,
      density: children.reduce((product, child) => product * child.density, n),
    }));
  }
  return byOrder[order]!;
}

/** Multisets of trees with so many vertices in all; trees are used in the order given. */
function forests(vertices: number, trees: readonly Tree[]): Tree[][] {
  if (vertices === 0) return [[]];
  return trees.flatMap((tree, i) =>
    tree.order > vertices
      ? []
      : forests(vertices - tree.order, trees.slice(i)).map((rest) => [tree, ...rest]),
  );
}

/** Largest |sum b_i phi_i - theta^order / gamma| over the trees of exactly each order up to `order`; index 0 is unused. */
export function rungeKuttaResiduals(
  a: readonly (readonly Fixed[])[],
  b: readonly Fixed[],
  order: number,
  theta: Fixed = fixed(one),
): number[] {
  const stages = b.length;
  const weights = new Map<Tree, Fixed[]>();
  const weightsOf = (tree: Tree): Fixed[] => {
    let found = weights.get(tree);
    if (found === undefined) {
      const inner = tree.children.map(sumsOf);
      found = Array.from({ length: stages }, (_, i) =>
        inner.reduce((p, sums) => times(p, sums[i]!), whole(1)),
      );
      weights.set(tree, found);
    }
    return found;
  };
  const sums = new Map<Tree, Fixed[]>();
  function sumsOf(tree: Tree): Fixed[] {
    let found = sums.get(tree);
    if (found === undefined) {
      found = a.map((row) => dot(row, weightsOf(tree)));
      sums.set(tree, found);
    }
    return found;
  }
  const residuals = [0];
  let power = whole(1);
  for (let n = 1; n <= order; n += 1) {
    power = times(power, theta);
    const of = treesOfOrder(n).map((tree) => size(dot(b, weightsOf(tree)) - over(power, tree.density)));
    residuals.push(Math.max(...of));
  }
  return residuals;
}
