import type { Ended } from "./score.ts";

/** Escape needs this distance (in semi-major axes) beside a positive energy: coarse bound runs pass E >= 0 at periapsis. */
export const ESCAPE_DISTANCE = 10;
/** A body nearer the centre than this share of the exact periapsis distance has collided with it. */
export const COLLISION_SHARE = 1e-4;

export type DivergenceReason = Extract<Ended, { status: "diverged" }>["reason"];

/**
 * Looks for the first row at which the run has left the problem: not finite, at the centre, or escaped (E >= 0, r > 10 and q.v > 0
 * together). Returns the number of rows before it, with the reason, or null where all rows are sound. Tested here and not through
 * maxima, because a compare-and-select maximum drops NaN.
 */
export function findEnd(
  rows: Float64Array,
  count: number,
  eccentricity: number,
): { readonly rowsBefore: number; readonly reason: DivergenceReason } | null {
  const collision = COLLISION_SHARE * (1 - eccentricity);
  const collision2 = collision * collision;
  const escape2 = ESCAPE_DISTANCE * ESCAPE_DISTANCE;
  for (let i = 0; i < count; i++) {
    const x = rows[4 * i]!;
    const y = rows[4 * i + 1]!;
    const vx = rows[4 * i + 2]!;
    const vy = rows[4 * i + 3]!;
    const r2 = x * x + y * y;
    const v2 = vx * vx + vy * vy;
    if (r2 >= collision2 && r2 <= escape2 && v2 < Number.POSITIVE_INFINITY) continue;
    if (!(r2 < Number.POSITIVE_INFINITY && v2 < Number.POSITIVE_INFINITY))
      return { rowsBefore: i, reason: "not finite" };
    if (r2 < collision2) return { rowsBefore: i, reason: "collided" };
    if (0.5 * v2 - 1 / Math.sqrt(r2) >= 0 && x * vx + y * vy > 0) return { rowsBefore: i, reason: "escaped" };
  }
  return null;
}
