import { parseRow } from "../exact/coefficients.ts";
import { equal, isZero, one, type Rational } from "../exact/rational.ts";
import type { EmbeddedNystrom, NystromTableau } from "../methods/method.ts";
import type { ProgramBuilder } from "../program/builder.ts";
import type { StepProgram, Value } from "../program/program.ts";
import { buildPair, difference, type PairProgram } from "./pair.ts";
import { buildStep, type Setting } from "./step-program.ts";

/** The exact coefficients of a Nystrom tableau. */
export interface NystromRows {
  readonly c: readonly Rational[];
  readonly a: readonly (readonly Rational[])[];
  readonly position: readonly Rational[];
  readonly velocity: readonly Rational[];
}

export function nystromRows(method: NystromTableau): NystromRows {
  let rows = parsed.get(method);
  if (rows === undefined) {
    rows = {
      c: parseRow(method.c),
      a: method.a.map(parseRow),
      position: parseRow(method.position),
      velocity: parseRow(method.velocity),
    };
    parsed.set(method, rows);
  }
  return rows;
}

/** A start-up writes many steps of one method: its long fractions are read once. */
const parsed = new WeakMap<NystromTableau, NystromRows>();

/** True where the last stage stands at the new position, so that its acceleration is the next step's first. */
export function nystromLastIsFirst({ c, a, position }: NystromRows): boolean {
  const row = a.at(-1)!;
  return (
    a.length > 1 &&
    equal(c.at(-1)!, one) &&
    isZero(position.at(-1)!) &&
    row.every((weight, j) => equal(weight, position[j]!))
  );
}

/** c h v + h^2 sum weights_i a_i, written h (c v + h sum), or null where both parts are zero. */
function shift(
  b: ProgramBuilder,
  c: Rational,
  velocity: Value,
  weights: readonly Rational[],
  accelerations: readonly Value[],
): Value | null {
  const total = b.weightedSum(weights, accelerations);
  const moved = isZero(c) ? null : b.scale(c, velocity);
  const pulled = total === null ? null : b.mul(b.step, total);
  if (moved !== null && pulled !== null) return b.mul(b.step, b.add(moved, pulled));
  const part = moved ?? pulled;
  return part === null ? null : b.mul(b.step, part);
}

const component = (vectors: readonly (readonly Value[])[], k: number): Value[] =>
  vectors.map((vector) => vector[k]!);

function writeStages(
  b: ProgramBuilder,
  { c, a }: NystromRows,
  q: readonly Value[],
  v: readonly Value[],
  first: readonly Value[] | null,
): Value[][] {
  const accelerations: Value[][] = [];
  a.forEach((row, i) => {
    const position = q.map((value, k) => {
      const change = shift(b, c[i]!, v[k]!, row, component(accelerations, k));
      return change === null ? value : b.add(value, change);
    });
    accelerations.push(i === 0 && first !== null ? [...first] : b.acceleration(position));
  });
  return accelerations;
}

/** One step of fixed h; the acceleration at its end is carried where the last stage gives it. */
export function buildNystrom(method: NystromTableau, setting: Setting): StepProgram {
  const rows = nystromRows(method);
  const carries = nystromLastIsFirst(rows);
  return buildStep(setting, carries, (b, state, carried) => {
    const v = [...state.velocity];
    const accelerations = writeStages(b, rows, state.position, v, carries ? carried : null);
    for (let k = 0; k < b.dimension; k += 1) {
      const along = component(accelerations, k);
      state.drift(k, shift(b, one, v[k]!, rows.position, along)!);
      state.kick(k, b.mul(b.step, b.weightedSum(rows.velocity, along)!));
    }
    return carries ? accelerations.at(-1)! : null;
  });
}

/** One step from (q, v), whose acceleration is known, to (q, v); for starting other methods. */
export function writeNystromStep(
  b: ProgramBuilder,
  method: NystromTableau,
  q: readonly Value[],
  v: readonly Value[],
  first: readonly Value[],
): { readonly position: Value[]; readonly velocity: Value[] } {
  const rows = nystromRows(method);
  const accelerations = writeStages(b, rows, q, v, first);
  return {
    position: q.map((x, k) => b.add(x, shift(b, one, v[k]!, rows.position, component(accelerations, k))!)),
    velocity: v.map((x, k) =>
      b.add(x, b.mul(b.step, b.weightedSum(rows.velocity, component(accelerations, k))!)),
    ),
  };
}

/** The trial step of an embedded Nystrom pair. */
export function buildNystromPair(method: EmbeddedNystrom, setting: Setting): PairProgram {
  const rows = nystromRows(method);
  const positionError = difference(rows.position, parseRow(method.embedded.position));
  const velocityError = difference(rows.velocity, parseRow(method.embedded.velocity));
  return buildPair(setting, (b, q, v, first) => {
    const accelerations = writeStages(b, rows, q, v, first);
    const along = q.map((_, k) => component(accelerations, k));
    const times = (factor: Value, weights: readonly Rational[]): Value[] =>
      along.map((values) => b.mul(factor, b.weightedSum(weights, values)!));
    return {
      position: q.map((value, k) => b.add(value, shift(b, one, v[k]!, rows.position, along[k]!)!)),
      velocity: times(b.step, rows.velocity).map((change, k) => b.add(v[k]!, change)),
      errors: [
        { position: times(b.mul(b.step, b.step), positionError), velocity: times(b.step, velocityError) },
      ],
      next: nystromLastIsFirst(rows) ? accelerations.at(-1)! : null,
      slopes: method.dense === undefined ? [] : accelerations.flat(),
    };
  });
}
