import { angleOf, nearestTurn } from "./angle-difference.ts";

/**
 * Apsis error: angle of the eccentricity (Laplace-Runge-Lenz) vector (vy L - x/r, -vx L - y/r), numerical minus exact, unwrapped, rad.
 * The exact vector does not move, so it is given once. Rounding of one value: about 8 x 2^-53/e rad.
 */
export class ApsisErrors {
  private previous = 0;
  private readonly ex: number;
  private readonly ey: number;

  constructor(exactEccentricityX: number, exactEccentricityY: number) {
    this.ex = exactEccentricityX;
    this.ey = exactEccentricityY;
  }

  fill(rows: Float64Array, from: number, to: number, out: Float64Array): void {
    const { ex, ey } = this;
    let previous = this.previous;
    for (let i = from; i < to; i++) {
      const x = rows[4 * i]!;
      const y = rows[4 * i + 1]!;
      const vx = rows[4 * i + 2]!;
      const vy = rows[4 * i + 3]!;
      const momentum = x * vy - y * vx;
      const inverse = 1 / Math.sqrt(x * x + y * y);
      const ax = vy * momentum - x * inverse;
      const ay = -vx * momentum - y * inverse;
      previous = nearestTurn(angleOf(ex * ay - ey * ax, ex * ax + ey * ay), previous);
      out[i] = previous;
    }
    this.previous = previous;
  }
}
