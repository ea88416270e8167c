import { linearRegression } from "simple-statistics";

/** A fitted number with its standard error and the number of points behind it. */
export interface Fit {
  readonly value: number;
  readonly standardError: number;
  readonly points: number;
}

export interface SlopeFit extends Fit {
  /** Standard error by the residuals alone. */
  readonly scatter: number;
  readonly largestResidual: number;
}

/**
 * Least-squares slope of y against x. Its standard error is the larger of two: that of the residuals, sqrt(SSR / ((n - 2) Sxx)), which
 * knows of scatter only, and half the difference between the slopes of the two halves, which sees a bend. At least three points.
 */
export function fitSlope(points: readonly (readonly [x: number, y: number])[]): SlopeFit {
  const pairs = points.map(([x, y]) => [x, y]);
  const { m, b } = linearRegression(pairs);
  const n = points.length;
  const meanX = points.reduce((sum, [x]) => sum + x, 0) / n;
  const spread = points.reduce((sum, [x]) => sum + (x - meanX) ** 2, 0);
  const residuals = points.map(([x, y]) => y - m * x - b);
  const squares = residuals.reduce((sum, residual) => sum + residual * residual, 0);
  const scatter = Math.sqrt(squares / ((n - 2) * spread));
  const middle = (n - 1) >> 1;
  const early = linearRegression(pairs.slice(0, middle + 1)).m;
  const late = linearRegression(pairs.slice(n - 1 - middle)).m;
  return {
    value: m,
    standardError: Math.max(scatter, Math.abs(late - early) / 2),
    points: n,
    scatter,
    largestResidual: residuals.reduce((largest, residual) => Math.max(largest, Math.abs(residual)), 0),
  };
}
