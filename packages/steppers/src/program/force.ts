import { rational } from "../exact/rational.ts";
import type { Force, ProgramBuilder } from "./builder.ts";
import type { Value } from "./program.ts";

const dot = (b: ProgramBuilder, x: readonly Value[], y: readonly Value[]): Value =>
  x.map((value, k) => b.mul(value, y[k]!)).reduce((total, product) => b.add(total, product));

/**
 * The point mass of gravitational parameter 1, written out: a = q w with w = -1 / (r2 sqrt(r2)): one square root and one division; jerk
 * w (v - 3 (q.v / r2) q).
 */
export const pointMass: Force = {
  acceleration(b, position) {
    const r2 = dot(b, position, position);
    const w = b.div(b.constant(rational(-1n)), b.mul(r2, b.sqrt(r2)));
    return position.map((x) => b.mul(x, w));
  },
  jerk(b, position, velocity) {
    const r2 = dot(b, position, position);
    const w = b.div(b.constant(rational(-1n)), b.mul(r2, b.sqrt(r2)));
    const stretch = b.mul(b.constant(rational(3n)), b.div(dot(b, position, velocity), r2));
    return position.map((x, k) => b.mul(w, b.sub(velocity[k]!, b.mul(stretch, x))));
  },
};

/** A force that the caller of the program supplies. */
export const suppliedForce: Force = {
  acceleration: (b, position) => b.call("acceleration", position),
  jerk: (b, position, velocity) => b.call("jerk", [...position, ...velocity]),
};
