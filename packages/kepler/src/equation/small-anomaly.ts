import { splitter } from "../arithmetic/two-product.ts";

/** 2^36 + 1: multiplying by it separates the upper 17 bits of a double. */
const cutTo17 = 68719476737;

/**
 * E of M = (1 - e) E + e (E - sin E) for 0 <= E <= 1/31, M = mean + meanLow, complement + complementLow = 1 - e exactly, from a start
 * within 5e-4: one Newton step; then E is cut to 17 bits, so that its cube is exact, and the residual 6 M - 6 (1 - e) E - e E^3 + ...
 * is formed without rounding in its leading parts; one step with quadratic and cubic term follows. Error below 0.6 ulp
 * (0.51 measured in 6e4 points).
 */
export function smallAnomaly(
  e: number,
  complement: number,
  complementLow: number,
  mean: number,
  meanLow: number,
  start: number,
): number {
  const z1 = start * start;
  const lag1 = start * z1 * (1 / 6 + z1 * (-1 / 120 + z1 * (1 / 5040)));
  const second =
    start - (complement * start - mean + e * lag1) / (complement + e * z1 * (0.5 - z1 * (1 / 24)));
  const scaled = cutTo17 * second;
  const node = scaled - (scaled - second);
  const z = node * node;
  const cube = z * node;
  // 6 M in two words, 6 (1 - e) E in two exact products, e E^3 in two words.
  const mean6 = 6 * mean;
  const mean6Low = 4 * mean - mean6 + 2 * mean;
  const cut = splitter * complement;
  const upper = cut - (cut - complement);
  const linear = 6 * upper * node;
  const linearLow = 6 * (complement - upper) * node;
  const cutE = splitter * e;
  const e1 = cutE - (cutE - e);
  const e2 = e - e1;
  const cutCube = splitter * cube;
  const k1 = cutCube - (cutCube - cube);
  const k2 = cube - k1;
  const cubic = e * cube;
  const cubicLow = e1 * k1 - cubic + e1 * k2 + e2 * k1 + e2 * k2;
  const a = mean6 - linear;
  const at = a - mean6;
  const aLow = mean6 - (a - at) - (linear + at);
  const b = a - cubic;
  const bt = b - a;
  const bLow = a - (b - bt) - (cubic + bt);
  const tail = cubic * z * (1 / 20 + z * (-1 / 840 + z * (1 / 60480)));
  const low = aLow + bLow + (mean6Low - linearLow - cubicLow + 6 * (meanLow - complementLow * node));
  const inverse = 1 / (complement + e * z * (0.5 + z * (-1 / 24 + z * (1 / 720))));
  const step = ((b + (tail + low)) * inverse) / 6;
  const bend = 0.5 * e * node * (1 + z * (-1 / 6 + z * (1 / 120))) * inverse * step;
  const twist = e * inverse * step * step * (1 / 6);
  return node + step * (1 - bend + (2 * bend * bend - twist));
}
