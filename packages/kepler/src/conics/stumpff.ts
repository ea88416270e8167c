import {
  type DoubleDouble,
  ddAdd,
  ddMultiply,
  ddOf,
  ddScale,
  ddSubtract,
} from "../arithmetic/double-double.ts";
import { reciprocalFactorial } from "../arithmetic/reciprocal-factorial.ts";

/** Stumpff's functions c0 .. c3 of one argument z, c_k(z) = 1/k! - z/(k + 2)! + z^2/(k + 4)! - ... */
export interface StumpffFunctions {
  readonly c0: DoubleDouble;
  readonly c1: DoubleDouble;
  readonly c2: DoubleDouble;
  readonly c3: DoubleDouble;
}

const one = ddOf(1);
/** Terms of the series: z^13/29! < 2^-120 at |z| = 1/4. */
const terms = 13;
/** Enough for every finite z; an infinite one ends here too, and gives NaN. */
const mostDoublings = 520;

/**
 * c0 = cos sqrt z, c1 = sin sqrt z/sqrt z, c2 = (1 - c0)/z, c3 = (1 - c1)/z for any real z (hyperbolic functions for z < 0), smooth through
 * z = 0. The argument is divided by 4 until |z| <= 1/4; the series there; then z is quadrupled again by the formulas of the
 * double angle. Relative error at most 2^-102 max(1, |z|) for -4e5 <= z <= 100, against the largest of 1 and the value.
 * Source: Stumpff, Himmelsmechanik I (1959), chapter V; the argument halving as in Danby, Fundamentals of Celestial Mechanics,
 * 2nd ed. (1988), section 6.9.
 */
export function stumpff(z: DoubleDouble): StumpffFunctions {
  let reduced = z;
  let doublings = 0;
  while (Math.abs(reduced.hi) > 0.25 && doublings < mostDoublings) {
    reduced = { hi: reduced.hi * 0.25, lo: reduced.lo * 0.25 };
    doublings++;
  }
  let c2 = reciprocalFactorial(2 * terms + 2);
  let c3 = reciprocalFactorial(2 * terms + 3);
  for (let n = terms - 1; n >= 0; n--) {
    c2 = ddSubtract(reciprocalFactorial(2 * n + 2), ddMultiply(reduced, c2));
    c3 = ddSubtract(reciprocalFactorial(2 * n + 3), ddMultiply(reduced, c3));
  }
  let c1 = ddSubtract(one, ddMultiply(reduced, c3));
  let c0 = ddSubtract(one, ddMultiply(reduced, c2));
  for (; doublings > 0; doublings--) {
    c3 = ddScale(ddAdd(c2, ddMultiply(c0, c3)), 0.25);
    c2 = ddScale(ddMultiply(c1, c1), 0.5);
    c1 = ddMultiply(c0, c1);
    c0 = ddSubtract(ddScale(ddMultiply(c0, c0), 2), one);
  }
  return { c0, c1, c2, c3 };
}
