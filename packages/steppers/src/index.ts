// The catalogue, and steppers of one's own.
export { catalogue, findStepper } from "./catalogue.ts";
export { InvalidInputError } from "./errors.ts";
export { ownStepper } from "./own-stepper.ts";
export type {
  Acceleration,
  Jerk,
  OwnStepper,
  Start,
  Stepper,
  StepperFamily,
  StepperInfo,
  Summation,
  Trajectory,
} from "./stepper.ts";

// Steps as straight-line programs: to look at, to prove, to compile otherwise.

export type { CollocationProgram } from "./build/collocation.ts";
export type { PairProgram } from "./build/pair.ts";
export type { BuildStep, Setting } from "./build/step-program.ts";
export { countEvaluations, countFlops } from "./program/count.ts";
export { emitJavaScript } from "./program/emit-javascript.ts";
export {
  type Advance,
  type Evaluate,
  type Executable,
  type SuppliedForce,
  supply,
} from "./program/executable.ts";
export { pointMass, suppliedForce } from "./program/force.ts";
export { interpret } from "./program/interpret.ts";
export { type Lowered, lower } from "./program/lower.ts";
export type { BinaryKind, Dimension, Operation, Program, StepProgram, Value } from "./program/program.ts";
export type { ProgramStepper } from "./run/fixed-step.ts";
export type { ImplicitStepper } from "./run/implicit.ts";
export type { PairStepper } from "./run/variable-step.ts";

// Blocks of trajectories in vector lanes.

export { type AttemptKernel, attemptKernel } from "./lanes/attempt-kernel.ts";
export { compileLanes } from "./lanes/compile-lanes.ts";
export type { FunctionCode } from "./lanes/encoder.ts";
export { LaneCode } from "./lanes/lane-code.ts";
export { LANES, type Operand, PAIR_BYTES, type Pointer, ROW_BYTES } from "./lanes/lane-layout.ts";
export { lanesAvailable, type StepKernel, stepKernel } from "./lanes/step-kernel.ts";
export { type KernelFunction, type LaneMemory, laneMemory } from "./lanes/web-assembly.ts";
