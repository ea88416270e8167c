/**
 * delta of delta + A (1 - cos delta) + B (delta - sin delta) = q: Kepler's equation about a node E_k with sine and cosine known, where
 * A = e sin E_k/r_k, B = e cos E_k/r_k, r_k = 1 - e cos E_k and q = (M - M_k)/r_k. No trigonometric function is called.
 *
 * Reversion of the series to the fourth power of q, then one Newton step. Relative error at most 4 u + 5e-16 (u = 2^-53) for |delta| <=
 * 0.03 with |A delta| <= 0.02 and |B| delta^2 <= 3e-4: more than the nodes of this package leave (0.0276, 0.0175, 2.6e-4).
 */
export function anomalyCorrection(q: number, a: number, b: number): number {
  const a2 = 0.5 * a;
  const b6 = b * (1 / 6);
  const cubic = 2 * a2 * a2 - b6;
  const quartic = a2 * (5 * b6 - 5 * a2 * a2 + 1 / 12);
  const d = q * (1 + q * (-a2 + q * (cubic + q * quartic)));
  const z = d * d;
  const versine = z * (0.5 + z * (-1 / 24 + z * (1 / 720)));
  const lag = d * z * (1 / 6 + z * (-1 / 120 + z * (1 / 5040)));
  return d - (d - q + a * versine + b * lag) / (1 + a * (d - lag) + b * versine);
}
