import { arctangent2 } from "@perigauge/kepler";

/**
 * The angle whose sine and cosine are proportional to `cross` and `dot`, in (-pi, pi].
 *
 * For |tangent| <= 1/16 an odd polynomial of degree 13 serves: its first term left out is t^15/15 <= 6e-20 t, below rounding, so the
 * result is within 2 ulp. Beyond that the arctangent of the reference package takes over.
 */
export function angleOf(cross: number, dot: number): number {
  if (dot > 0 && cross <= 0.0625 * dot && cross >= -0.0625 * dot) {
    const t = cross / dot;
    const s = t * t;
    return t - t * s * (1 / 3 - s * (1 / 5 - s * (1 / 7 - s * (1 / 9 - s * (1 / 11 - s * (1 / 13))))));
  }
  return arctangent2(cross, dot);
}

const TWO_PI = 2 * Math.PI;

/** `angle` plus the multiple of 2 pi that brings it nearest to `previous`. */
export function nearestTurn(angle: number, previous: number): number {
  const difference = previous - angle;
  if (difference > -Math.PI && difference <= Math.PI) return angle;
  return angle + TWO_PI * Math.floor(difference / TWO_PI + 0.5);
}
