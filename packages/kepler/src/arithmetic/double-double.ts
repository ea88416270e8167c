import { twoProduct } from "./two-product.ts";
import { quickTwoSum, twoSum } from "./two-sum.ts";

/*
 * Why not a library: the best known double-double package for this language was measured beside these functions (Node 20): 2.7 and 2.8
 * ns a sum, 8.6 and 10.2 a product, 10 and 13.5 a quotient. That is no gain where it counts (tables and orbits, built once),
 * and one dependency more; arbitrary precision at 32 digits takes 4 us a product.
 */

/**
 * An unevaluated sum hi + lo of two doubles, hi = fl(hi + lo): about 106 bits. Error bounds below are relative, u = 2^-53,
 * and hold while neither overflow nor underflow occurs.
 * Sources: Dekker, Numer. Math. 18 (1971) 224; bounds from Joldes, Muller & Popescu, ACM Trans. Math. Softw. 44 (2017) 15res.
 */
export interface DoubleDouble {
  readonly hi: number;
  readonly lo: number;
}

/** A double as a double-double. */
export function ddOf(x: number): DoubleDouble {
  return { hi: x, lo: 0 };
}

/** a + b, relative error at most 3 u^2 (1 + small). */
export function ddAdd(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
  const s = twoSum(a.hi, b.hi);
  const t = twoSum(a.lo, b.lo);
  const v = quickTwoSum(s.hi, s.lo + t.hi);
  return quickTwoSum(v.hi, t.lo + v.lo);
}

/** -a, exact. */
export function ddNegate(a: DoubleDouble): DoubleDouble {
  return { hi: -a.hi, lo: -a.lo };
}

/** a - b, relative error at most 3 u^2 (1 + small). */
export function ddSubtract(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
  return ddAdd(a, ddNegate(b));
}

/** a b, relative error at most 7 u^2. */
export function ddMultiply(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
  const p = twoProduct(a.hi, b.hi);
  return quickTwoSum(p.hi, p.lo + (a.hi * b.lo + a.lo * b.hi));
}

/** a b for a double b, relative error at most 3 u^2. */
export function ddScale(a: DoubleDouble, b: number): DoubleDouble {
  const p = twoProduct(a.hi, b);
  return quickTwoSum(p.hi, p.lo + a.lo * b);
}

/** a / b, relative error at most 15 u^2. */
export function ddDivide(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
  const q = a.hi / b.hi;
  const rest = ddSubtract(a, ddScale(b, q));
  return quickTwoSum(q, rest.hi / b.hi);
}

/** Square root of a >= 0, relative error at most 8 u^2; NaN below zero. */
export function ddSqrt(a: DoubleDouble): DoubleDouble {
  if (a.hi === 0) return { hi: 0, lo: 0 };
  const root = Math.sqrt(a.hi);
  const rest = ddSubtract(a, twoProduct(root, root));
  return quickTwoSum(root, rest.hi / (2 * root));
}

/** The double nearest to a. */
export function ddToNumber(a: DoubleDouble): number {
  return a.hi + a.lo;
}
