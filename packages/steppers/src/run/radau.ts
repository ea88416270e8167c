import type { CollocationProgram } from "../build/collocation.ts";
import { invalid } from "../errors.ts";
import { countEvaluations } from "../program/count.ts";
import { type SuppliedForce, supply } from "../program/executable.ts";
import type { Start, Trajectory } from "../stepper.ts";
import { checkAdvance } from "./begin.ts";
import { power64 } from "./controller.ts";
import { allFinite, copy } from "./copy.ts";
import { type Interpolate, insideStep, nystromInterpolant } from "./dense.ts";
import { advanceTime, type Time, timeUntil } from "./double-double.ts";
import { firstStep } from "./first-step.ts";
import type { CompiledCollocation } from "./implicit.ts";
import { iterate } from "./sweeps.ts";
import { trialStep, variableStart } from "./variable-start.ts";

/** What a variable-step collocation needs in doubles: its nodes, their basis polynomials (lowest power first) and dense-output rows. */
export interface CollocationInDoubles {
  readonly nodes: readonly number[];
  readonly basis: readonly (readonly number[])[];
  readonly position: readonly (readonly number[])[];
  readonly velocity: readonly (readonly number[])[];
}

const safety = 0.9;
const smallestFactor = 0.2;
/** A polynomial of degree 7 foretells the accelerations of a step not much longer than the one it comes from. */
const largestFactor = 2;

/**
 * Variable-step collocation with 8 nodes, the first at the start of the step (E. Everhart 1985). The error of a trial is measured by the
 * highest term of the acceleration's polynomial over the step, relative to the largest acceleration: it must stay below 1e4
 * sqrt(tolerance), and below 1. The step's own error is about 1e-8 times the square of that ratio (measured, e from 0 to 0.99), so the
 * tolerance is in the range of the error made, down to rounding at 1e-14; above 1e-8 it no longer matters. Step factors are 0.9
 * ratio^-(1/7) within [1/5, 2], the power rounded to 9/64 and built from square roots, less again where steps have been shrinking
 * (the predictive control of K. Gustafsson, ACM Trans. Math. Softw. 20 (1994) 496-517, in that direction only).
 */
export class RadauRun implements Trajectory {
  evaluations = 0;
  rejectedSteps = 0;
  smallestStep: number = Number.POSITIVE_INFINITY;
  readonly #code: CompiledCollocation;
  readonly #program: CollocationProgram;
  readonly #numbers: CollocationInDoubles;
  readonly #force: SuppliedForce;
  readonly #width: number;
  readonly #tolerance: number;
  readonly #longest: number;
  readonly #end: Time;
  readonly #time: Time = { hi: 0, lo: 0 };
  readonly #timeBefore: Time = { hi: 0, lo: 0 };
  /** State, then node accelerations of the trial. */
  readonly #inputs: Float64Array;
  readonly #swept: Float64Array;
  readonly #finished: Float64Array;
  readonly #before: Float64Array;
  /** Node accelerations of the last step made, and its length. */
  readonly #lastNodes: Float64Array;
  #lastStep = 0;
  #lastFactor = 1;
  #step: number;
  readonly #interpolant: Interpolate;

  constructor(start: Start, code: CompiledCollocation, numbers: CollocationInDoubles) {
    const { dimension: d, tolerance, end, maxStep } = variableStart(start);
    this.#longest = maxStep;
    this.#code = code;
    this.#program = code.program;
    this.#numbers = numbers;
    this.#force = supply(d, start.acceleration);
    this.#width = 2 * d;
    this.#tolerance = Math.min(1, 1e4 * Math.sqrt(tolerance));
    this.#end = end;
    this.#inputs = new Float64Array(this.#program.sweep.inputs);
    this.#swept = new Float64Array(this.#program.sweep.outputs.length);
    this.#finished = new Float64Array(this.#program.finish.outputs.length);
    this.#inputs.set(start.state);
    this.#before = start.state.slice();
    this.#lastNodes = new Float64Array(this.#program.stages * d);
    this.#interpolant = nystromInterpolant(numbers.position, numbers.velocity);
    this.#evaluateFirst();
    for (let i = 1; i < this.#program.stages; i += 1) this.#inputs.copyWithin((2 + i) * d, 2 * d, 3 * d);
    this.#step = Math.min(firstStep(this.#inputs, d, tolerance, 7), end.hi);
  }

  advance(maxSteps: number, rows: Float64Array, times?: Float64Array): number {
    checkAdvance(maxSteps, this.#width, rows, true, times);
    for (let n = 0; n < maxSteps; n += 1) {
      if (timeUntil(this.#time, this.#end.hi, this.#end.lo) <= 0) return n;
      this.#makeStep();
      copy(this.#inputs, 0, rows, n * this.#width, this.#width);
      times![2 * n] = this.#time.hi;
      times![2 * n + 1] = this.#time.lo;
    }
    return maxSteps;
  }

  interpolate(timeHi: number, timeLo: number, out: Float64Array): void {
    const theta = timeUntil(this.#timeBefore, timeHi, timeLo) / this.#lastStep;
    if (!insideStep(theta)) throw invalid.interpolationTime(timeHi);
    this.#interpolant(theta, this.#lastStep, this.#before, this.#lastNodes, out);
  }

  #makeStep(): void {
    const smallest = this.#end.hi * 2 ** -60;
    const remaining = timeUntil(this.#time, this.#end.hi, this.#end.lo);
    const hopeless = !allFinite(this.#inputs, this.#width);
    for (;;) {
      const h = trialStep(this.#step, remaining, this.#longest);
      // The guess for this step was made for #step; stretching it to the end changes little.
      const error = this.#trial(h);
      const factor = error > 0 ? safety / power64(error, 9) : largestFactor;
      // Toward periapsis each step must be shorter than the last one's error tells: what it was shorter by before, it will be again.
      const trend = this.#lastStep > 0 ? Math.min((h / this.#lastStep) * (factor / this.#lastFactor), 1) : 1;
      const next = h * Math.min(Math.max(factor * trend, smallestFactor), largestFactor);
      if (error <= 1 || hopeless || h <= smallest) {
        this.#accept(h, h === remaining);
        this.#lastFactor = factor;
        this.#step = next;
        this.#foretell(this.#lastNodes, 1, next / h);
        return;
      }
      this.rejectedSteps += 1;
      this.#step = next;
      this.#foretell(this.#inputs.slice(this.#width), 0, next / h);
    }
  }

  /** Solves for the node accelerations of a step h; the error estimate over the tolerance, infinite where it is no number. */
  #trial(h: number): number {
    this.evaluations += iterate(
      this.#program.sweep,
      this.#code.sweep,
      h,
      this.#inputs,
      this.#swept,
      this.#width,
      this.#force,
    );
    this.#code.finish.evaluate(h, this.#inputs, this.#finished, this.#force);
    const error = this.#finished.at(-1)! / this.#swept.at(-1)! / this.#tolerance;
    return error >= 0 ? error : Number.POSITIVE_INFINITY;
  }

  #accept(h: number, last: boolean): void {
    this.#before.set(this.#inputs.subarray(0, this.#width));
    this.#lastNodes.set(this.#inputs.subarray(this.#width));
    Object.assign(this.#timeBefore, this.#time);
    this.#lastStep = h;
    if (last) Object.assign(this.#time, this.#end);
    else advanceTime(this.#time, h);
    if (!last || this.smallestStep === Number.POSITIVE_INFINITY)
      this.smallestStep = Math.min(this.smallestStep, h);
    this.#inputs.set(this.#finished.subarray(0, this.#width));
    this.#evaluateFirst();
  }

  /** Node accelerations at `from` + ratio c of a known step's polynomial; the first node's is known and stays. */
  #foretell(known: Float64Array, from: number, ratio: number): void {
    const d = this.#width / 2;
    const { nodes, basis } = this.#numbers;
    for (let i = 1; i < nodes.length; i += 1) {
      const x = from + ratio * nodes[i]!;
      for (let k = 0; k < d; k += 1) this.#inputs[this.#width + i * d + k] = 0;
      basis.forEach((polynomial, j) => {
        let weight = 0;
        for (let m = polynomial.length - 1; m >= 0; m -= 1) weight = weight * x + polynomial[m]!;
        for (let k = 0; k < d; k += 1) this.#inputs[this.#width + i * d + k]! += weight * known[j * d + k]!;
      });
    }
  }

  #evaluateFirst(): void {
    const d = this.#width / 2;
    const first = this.#inputs.subarray(this.#width, this.#width + d);
    this.#code.first.evaluate(0, this.#inputs, first, this.#force);
    this.evaluations += countEvaluations(this.#program.first);
  }
}
