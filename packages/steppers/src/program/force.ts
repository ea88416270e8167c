import { rational } from "../exact/rational.ts";
import type { Force } from "./builder.ts";

/** The point mass of gravitational parameter 1, written out: a = q w with w = -1 / (r2 sqrt(r2)): one square root and one division. */
export const pointMass: Force = (b, position) => {
  const squares = position.map((x) => b.mul(x, x));
  const r2 = squares.reduce((total, square) => b.add(total, square));
  const w = b.div(b.constant(rational(-1n)), b.mul(r2, b.sqrt(r2)));
  return position.map((x) => b.mul(x, w));
};

/** A force that the caller of the program supplies. */
export const suppliedForce: Force = (b, position) => b.call(position);
