import { arctangent2 } from "../functions/arctangent.ts";
import { type DoubleDouble, ddAdd, ddDivide, ddMultiply, ddOf, ddSqrt, ddSubtract } from "./double-double.ts";
import { ddSinCos } from "./double-double-sin-cos.ts";

/**
 * Angle of (x, y) in (-pi, pi] in double-double, error about 2^-98: the double angle plus the cross product with its own
 * direction, which is the sine of an error below 1e-15 and so the error itself to 1e-45.
 */
export function ddArctangent2(y: DoubleDouble, x: DoubleDouble): DoubleDouble {
  const first = ddOf(arctangent2(y.hi, x.hi));
  const { sin, cos } = ddSinCos(first);
  const r = ddSqrt(ddAdd(ddMultiply(x, x), ddMultiply(y, y)));
  const cross = ddSubtract(ddMultiply(y, cos), ddMultiply(x, sin));
  return ddAdd(first, ddDivide(cross, r));
}
