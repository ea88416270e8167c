import {
  type DoubleDouble,
  ddAdd,
  ddDivide,
  ddMultiply,
  ddOf,
  ddSubtract,
} from "../arithmetic/double-double.ts";
import { ddMinusSin, ddSinCos } from "../arithmetic/double-double-sin-cos.ts";
import { solveKepler } from "./solve-kepler.ts";

/**
 * Eccentric anomaly in double-double: the double solution and two Newton corrections with the residual
 * (1 - e) E + e (E - sin E) - M. Mean anomaly in [-pi, pi], eccentricity in [0, 1), radians. Relative error about 2^-95.
 */
export function ddSolveKepler(eccentricity: DoubleDouble, meanAnomaly: DoubleDouble): DoubleDouble {
  const complement = ddSubtract(ddOf(1), eccentricity);
  let anomaly = ddOf(solveKepler(eccentricity.hi, meanAnomaly.hi));
  for (let k = 0; k < 2; k++) {
    const mean = ddAdd(ddMultiply(complement, anomaly), ddMultiply(eccentricity, ddMinusSin(anomaly)));
    const slope = ddSubtract(ddOf(1), ddMultiply(eccentricity, ddSinCos(anomaly).cos));
    anomaly = ddSubtract(anomaly, ddDivide(ddSubtract(mean, meanAnomaly), slope));
  }
  return anomaly;
}
