import { twoPi } from "../arithmetic/constants.ts";
import { requireEllipse, requireFinite } from "../errors.ts";
import { sinCosInto } from "../functions/sin-cos.ts";

const scratch: Float64Array = new Float64Array(2);

/** E of M in [0, pi] by Newton from the right of the root, where the function is convex: always converges. */
function solveReduced(e: number, m: number): number {
  const linear = m / (1 - e);
  let anomaly = Math.min(linear, m + e);
  if (anomaly > Math.PI) anomaly = Math.PI;
  for (let k = 0; k < 60; k++) {
    sinCosInto(anomaly, scratch);
    const step = (anomaly - e * scratch[0]! - m) / (1 - e * scratch[1]!);
    const next = anomaly - step;
    if (next === anomaly || Math.abs(step) < 1e-17 * anomaly) break;
    anomaly = next;
  }
  return anomaly;
}

/**
 * Eccentric anomaly E (radians) of the mean anomaly M = E - e sin E (radians), 0 <= e < 1.
 * @throws InvalidInputError for an eccentricity outside [0, 1) or a mean anomaly that is not finite
 */
export function solveKepler(eccentricity: number, meanAnomaly: number): number {
  requireEllipse("solveKepler.eccentricity", eccentricity);
  requireFinite("solveKepler.meanAnomaly", meanAnomaly);
  const turns = Math.round(meanAnomaly / twoPi.hi);
  const m = meanAnomaly - turns * twoPi.hi - turns * twoPi.lo;
  const anomaly = solveReduced(eccentricity, Math.abs(m));
  return (m < 0 ? -anomaly : anomaly) + turns * twoPi.hi;
}
