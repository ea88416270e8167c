// Double-double arithmetic
export { halfPi, pi, twoPi } from "./arithmetic/constants.ts";
export {
  type DoubleDouble,
  ddAdd,
  ddDivide,
  ddMultiply,
  ddNegate,
  ddOf,
  ddScale,
  ddSqrt,
  ddSubtract,
  ddToNumber,
} from "./arithmetic/double-double.ts";
export { ddArctangent2 } from "./arithmetic/double-double-arctangent.ts";
export { type DoubleDoubleSinCos, ddSinCos, ddSinCosDegrees } from "./arithmetic/double-double-sin-cos.ts";
export { twoProduct } from "./arithmetic/two-product.ts";
export { quickTwoSum, twoSum } from "./arithmetic/two-sum.ts";
// Kepler's equation
export { ddSolveKepler } from "./equation/double-double-solve.ts";
export { solveKepler } from "./equation/solve-kepler.ts";
export { InvalidInputError } from "./errors.ts";
// Elementary functions, the same bits in every engine
export { arctangent2 } from "./functions/arctangent.ts";
export { cos, sin, sinCosInto } from "./functions/sin-cos.ts";
// Planar motion, normalised units
export { type ExactState, exactState } from "./planar/exact-state.ts";
export {
  angularMomentum,
  eccentricityVector,
  type PlanarVector,
  specificEnergy,
} from "./planar/invariants.ts";
export {
  type OsculatingElements,
  osculatingElements,
  timeSincePeriapsis,
} from "./planar/osculating-elements.ts";
export { orbitThrough, type PlanarOrbit } from "./planar/planar-orbit.ts";
export {
  type PlanarState,
  periapsisState,
  stateAtTrueAnomaly,
  stateAtTrueAnomalyDegrees,
} from "./planar/planar-state.ts";
// Reference for scoring
export { ReferenceTrack, referenceTrack } from "./track/reference-track.ts";
// Units and pairs of bodies
export { type Normalisation, normalisation, type PhysicalScale } from "./units/normalisation.ts";
export {
  joinTwoBodies,
  type Motion,
  type RelativeMotion,
  splitTwoBodies,
  type TwoBodies,
  type Vector,
} from "./units/two-bodies.ts";
