import { twoPi } from "../arithmetic/constants.ts";
import {
  type DoubleDouble,
  ddAdd,
  ddDivide,
  ddMultiply,
  ddNegate,
  ddOf,
  ddScale,
  ddSubtract,
  ddToNumber,
} from "../arithmetic/double-double.ts";
import { ddSinCos } from "../arithmetic/double-double-sin-cos.ts";
import { twoSum } from "../arithmetic/two-sum.ts";
import { ddSolveKepler } from "../equation/double-double-solve.ts";
import type { PlanarOrbit } from "../planar/planar-orbit.ts";

/** Exact states of one orbit at many times, four doubles a row: x, y, vx, vy (normalised units). */
export class ReferenceTrack {
  readonly orbit: PlanarOrbit;

  constructor(orbit: PlanarOrbit) {
    this.orbit = orbit;
  }

  /** States at t = k h, k = firstStep .. firstStep + count - 1, with k h exact; rows 4 count long. */
  statesAtSteps(firstStep: number, count: number, h: number, rows: Float64Array): void {
    const step = ddScale(this.orbit.meanMotion, h);
    for (let j = 0; j < count; j++) this.#write(ddScale(step, firstStep + j), rows, 4 * j);
  }

  /** States at the times hi + lo, pairs in `times`. */
  statesAtTimes(times: Float64Array, count: number, rows: Float64Array): void {
    for (let j = 0; j < count; j++) {
      const t = twoSum(times[2 * j]!, times[2 * j + 1]!);
      this.#write(ddMultiply(this.orbit.meanMotion, t), rows, 4 * j);
    }
  }

  /** State at the time hi + lo into out[0..3]. */
  stateAt(timeHi: number, timeLo: number, out: Float64Array): void {
    this.#write(ddMultiply(this.orbit.meanMotion, twoSum(timeHi, timeLo)), out, 0);
  }

  #write(elapsed: DoubleDouble, out: Float64Array, at: number): void {
    const { orbit } = this;
    const mean = ddAdd(elapsed, orbit.meanAnomaly);
    const turns = Math.round(ddDivide(mean, twoPi).hi);
    const m = ddSubtract(mean, ddScale(twoPi, turns));
    const { sin, cos } = ddSinCos(ddSolveKepler(orbit.eccentricity, m));
    const forward = orbit.angularMomentum.hi > 0;
    const px = orbit.periapsisX;
    const py = orbit.periapsisY;
    const qx = forward ? ddNegate(py) : py;
    const qy = forward ? px : ddNegate(px);
    const a = orbit.semiMajorAxis;
    const b = ddMultiply(a, orbit.axisRatio);
    const along = ddMultiply(a, ddSubtract(cos, orbit.eccentricity));
    const across = ddMultiply(b, sin);
    const speed = ddDivide(orbit.meanMotion, ddSubtract(ddOf(1), ddMultiply(orbit.eccentricity, cos)));
    const vAlong = ddNegate(ddMultiply(ddMultiply(a, sin), speed));
    const vAcross = ddMultiply(ddMultiply(b, cos), speed);
    out[at] = ddToNumber(ddAdd(ddMultiply(px, along), ddMultiply(qx, across)));
    out[at + 1] = ddToNumber(ddAdd(ddMultiply(py, along), ddMultiply(qy, across)));
    out[at + 2] = ddToNumber(ddAdd(ddMultiply(px, vAlong), ddMultiply(qx, vAcross)));
    out[at + 3] = ddToNumber(ddAdd(ddMultiply(py, vAlong), ddMultiply(qy, vAcross)));
  }
}

/** The reference track of an orbit. */
export function referenceTrack(orbit: PlanarOrbit): ReferenceTrack {
  return new ReferenceTrack(orbit);
}
