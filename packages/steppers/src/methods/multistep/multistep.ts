import type { Rational } from "../../exact/rational.ts";
import { cumulative, logarithm, ordinates, product, reciprocal } from "../../exact/series.ts";

/**
 * Weights of multistep formulas, generated exactly from their series in backward differences (E. Hairer, S.P. Nørsett, G. Wanner, Solving
 * ODEs I, 2nd ed. (1993), sects. III.1 and III.10). With L = -ln(1 - t)/t: Adams-Moulton 1/L, Adams-Bashforth 1/(L (1 - t)), Cowell 1/L^2,
 * Stormer 1/(L^2 (1 - t)). Weights are those of f_n, f_{n-1}, ... (explicit) or f_{n+1}, f_n, ... (implicit).
 */
export function adamsBashforth(terms: number): readonly Rational[] {
  return ordinates(cumulative(reciprocal(logarithm(terms))));
}

export function adamsMoulton(terms: number): readonly Rational[] {
  return ordinates(reciprocal(logarithm(terms)));
}

export function stormer(terms: number): readonly Rational[] {
  return ordinates(cumulative(cowellSeries(terms)));
}

export function cowell(terms: number): readonly Rational[] {
  return ordinates(cowellSeries(terms));
}

function cowellSeries(terms: number): readonly Rational[] {
  const adams = reciprocal(logarithm(terms));
  return product(adams, adams);
}
