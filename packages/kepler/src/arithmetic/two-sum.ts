import type { DoubleDouble } from "./double-double.ts";

/**
 * Sum of two doubles with its rounding error: hi + lo = a + b exactly, hi = fl(a + b), |lo| <= 2^-53 |hi|.
 * Exact for every pair whose sum does not overflow.
 * Source: Knuth, The Art of Computer Programming, vol. 2, 3rd ed., section 4.2.2, theorem B.
 */
export function twoSum(a: number, b: number): DoubleDouble {
  const hi = a + b;
  const t = hi - a;
  return { hi, lo: a - (hi - t) + (b - t) };
}

/**
 * The same for |a| >= |b| or a = 0, with three operations instead of six.
 * Source: Dekker, Numer. Math. 18 (1971) 224, section 4.
 */
export function quickTwoSum(a: number, b: number): DoubleDouble {
  const hi = a + b;
  return { hi, lo: b - (hi - a) };
}
