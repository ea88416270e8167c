import { invalid } from "../errors.ts";
import type { Start } from "../stepper.ts";
import { dimensionOf } from "./begin.ts";
import type { Time } from "./double-double.ts";

/** The knobs of a run of variable step, checked. */
export interface VariableStart {
  readonly dimension: 2 | 3;
  readonly tolerance: number;
  readonly end: Time;
  readonly maxStep: number;
}

/** @throws InvalidInputError where a knob is missing or out of range, or where compensated summation is asked for. */
export function variableStart(start: Start): VariableStart {
  const { tolerance, endTime, maxStep = Number.POSITIVE_INFINITY, summation = "plain" } = start;
  const dimension = dimensionOf(start);
  if (!(tolerance !== undefined && tolerance > 0 && tolerance < 1)) throw invalid.tolerance(tolerance);
  if (
    !(endTime !== undefined && endTime[0] > 0 && Number.isFinite(endTime[0]) && Number.isFinite(endTime[1]))
  ) {
    throw invalid.endTime(endTime);
  }
  if (summation !== "plain") throw invalid.summation(summation);
  if (!(maxStep > 0)) throw invalid.maxStep(maxStep);
  return { dimension, tolerance, end: { hi: endTime[0], lo: endTime[1] }, maxStep };
}

/** The next trial: the step, or what remains if that is nearly as short, so that no sliver of a step is left; never above `maxStep`. */
export function trialStep(step: number, remaining: number, maxStep: number): number {
  return remaining <= Math.min(step * 1.0001, maxStep) ? remaining : Math.min(step, maxStep);
}
