import { pi } from "../arithmetic/constants.ts";
import {
  type DoubleDouble,
  ddAdd,
  ddDivide,
  ddMultiply,
  ddOf,
  ddScale,
  ddSubtract,
} from "../arithmetic/double-double.ts";
import { ddSinCos } from "../arithmetic/double-double-sin-cos.ts";
import { splitter } from "../arithmetic/two-product.ts";

/** Tangents of the nodes are k/32. */
const nodes = 32;
/** Angles of the nodes, high word and low word: arctan(k/32) at 2 k and 2 k + 1, k = 0 .. 32. */
export const arctangentNodes: Float64Array = nodeAngles();

/** arctan(k/32): a polynomial within 1e-5, then two corrections by the tangent of what remains, in double-double. */
function nodeAngles(): Float64Array {
  const table = new Float64Array(2 * (nodes + 1));
  for (let k = 1; k <= nodes; k++) {
    const t = k / nodes;
    const t2 = t * t;
    let angle: DoubleDouble = ddOf(
      t * (0.99987 + t2 * (-0.3303 + t2 * (0.18014 + t2 * (-0.08513 + t2 * 0.02084)))),
    );
    for (let pass = 0; pass < 2; pass++) {
      const { sin, cos } = ddSinCos(angle);
      const d = ddDivide(ddSubtract(ddScale(cos, t), sin), ddAdd(cos, ddScale(sin, t)));
      const cube = ddMultiply(d, ddMultiply(d, d));
      angle = ddAdd(angle, ddSubtract(d, ddDivide(cube, ddOf(3))));
    }
    table[2 * k] = angle.hi;
    table[2 * k + 1] = angle.lo;
  }
  return table;
}

/**
 * Angle of the point (x, y), radians in [-pi, pi], 0 for (0, 0), NaN for a coordinate that is not finite. Only + - * /:
 * the same bits in every engine. Error below 1.1 ulp (against 40 digits) unless the coordinates are subnormal or above 2^990.
 * arctan t = arctan(k/32) + arctan((t - k/32)/(1 + t k/32)), with the numerator exact and the Taylor series to degree 11 on
 * |d| <= 1/64 (remainder below 2^-78).
 */
export function arctangent2(y: number, x: number): number {
  const ax = Math.abs(x);
  const ay = Math.abs(y);
  const steep = ay > ax;
  const big = steep ? ay : ax;
  const small = steep ? ax : ay;
  if (big === 0) return 0;
  const k = Math.floor((small / big) * nodes + 0.5);
  if (!(k <= nodes)) return Number.NaN;
  const t = k / nodes;
  const scaled = splitter * big;
  const upper = scaled - (scaled - big);
  const d = (small - t * upper - t * (big - upper)) / (big + t * small);
  const z = d * d;
  const series = d * z * (-1 / 3 + z * (1 / 5 + z * (-1 / 7 + z * (1 / 9 - z * (1 / 11)))));
  // angle = hi + lo, with hi a node (or pi/2, pi and their differences with it) larger than what follows.
  let hi = arctangentNodes[2 * k]!;
  let lo = arctangentNodes[2 * k + 1]! + series;
  let rest = d;
  if (steep) {
    const right = 0.5 * pi.hi;
    const turned = right - hi;
    lo = right - turned - hi + (0.5 * pi.lo - lo);
    hi = turned;
    rest = -rest;
  }
  if (x < 0) {
    const turned = pi.hi - hi;
    lo = pi.hi - turned - hi + (pi.lo - lo);
    hi = turned;
    rest = -rest;
  }
  const sum = hi + rest;
  const angle = sum + (hi - sum + rest + lo);
  return y < 0 ? -angle : angle;
}
