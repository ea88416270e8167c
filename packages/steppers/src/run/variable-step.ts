import type { PairProgram } from "../build/pair.ts";
import type { Setting } from "../build/step-program.ts";
import { invalid } from "../errors.ts";
import { compile } from "../program/compile.ts";
import { countEvaluations } from "../program/count.ts";
import { type Executable, type SuppliedForce, supply } from "../program/executable.ts";
import { pointMass, suppliedForce } from "../program/force.ts";
import type { Program } from "../program/program.ts";
import type { Start, Stepper, Trajectory } from "../stepper.ts";
import { checkAdvance, dimensionOf } from "./begin.ts";
import { type Controller, makeController } from "./controller.ts";
import { allFinite, copy } from "./copy.ts";
import { type Dense, insideStep } from "./dense.ts";
import { advanceTime, type Time, timeUntil } from "./double-double.ts";
import { firstStep } from "./first-step.ts";
import type { Claims } from "./fixed-step.ts";
import { trialStep, variableStart } from "./variable-start.ts";

export type PairClaims = Omit<Claims, "uneven"> & { readonly embeddedOrder: number };

/** A variable-step stepper whose trial step is a straight-line program. */
export interface PairStepper extends Stepper {
  readonly embeddedOrder: number;
  pair(setting: Setting): PairProgram;
}

/** A variable-step stepper from an embedded pair, with or without dense output. */
export function variableStep(
  { embeddedOrder, stages, ...info }: PairClaims,
  build: (setting: Setting) => PairProgram,
  dense: (() => Dense) | null,
): PairStepper {
  const compiled = new Map<string, Compiled>();
  const lowerOrder = Math.min(info.order, embeddedOrder);
  return {
    ...info,
    knob: "tolerance",
    uneven: true,
    denseOutput: dense !== null,
    selfStarting: true,
    get stages() {
      return stages();
    },
    evaluationsPerStep: null,
    startEvaluations: null,
    embeddedOrder,
    pair: build,
    begin(start: Start): Trajectory {
      const dimension = dimensionOf(start);
      const supplied = start.acceleration !== undefined;
      const key = `${dimension} ${supplied}`;
      let pair = compiled.get(key);
      if (pair === undefined) {
        const setting: Setting = {
          dimension,
          summation: "plain",
          force: supplied ? suppliedForce : pointMass,
        };
        pair = compilePair(build, dense, setting);
        compiled.set(key, pair);
      }
      return new VariableStepRun(start, pair, lowerOrder);
    },
  };
}

interface Compiled {
  readonly program: PairProgram;
  readonly first: Executable;
  readonly trial: Executable;
  readonly dense: Dense | null;
  readonly denseStages: { readonly program: Program; readonly run: Executable } | null;
}

function compilePair(
  build: (setting: Setting) => PairProgram,
  makeDense: (() => Dense) | null,
  setting: Setting,
): Compiled {
  const program = build(setting);
  const dense = makeDense?.() ?? null;
  const stages = dense?.stages?.(setting) ?? null;
  return {
    program,
    first: compile(program.first),
    trial: compile(program.trial),
    dense,
    denseStages: stages === null ? null : { program: stages, run: compile(stages) },
  };
}

class VariableStepRun implements Trajectory {
  evaluations = 0;
  rejectedSteps = 0;
  smallestStep: number = Number.POSITIVE_INFINITY;
  readonly interpolate?: (timeHi: number, timeLo: number, out: Float64Array) => void;
  readonly #pair: Compiled;
  readonly #trialEvaluations: number;
  readonly #width: number;
  readonly #force: SuppliedForce;
  readonly #controller: Controller;
  readonly #tolerance: number;
  readonly #end: Time;
  readonly #time: Time = { hi: 0, lo: 0 };
  /** State, then the acceleration there. */
  readonly #inputs: Float64Array;
  readonly #outputs: Float64Array;
  readonly #first: Float64Array;
  /** Where the last step made began, and its length. */
  readonly #before: Float64Array;
  readonly #timeBefore: Time = { hi: 0, lo: 0 };
  #lastStep = 0;
  readonly #longest: number;
  #step: number;
  /** The last step's slopes once something was interpolated, those that only dense output needs included. */
  #slopes: Float64Array | null = null;

  constructor(start: Start, pair: Compiled, lowerOrder: number) {
    const { dimension: d, tolerance, end, maxStep } = variableStart(start);
    this.#longest = maxStep;
    this.#pair = pair;
    this.#trialEvaluations = countEvaluations(pair.program.trial);
    this.#width = 2 * d;
    this.#force = supply(d, start.acceleration);
    this.#controller = makeController(lowerOrder);
    this.#tolerance = tolerance;
    this.#end = end;
    this.#inputs = new Float64Array(3 * d);
    this.#inputs.set(start.state);
    this.#before = start.state.slice();
    this.#outputs = new Float64Array(pair.program.trial.outputs.length);
    this.#first = new Float64Array(d);
    this.#evaluateFirst();
    this.#step = Math.min(firstStep(this.#inputs, d, tolerance, lowerOrder), end.hi);
    const { dense } = pair;
    if (dense !== null) this.interpolate = (hi, lo, out) => this.#interpolate(dense, hi, lo, out);
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

  /** Tries until a step is accepted. A state that is not finite, or a step of 2^-60 of the whole run, is accepted as it comes. */
  #makeStep(): void {
    const remaining = timeUntil(this.#time, this.#end.hi, this.#end.lo);
    const smallest = this.#end.hi * 2 ** -60;
    const hopeless = !allFinite(this.#inputs, this.#width);
    let rejected = false;
    for (;;) {
      const h = trialStep(this.#step, remaining, this.#longest);
      this.#pair.trial.evaluate(h, this.#inputs, this.#outputs, this.#force);
      this.evaluations += this.#trialEvaluations;
      const finite = allFinite(this.#outputs, this.#width);
      const ratio = this.#outputs[this.#width]! / this.#tolerance;
      const error = finite && ratio >= 0 ? ratio : Number.POSITIVE_INFINITY;
      if (error <= 1 || hopeless || h <= smallest) {
        this.#accept(h, h === remaining);
        this.#step = h * this.#controller.accepted(Math.min(error, 1), rejected);
        return;
      }
      rejected = true;
      this.rejectedSteps += 1;
      this.#step = h * this.#controller.rejected(error);
    }
  }

  #accept(h: number, last: boolean): void {
    const width = this.#width;
    copy(this.#inputs, 0, this.#before, 0, width);
    this.#timeBefore.hi = this.#time.hi;
    this.#timeBefore.lo = this.#time.lo;
    this.#lastStep = h;
    this.#slopes = null;
    if (last) {
      this.#time.hi = this.#end.hi;
      this.#time.lo = this.#end.lo;
    } else advanceTime(this.#time, h);
    if (!last || this.smallestStep === Number.POSITIVE_INFINITY)
      this.smallestStep = Math.min(this.smallestStep, h);
    copy(this.#outputs, 0, this.#inputs, 0, width);
    if (this.#pair.program.lastIsFirst) copy(this.#outputs, width + 1, this.#inputs, width, width / 2);
    else this.#evaluateFirst();
  }

  #evaluateFirst(): void {
    this.#pair.first.evaluate(0, this.#inputs, this.#first, this.#force);
    copy(this.#first, 0, this.#inputs, this.#width, this.#width / 2);
    this.evaluations += countEvaluations(this.#pair.program.first);
  }

  #interpolate(dense: Dense, hi: number, lo: number, out: Float64Array): void {
    const since = timeUntil(this.#timeBefore, hi, lo);
    const theta = since / this.#lastStep;
    if (!insideStep(theta)) throw invalid.interpolationTime(hi);
    this.#slopes ??= this.#denseSlopes();
    dense.interpolate(theta, this.#lastStep, this.#before, this.#slopes, out);
  }

  /** The step's slopes; with dense stages, velocities of all stages and then accelerations, the new state's and the added ones last. */
  #denseSlopes(): Float64Array {
    const width = this.#width;
    const d = width / 2;
    const { program, denseStages } = this.#pair;
    const own = this.#outputs.subarray(width + 1 + (program.lastIsFirst ? d : 0));
    if (denseStages === null) return own;
    const inputs = Float64Array.of(...this.#before, ...this.#inputs.subarray(d), ...own);
    const added = new Float64Array(denseStages.program.outputs.length);
    denseStages.run.evaluate(this.#lastStep, inputs, added, this.#force);
    this.evaluations += countEvaluations(denseStages.program);
    const half = own.length / 2;
    const addedHalf = added.length / 2;
    return Float64Array.of(
      ...own.subarray(0, half),
      ...this.#inputs.subarray(d, width),
      ...added.subarray(0, addedHalf),
      ...own.subarray(half),
      ...this.#inputs.subarray(width),
      ...added.subarray(addedHalf),
    );
  }
}
