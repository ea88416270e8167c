import { power64 } from "./controller.ts";

/**
 * A first step for a state followed by its acceleration: the local dynamical time, the shorter of |q|/|v| and sqrt(|q|/|a|), times
 * tolerance^(1/(lowerOrder + 1)); step control mends it. Infinite where nothing moves.
 */
export function firstStep(state: Float64Array, d: number, tolerance: number, lowerOrder: number): number {
  const size = (from: number): number => {
    let largest = 0;
    for (let k = from; k < from + d; k += 1) largest = Math.max(largest, Math.abs(state[k]!));
    return largest;
  };
  const length = size(0);
  const dynamicalTime = Math.min(length / size(d), Math.sqrt(length / size(2 * d)));
  const guess = dynamicalTime * power64(tolerance, Math.round(64 / (lowerOrder + 1)));
  return guess > 0 ? guess : Number.POSITIVE_INFINITY;
}
