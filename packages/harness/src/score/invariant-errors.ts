/**
 * Relative errors of energy and angular momentum: (E - E0)/|E0| and (L - L0)/|L0|, for rows `from` to `to` of x, y, vx, vy.
 *
 * Rounding: E is formed from v^2/2 and 1/r, each rounded to half an ulp a few times, so the error of one value is at most
 * 4 x 2^-53 (v^2/2 + 1/r)/|E0|, that is 4 x 2^-53 (3 + e)/(1 - e) at periapsis and less elsewhere.
 */
export function energyErrors(
  rows: Float64Array,
  from: number,
  to: number,
  energy0: number,
  out: Float64Array,
): void {
  const scale = 1 / Math.abs(energy0);
  for (let i = from; i < to; i++) {
    const x = rows[4 * i]!;
    const y = rows[4 * i + 1]!;
    const vx = rows[4 * i + 2]!;
    const vy = rows[4 * i + 3]!;
    out[i] = (0.5 * (vx * vx + vy * vy) - 1 / Math.sqrt(x * x + y * y) - energy0) * scale;
  }
}

/** As above for L = x vy - y vx; the error of one value is at most 3 x 2^-53 r v/|L0|. */
export function angularMomentumErrors(
  rows: Float64Array,
  from: number,
  to: number,
  angularMomentum0: number,
  out: Float64Array,
): void {
  const scale = 1 / Math.abs(angularMomentum0);
  for (let i = from; i < to; i++) {
    out[i] =
      (rows[4 * i]! * rows[4 * i + 3]! - rows[4 * i + 1]! * rows[4 * i + 2]! - angularMomentum0) * scale;
  }
}
