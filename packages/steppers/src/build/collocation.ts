import { parseRow } from "../exact/coefficients.ts";
import {
  evaluate,
  fromScaled,
  integral,
  lagrangeBasis,
  type Scaled,
  type ScaledPolynomial,
  scaledOne,
  scaledProduct,
  toScaled,
} from "../exact/lagrange.ts";
import { isZero, type Rational, toDouble } from "../exact/rational.ts";
import type { Collocation } from "../methods/method.ts";
import { ProgramBuilder } from "../program/builder.ts";
import type { Program, Value } from "../program/program.ts";
import type { CollocationInDoubles } from "../run/radau.ts";
import type { NystromRows } from "./nystrom.ts";
import type { Setting } from "./step-program.ts";
import { compensations, RunningState } from "./summation.ts";

/** What follows from the nodes c: a Nystrom method for the accelerations at the nodes, and how they extend into the next step. */
export interface CollocationRows extends NystromRows {
  /** Row i: weights of this step's accelerations for those at 1 + c_i. */
  readonly ahead: readonly (readonly Rational[])[];
  /** Weights of the highest coefficient of the acceleration's polynomial, in units of the step. */
  readonly highest: readonly Rational[];
}

/** Gauss: q' = v, v' = a(q) collocated as one system, so stage positions use the square of the first-order matrix. */
export function gaussRows(method: Collocation): CollocationRows {
  const { matrix, weights, ...rest } = integrals(method);
  const through = (row: readonly Scaled[]): Rational[] =>
    row.map((_, k) => fromScaled(row.reduce((total, x, j) => total + scaledProduct(x, matrix[j]![k]!), 0n)));
  return { ...rest, velocity: weights.map(fromScaled), a: matrix.map(through), position: through(weights) };
}

/** Everhart: the polynomial of the acceleration integrated once for the velocity and twice for the position. */
export function radauRows(method: Collocation): CollocationRows {
  const { nodes, basis, weights, ...rest } = integrals(method);
  const twice = basis.map((polynomial) => integral(integral(polynomial)));
  const at = (x: Scaled): Rational[] => twice.map((polynomial) => fromScaled(evaluate(polynomial, x)));
  return { ...rest, velocity: weights.map(fromScaled), a: nodes.map(at), position: at(scaledOne) };
}

/** The first-order matrix and weights, exactly as far as the nodes are. */
export function firstOrder(method: Collocation): {
  a: readonly (readonly Rational[])[];
  b: readonly Rational[];
} {
  const { matrix, weights } = integrals(method);
  return { a: matrix.map((row) => row.map(fromScaled)), b: weights.map(fromScaled) };
}

function integrals(method: Collocation) {
  const c = parseRow(method.nodes);
  const nodes = c.map(toScaled);
  const basis = lagrangeBasis(nodes);
  const once = basis.map(integral);
  return {
    c,
    nodes,
    basis,
    matrix: nodes.map((node) => once.map((polynomial) => evaluate(polynomial, node))),
    weights: once.map((polynomial) => evaluate(polynomial, scaledOne)),
    ahead: nodes.map((node) => basis.map((polynomial) => fromScaled(evaluate(polynomial, scaledOne + node)))),
    highest: basis.map((polynomial) => fromScaled(polynomial.at(-1)!)),
  };
}

/** Nodes, basis polynomials and dense-output rows, rounded. */
export function inDoubles(method: Collocation): CollocationInDoubles {
  const { c, basis } = integrals(method);
  const rounded = (rows: readonly ScaledPolynomial[]): number[][] =>
    rows.map((row) => row.map((x) => toDouble(fromScaled(x))));
  return {
    nodes: c.map(toDouble),
    basis: rounded(basis),
    position: rounded(basis.map((polynomial) => integral(integral(polynomial)).slice(2))),
    velocity: rounded(basis.map((polynomial) => integral(polynomial).slice(1))),
  };
}

/**
 * The straight-line parts of an implicit step. `sweep`: state and node accelerations in; new node accelerations, their largest change and
 * their largest size out. `finish`: state, compensations and node accelerations in; new state and compensations, then a guess of the next
 * step's node accelerations, then the size of the polynomial's highest term out.
 */
export interface CollocationProgram {
  readonly stages: number;
  readonly first: Program;
  readonly sweep: Program;
  readonly finish: Program;
}

export function buildCollocation(
  rows: CollocationRows,
  { dimension: d, summation, force }: Setting,
): CollocationProgram {
  const stages = rows.c.length;
  const axes = Array.from({ length: d }, (_, k) => k);
  const first = new ProgramBuilder(d, 2 * d, force);
  const size = (b: ProgramBuilder, vector: readonly Value[]): Value =>
    vector.map((x) => b.abs(x)).reduce((most, x) => b.max(most, x));

  const s = new ProgramBuilder(d, 2 * d + stages * d, force);
  const [q, v] = [s.vector(0), s.vector(d)];
  const old = rows.c.map((_, i) => s.vector(2 * d + i * d));
  // Each node uses what this sweep has already made: fewer sweeps, the same solution.
  const newest = [...old];
  rows.c.forEach((c, i) => {
    // A node at the start of the step has the acceleration of the state, which does not change.
    if (isZero(c)) return;
    newest[i] = s.acceleration(
      axes.map((k) => {
        const pull = s.mul(s.step, s.weightedSum(rows.a[i]!, along(newest, k))!);
        return s.add(q[k]!, s.mul(s.step, s.add(s.scale(c, v[k]!), pull)));
      }),
    );
  });
  const changes = newest.flatMap((acceleration, i) => acceleration.map((x, k) => s.sub(x, old[i]![k]!)));

  const extra = compensations(d, summation);
  const nodesAt = 2 * d + extra;
  const f = new ProgramBuilder(d, nodesAt + stages * d, force);
  const state = new RunningState(f, summation);
  const velocity = [...state.velocity];
  const nodes = rows.c.map((_, i) => f.vector(nodesAt + i * d));
  for (const k of axes) {
    const pull = f.mul(f.step, f.weightedSum(rows.position, along(nodes, k))!);
    state.drift(k, f.mul(f.step, f.add(velocity[k]!, pull)));
    state.kick(k, f.mul(f.step, f.weightedSum(rows.velocity, along(nodes, k))!));
  }
  const guesses = rows.ahead.flatMap((row) => axes.map((k) => f.weightedSum(row, along(nodes, k))!));
  const highest = axes.map((k) => f.weightedSum(rows.highest, along(nodes, k))!);
  return {
    stages,
    first: first.finish(first.acceleration(first.vector(0))),
    sweep: s.finish([...newest.flat(), size(s, changes), size(s, newest.flat())]),
    finish: f.finish([...state.outputs(), ...guesses, size(f, highest)]),
  };
}

const along = (vectors: readonly (readonly Value[])[], k: number): Value[] =>
  vectors.map((vector) => vector[k]!);
