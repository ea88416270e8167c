import type { DoubleDouble } from "./double-double.ts";

/** 2^27 + 1: multiplying by it separates the upper 26 bits of a double. */
export const splitter = 134217729;

/**
 * Product of two doubles with its rounding error: hi + lo = a b exactly, hi = fl(a b), |lo| <= 2^-53 |hi|, as long as
 * |a|, |b| < 2^996 (the splitting overflows above) and |a b| > 2^-968 (its error is subnormal below).
 * Source: Dekker, Numer. Math. 18 (1971) 224, section 5 (splitting by Veltkamp).
 */
export function twoProduct(a: number, b: number): DoubleDouble {
  const hi = a * b;
  const ta = splitter * a;
  const a1 = ta - (ta - a);
  const a2 = a - a1;
  const tb = splitter * b;
  const b1 = tb - (tb - b);
  const b2 = b - b1;
  return { hi, lo: a1 * b1 - hi + a1 * b2 + a2 * b1 + a2 * b2 };
}
