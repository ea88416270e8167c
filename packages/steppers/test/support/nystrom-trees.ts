import { dot, type Fixed, over, size, times, whole } from "./fixed-point.ts";

/**
 * Special Nystrom trees for q'' = a(q) (Hairer, Nørsett & Wanner I, sect. II.14): an acceleration vertex with children that are velocities
 * (phi = c_i each) or further accelerations (phi = sum_j a_ij phi_j). `order` is the power of h with which the tree enters the velocity; it
 * enters the position with one more. `share` is such that the exact solution has share theta^(order - 1) there.
 */
interface Tree {
  readonly order: number;
  readonly velocities: number;
  readonly accelerations: readonly Tree[];
  /** share = 1 / density. */
  readonly density: number;
}

const byOrder: Tree[][] = [[]];

function treesOfOrder(order: number): readonly Tree[] {
  for (let n = byOrder.length; n <= order; n += 1) {
    const smaller = byOrder.slice(0, n).flat();
    byOrder[n] = Array.from({ length: n }, (_, velocities) => velocities).flatMap((velocities) =>
      forests(n - 1 - velocities, smaller).map((accelerations) => ({
        order: n,
        velocities,
        accelerations,
        density: accelerations.reduce((d, tree) => d * tree.density * tree.order * (tree.order + 1), 1),
      })),
    );
  }
  return byOrder[order]!;
}

/** Multisets of trees whose orders plus one each make `total`. */
function forests(total: number, trees: readonly Tree[]): Tree[][] {
  if (total === 0) return [[]];
  return trees.flatMap((tree, i) =>
    tree.order + 1 > total
      ? []
      : forests(total - tree.order - 1, trees.slice(i)).map((rest) => [tree, ...rest]),
  );
}

export interface NystromFixed {
  readonly c: readonly Fixed[];
  /** Square; zeros where a stage does not use another. */
  readonly a: readonly (readonly Fixed[])[];
  readonly position: readonly Fixed[];
  readonly velocity: readonly Fixed[];
}

/**
 * Largest residual of the conditions of exactly each order up to `order` (index 0 unused): sum velocity_i phi_i = theta^n share / n for
 * trees of order n, sum position_i phi_i = theta^(n+1) share / (n (n + 1)) for trees of order n - 1.
 */
export function nystromResiduals(method: NystromFixed, order: number, theta: Fixed = whole(1)): number[] {
  const weights = new Map<Tree, Fixed[]>();
  const weightsOf = (tree: Tree): Fixed[] => {
    let found = weights.get(tree);
    if (found === undefined) {
      const inner = tree.accelerations.map(sumsOf);
      found = method.c.map((c, i) => {
        let value = whole(1);
        for (let k = 0; k < tree.velocities; k += 1) value = times(value, c);
        return inner.reduce((product, sums) => times(product, sums[i]!), value);
      });
      weights.set(tree, found);
    }
    return found;
  };
  const sums = new Map<Tree, Fixed[]>();
  function sumsOf(tree: Tree): Fixed[] {
    let found = sums.get(tree);
    if (found === undefined) {
      found = method.a.map((row) => dot(row, weightsOf(tree)));
      sums.set(tree, found);
    }
    return found;
  }
  const residuals = [0];
  let power = whole(1);
  for (let n = 1; n <= order; n += 1) {
    power = times(power, theta);
    const exact = power;
    const velocity = treesOfOrder(n).map((tree) =>
      size(dot(method.velocity, weightsOf(tree)) - over(exact, tree.density * n)),
    );
    const position = treesOfOrder(n - 1).map((tree) =>
      size(dot(method.position, weightsOf(tree)) - over(exact, tree.density * (n - 1) * n)),
    );
    residuals.push(Math.max(...velocity, ...position, 0));
  }
  return residuals;
}
