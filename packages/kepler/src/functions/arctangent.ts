import { pi } from "../arithmetic/constants.ts";
import { sinCosInto } from "./sin-cos.ts";

const scratch: Float64Array = new Float64Array(2);

/** Arctangent of t in [0, 1], to about 1e-4: start of the correction. */
function roughArctangent(t: number): number {
  const t2 = t * t;
  return t * (0.999866 + t2 * (-0.3302995 + t2 * (0.180141 + t2 * (-0.085133 + t2 * 0.0208351))));
}

/**
 * Angle of the point (x, y) in (-pi, pi], radians; 0 for (0, 0). Only + - * / and sine and cosine of this package.
 * A rough angle is corrected by the arcsine series of the remaining cross product.
 */
export function arctangent2(y: number, x: number): number {
  const ax = Math.abs(x);
  const ay = Math.abs(y);
  const big = Math.max(ax, ay);
  const small = Math.min(ax, ay);
  if (big === 0) return 0;
  const t = small / big;
  const first = roughArctangent(t);
  sinCosInto(first, scratch);
  const s = scratch[0]!;
  const c = scratch[1]!;
  const d = (t * c - s) / (c + t * s);
  let angle = first + (d - (d * d * d) / 3);
  if (ay > ax) angle = pi.hi / 2 - angle;
  if (x < 0) angle = pi.hi - angle;
  return y < 0 ? -angle : angle;
}
