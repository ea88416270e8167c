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
export { splitter, twoProduct } from "./arithmetic/two-product.ts";
export { quickTwoSum, twoSum } from "./arithmetic/two-sum.ts";
// Conics in two and three dimensions
export {
  eccentricFromTrueAnomaly,
  meanFromEccentricAnomaly,
  trueFromEccentricAnomaly,
  trueFromHyperbolicAnomaly,
  trueFromParabolicAnomaly,
} from "./conics/anomalies.ts";
export {
  type ClassicalElements,
  elementsFromState,
  type StateElements,
  stateFromElements,
} from "./conics/elements.ts";
export { propagate } from "./conics/propagate.ts";
export { type StumpffFunctions, stumpff } from "./conics/stumpff.ts";
// Kepler's equation
export { ddSolveKepler } from "./equation/double-double-solve.ts";
export { solveBarker } from "./equation/solve-barker.ts";
export { solveHyperbolicKepler } from "./equation/solve-hyperbolic-kepler.ts";
export { solveKepler } from "./equation/solve-kepler.ts";
export { InvalidInputError } from "./errors.ts";
// Elementary functions, the same bits in every engine
export { arctangent2, arctangentNodes } from "./functions/arctangent.ts";
export { cos, sin, sinCosInto } from "./functions/sin-cos.ts";
// Pairs of bodies
export {
  joinTwoBodies,
  propagateTwoBodies,
  type RelativeMotion,
  splitTwoBodies,
  type TwoBodies,
} from "./pair/two-bodies.ts";
// Planar motion, normalised units
export { type ExactState, exactState } from "./planar/exact-state.ts";
export {
  angularMomentum,
  eccentricityVector,
  invariantPlaces,
  invariantsInto,
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
export { cellShift, cellSize } from "./track/anomaly-table.ts";
export { ReferenceTrack, referenceTrack } from "./track/reference-track.ts";
export { type StepWords, stepWords, type TrackConstants, trackConstants } from "./track/track-constants.ts";
// Units
export { type Normalisation, normalisation, type PhysicalScale } from "./units/normalisation.ts";
export {
  fromPeriapsisUnits,
  type PeriapsisConvention,
  periapsisConvention,
  toPeriapsisUnits,
} from "./units/periapsis-convention.ts";
export type { Motion, Vector } from "./vector.ts";
