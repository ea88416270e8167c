/**
 * Proportional-integral step control (K. Gustafsson, ACM Trans. Math. Softw. 17 (1991) 533-554; E. Hairer, G. Wanner, Solving ODEs II,
 * 2nd ed. (1996), sect. IV.2). With k one more than the lower order of the pair, an accepted step is followed by one of
 * 0.9 h error^-(0.7/k) previous^(0.4/k), a rejected one by 0.9 h error^-(1/k); the change stays within [1/5, 5], and a step right after a
 * rejection does not grow. Powers are multiples of 1/64 built from square roots, so that every engine takes the same steps.
 */
export interface Controller {
  /** Factor for the step after one that was accepted with this error (1 = the tolerance exactly). */
  accepted(error: number, afterRejection: boolean): number;
  /** Factor for another try after one that was rejected with this error. */
  rejected(error: number): number;
}

export const safety = 0.9;
export const smallestFactor = 0.2;
export const largestFactor = 5;
/** A previous error far below the tolerance would otherwise hold the next step back. */
export const smallestPrevious = 1e-4;

/** Exponents in 64ths: of the error and the one before it after an accepted step, of the error after a rejected one. */
export interface Exponents {
  readonly proportional: number;
  readonly integral: number;
  readonly plain: number;
}

export function exponentsOf(lowerOrder: number): Exponents {
  const k = lowerOrder + 1;
  return {
    proportional: Math.max(1, Math.round((64 * 0.7) / k)),
    integral: Math.max(1, Math.round((64 * 0.4) / k)),
    plain: Math.max(1, Math.round(64 / k)),
  };
}

export function makeController(lowerOrder: number): Controller {
  const { proportional, integral, plain } = exponentsOf(lowerOrder);
  let previous = smallestPrevious;
  return {
    accepted(error, afterRejection): number {
      const factor = (safety * power64(previous, integral)) / power64(error, proportional);
      previous = Math.max(error, smallestPrevious);
      return Math.min(Math.max(factor, smallestFactor), afterRejection ? 1 : largestFactor);
    },
    rejected(error): number {
      const factor = safety / power64(error, plain);
      return Math.max(factor, smallestFactor);
    },
  };
}

/** x^(m/64) for x >= 0 and whole m in [0, 64], from six square roots; relative error below 2^-48. */
export function power64(x: number, m: number): number {
  let root = x;
  let result = m >= 64 ? x : 1;
  for (let bit = 32; bit >= 1; bit >>= 1) {
    root = Math.sqrt(root);
    if ((m & bit) !== 0) result *= root;
  }
  return result;
}
