import { angleOf, nearestTurn } from "./angle-difference.ts";

/**
 * Phase error: polar angle of the numerical body minus that of the exact one, rad, positive where the numerical body leads; wrapped to
 * (-pi, pi], plus the multiple of 2 pi nearest the previous value.
 */
export class PhaseErrors {
  private previous = 0;
  /** True once one step changed the phase error by more than pi/2: its multiple of 2 pi is then a guess. */
  uncertain = false;

  fill(rows: Float64Array, exact: Float64Array, from: number, to: number, out: Float64Array): void {
    let previous = this.previous;
    let uncertain = this.uncertain;
    for (let i = from; i < to; i++) {
      const x = rows[4 * i]!;
      const y = rows[4 * i + 1]!;
      const xe = exact[4 * i]!;
      const ye = exact[4 * i + 1]!;
      const phase = nearestTurn(angleOf(xe * y - ye * x, xe * x + ye * y), previous);
      const jump = phase - previous;
      if (jump > 0.5 * Math.PI || jump < -0.5 * Math.PI) uncertain = true;
      previous = phase;
      out[i] = phase;
    }
    this.previous = previous;
    this.uncertain = uncertain;
  }
}
