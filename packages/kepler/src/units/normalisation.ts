import { ddDivide, ddOf, ddSqrt, ddToNumber } from "../arithmetic/double-double.ts";
import { requirePositive } from "../errors.ts";

/** What fixes the units of a case: gravitational parameter in km^3/s^2 and the length that becomes 1, in km. */
export interface PhysicalScale {
  readonly gravitationalParameterKm3S2: number;
  readonly semiMajorAxisKm: number;
}

/** Scales from normalised units (gravitational parameter 1, semi-major axis 1) to kilometres and seconds, and back. */
export interface Normalisation {
  readonly lengthKm: number;
  readonly timeSeconds: number;
  readonly speedKmS: number;
  /** Normalised length to km. */
  lengthToKm(length: number): number;
  lengthFromKm(km: number): number;
  /** Normalised time to s. */
  timeToSeconds(time: number): number;
  timeFromSeconds(seconds: number): number;
  /** Normalised speed to km/s. */
  speedToKmS(speed: number): number;
  speedFromKmS(kmS: number): number;
}

/**
 * Units in which the gravitational parameter and the semi-major axis are 1: time a sqrt(a/GM), speed sqrt(GM/a), each rounded once.
 * A value converted and converted back is within 1 ulp of itself.
 * @throws InvalidInputError unless both scales are finite and positive
 */
export function normalisation(scale: PhysicalScale): Normalisation {
  requirePositive("normalisation.gravitationalParameterKm3S2", scale.gravitationalParameterKm3S2);
  requirePositive("normalisation.semiMajorAxisKm", scale.semiMajorAxisKm);
  const lengthKm = scale.semiMajorAxisKm;
  const speed = ddSqrt(ddDivide(ddOf(scale.gravitationalParameterKm3S2), ddOf(lengthKm)));
  const speedKmS = ddToNumber(speed);
  const timeSeconds = ddToNumber(ddDivide(ddOf(lengthKm), speed));
  return {
    lengthKm,
    timeSeconds,
    speedKmS,
    lengthToKm: (length) => length * lengthKm,
    lengthFromKm: (km) => km / lengthKm,
    timeToSeconds: (time) => time * timeSeconds,
    timeFromSeconds: (seconds) => seconds / timeSeconds,
    speedToKmS: (speedNormalised) => speedNormalised * speedKmS,
    speedFromKmS: (kmS) => kmS / speedKmS,
  };
}
