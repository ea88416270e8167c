/** A time as an unevaluated sum hi + lo, hi being the double nearest to the sum. */
export interface Time {
  hi: number;
  lo: number;
}

/** time += step; relative error of each addition below 2^-104 (D.E. Knuth's two-sum; T.J. Dekker, Numer. Math. 18 (1971) 224-242). */
export function advanceTime(time: Time, step: number): void {
  const sum = time.hi + step;
  const part = sum - time.hi;
  const error = time.hi - (sum - part) + (step - part) + time.lo;
  time.hi = sum + error;
  time.lo = error - (time.hi - sum);
}

/** (hi + lo) - time, rounded to a double: relative error below 2^-52 of the larger of the difference and 2^-52 of the time. */
export function timeUntil(time: Time, hi: number, lo: number): number {
  return hi - time.hi + (lo - time.lo);
}
