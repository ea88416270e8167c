import { describe, expect, it } from "vitest";
import { compose } from "../src/build/composition.ts";
import { denseRows } from "../src/build/dense-rows.ts";
import { pairWeights } from "../src/build/runge-kutta.ts";
import { operationsOf, type SplittingOperation } from "../src/build/splitting.ts";
import { parseRow } from "../src/exact/coefficients.ts";
import { add, multiply, one, type Rational, rational, subtract, sum, zero } from "../src/exact/rational.ts";
import { type EmbeddedTableau, hasEmbedded, type Tableau } from "../src/methods/method.ts";
import { compositions, nystromTableaus, splittings, tableaus } from "../src/registry.ts";
import { type Fixed, fixed } from "./support/fixed-point.ts";
import { type NystromFixed, nystromResiduals } from "./support/nystrom-trees.ts";
import { tolerance } from "./support/printed-digits.ts";
import { rungeKuttaResiduals } from "./support/rooted-trees.ts";

const square = (rows: readonly (readonly Rational[])[], width = rows.length): Fixed[][] =>
  rows.map((row) => Array.from({ length: width }, (_, j) => fixed(row[j] ?? zero)));
const fixedRow = (row: readonly Rational[]): Fixed[] => row.map(fixed);
const named = <Method extends { id: string }>(methods: readonly Method[]): (readonly [string, Method])[] =>
  methods.map((method) => [method.id, method]);

/** All conditions up to the order hold, and the next one does not: the claim is neither too high nor too low. */
function expectOrder(residuals: readonly number[], order: number, allowed: number): void {
  expect(Math.max(...residuals.slice(0, order + 1))).toBeLessThan(allowed);
  expect(residuals[order + 1]!).toBeGreaterThan(100 * allowed);
}

describe("Runge-Kutta: rooted trees", () => {
  it.each(named(tableaus))("%s", (_, method) => {
    const a = square(method.a.map(parseRow));
    const allowed = tolerance(method);
    expectOrder(
      rungeKuttaResiduals(a, fixedRow(parseRow(method.b)), method.order + 1),
      method.order,
      allowed,
    );
  });
  it.each(named(tableaus.filter(hasEmbedded)))("%s: embedded formula", (_, method: EmbeddedTableau) => {
    const a = square(method.a.map(parseRow));
    const allowed = tolerance(method);
    const { weights, errors } = pairWeights(method);
    const main = parseRow(method.b);
    const lower = main.map((weight, i) => subtract(weight, errors[0]![i]!));
    const order = method.embedded.order;
    expectOrder(rungeKuttaResiduals(a, fixedRow(lower), order + 1), order, allowed);
    if (method.embedded.advances) expect(weights.map(fixed)).toEqual(lower.map(fixed));
    if (method.embedded.second !== undefined) {
      const third = fixedRow(parseRow(method.embedded.second));
      expectOrder(rungeKuttaResiduals(a, third, 4), 3, allowed);
    }
  });
  it.each(named(tableaus.filter((method) => method.dense !== undefined)))(
    "%s: dense output",
    (_, method: Tableau) => {
      const dense = method.dense!;
      const b = parseRow(method.b);
      const nested = "stages" in dense;
      const a = nested
        ? [...method.a.map(parseRow), b, ...dense.stages.map(parseRow)]
        : method.a.map(parseRow);
      const rows = denseRows(dense, b);
      for (const theta of [rational(1n, 3n), rational(3n, 4n), one]) {
        const weights = rows.map((row) =>
          multiply(
            theta,
            row.reduceRight((v, c) => add(multiply(v, theta), c), zero),
          ),
        );
        const residuals = rungeKuttaResiduals(square(a), fixedRow(weights), dense.order, fixed(theta));
        expect(Math.max(...residuals)).toBeLessThan(10 * tolerance(method));
      }
    },
  );
  it.each(named(tableaus))("%s: explicit, as many weights as stages", (_, method) => {
    expect(parseRow(method.b)).toHaveLength(method.a.length);
    method.a.forEach((row, i) => {
      expect(parseRow(row)).toHaveLength(i);
    });
  });
});

describe("Nystrom: special Nystrom trees", () => {
  const exact = (method: (typeof nystromTableaus)[number]): NystromFixed => ({
    c: fixedRow(parseRow(method.c)),
    a: square(method.a.map(parseRow)),
    position: fixedRow(parseRow(method.position)),
    velocity: fixedRow(parseRow(method.velocity)),
  });
  it.each(named(nystromTableaus))("%s", (_, method) => {
    expectOrder(nystromResiduals(exact(method), method.order + 1), method.order, tolerance(method));
  });
  it.each(named(nystromTableaus))("%s: row sums c^2 / 2", (_, method) => {
    const c = parseRow(method.c);
    method.a.map(parseRow).forEach((row, i) => {
      const half = multiply(rational(1n, 2n), multiply(c[i]!, c[i]!));
      expect(Math.abs(Number(fixed(subtract(sum(row), half))) / 1e70)).toBeLessThan(tolerance(method));
    });
  });
  it.each(named(nystromTableaus.filter(hasEmbedded)))("%s: embedded formula", (_, method) => {
    const { order, position, velocity } = method.embedded;
    const lower = {
      ...exact(method),
      position: fixedRow(parseRow(position)),
      velocity: fixedRow(parseRow(velocity)),
    };
    expectOrder(nystromResiduals(lower, order + 1), order, tolerance(method));
  });
  it.each(named(nystromTableaus.filter((method) => method.dense !== undefined)))(
    "%s: dense output",
    (_, method) => {
      const dense = method.dense!;
      for (const theta of [rational(1n, 3n), rational(3n, 4n), one]) {
        const at = (row: string): Rational =>
          parseRow(row).reduceRight((v, c) => add(multiply(v, theta), c), zero);
        const weights = {
          ...exact(method),
          position: dense.position.map((row) => fixed(multiply(multiply(theta, theta), at(row)))),
          velocity: dense.velocity.map((row) => fixed(multiply(theta, at(row)))),
        };
        const residuals = nystromResiduals(weights, dense.order, fixed(theta));
        expect(Math.max(...residuals)).toBeLessThan(10 * tolerance(method));
      }
    },
  );
});

describe("splittings: as Nystrom methods, kinetic energy quadratic", () => {
  /** Kick i acts at the time c_i drifted so far; position and velocity weights follow from the kicks' weights. */
  const asNystrom = (operations: readonly SplittingOperation[]): NystromFixed => {
    const c: Rational[] = [];
    const kicks: Rational[] = [];
    let time = zero;
    for (const { kind, weight } of operations) {
      if (kind === "drift") time = add(time, weight);
      else {
        c.push(time);
        kicks.push(weight);
      }
    }
    return {
      c: fixedRow(c),
      a: c.map((ci, i) => c.map((cj, j) => fixed(j < i ? multiply(kicks[j]!, subtract(ci, cj)) : zero))),
      position: c.map((ci, i) => fixed(multiply(kicks[i]!, subtract(one, ci)))),
      velocity: fixedRow(kicks),
    };
  };
  it.each(named(splittings))("%s", (_, method) => {
    const residuals = nystromResiduals(asNystrom(operationsOf(method)), method.order + 1);
    expectOrder(residuals, method.order, tolerance(method));
  });
  it.each(named(compositions))("%s, over leapfrog and over velocity Verlet", (_, method) => {
    for (const first of ["drift", "kick"] as const) {
      const residuals = nystromResiduals(asNystrom(compose(method, first)), method.order + 1);
      expectOrder(residuals, method.order, tolerance(method));
    }
  });
});
