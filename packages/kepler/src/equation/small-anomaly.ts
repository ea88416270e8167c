import { splitter } from "../arithmetic/two-product.ts";
import { anomalyOfCubic } from "./starter.ts";

/**
 * E of M = (1 - e) E + e (E - sin E) for 0 < E <= 1/31, M = mean + meanLow > 0, complement + complementLow = 1 - e exactly: the root of
 * (1 - e) E + e E^3/6 = M, relative error below 1e-4 there, and two Newton steps with E - sin E by its series. Before the last
 * step, which carries its quadratic term, E is cut to 26 bits, so that (1 - e) E is exact; what remains is the rounding of e (E - sin E), less than half of M.
 * Error below 0.9 ulp.
 */
export function smallAnomaly(
  e: number,
  complement: number,
  complementLow: number,
  mean: number,
  meanLow: number,
): number {
  const first = anomalyOfCubic(e, complement, mean);
  const z1 = first * first;
  const lag1 = first * z1 * (1 / 6 + z1 * (-1 / 120 + z1 * (1 / 5040)));
  const second =
    first - (complement * first - mean + e * lag1) / (complement + e * z1 * (0.5 - z1 * (1 / 24)));
  const scaled = splitter * second;
  const node = scaled - (scaled - second);
  const z = node * node;
  const lag = node * z * (1 / 6 + z * (-1 / 120 + z * (1 / 5040 + z * (-1 / 362880))));
  const cut = splitter * complement;
  const upper = cut - (cut - complement);
  const rest = mean - upper * node - (complement - upper) * node - e * lag + (meanLow - complementLow * node);
  const slope = complement + e * z * (0.5 + z * (-1 / 24 + z * (1 / 720)));
  const step = rest / slope;
  return node + step * (1 - (0.5 * e * node * step) / slope);
}
