import type { CollocationProgram } from "../build/collocation.ts";
import type { Setting } from "../build/step-program.ts";
import { compile } from "../program/compile.ts";
import { countEvaluations } from "../program/count.ts";
import { type Executable, type SuppliedForce, supply } from "../program/executable.ts";
import { pointMass, suppliedForce } from "../program/force.ts";
import type { Start, Stepper, Trajectory } from "../stepper.ts";
import { checkAdvance, dimensionOf, stepOf } from "./begin.ts";
import type { Claims } from "./fixed-step.ts";
import { type CollocationInDoubles, RadauRun } from "./radau.ts";
import { iterate } from "./sweeps.ts";

/** An implicit stepper of fixed h: straight-line parts around an iteration. */
export interface ImplicitStepper extends Stepper {
  collocation(setting: Setting): CollocationProgram;
}

/** The parts of a collocation step, ready to run. */
export interface CompiledCollocation {
  readonly program: CollocationProgram;
  readonly first: Executable;
  readonly sweep: Executable;
  readonly finish: Executable;
}

export function implicitStep(
  claims: Claims,
  build: (setting: Setting) => CollocationProgram,
): ImplicitStepper {
  const { stages, ...info } = claims;
  const compiled = new Map<string, CompiledCollocation>();
  return {
    ...info,
    knob: "step",
    uneven: false,
    denseOutput: false,
    selfStarting: true,
    get stages() {
      return stages();
    },
    evaluationsPerStep: null,
    startEvaluations: null,
    collocation: build,
    begin(start: Start): Trajectory {
      const dimension = dimensionOf(start);
      const h = stepOf(start);
      const { acceleration, summation = "plain" } = start;
      const key = `${dimension} ${summation} ${acceleration !== undefined}`;
      let code = compiled.get(key);
      if (code === undefined) {
        const force = acceleration === undefined ? pointMass : suppliedForce;
        code = compileCollocation(build({ dimension, summation, force }));
        compiled.set(key, code);
      }
      return new ImplicitRun(code, start.state, h, supply(dimension, acceleration));
    },
  };
}

/** A variable-step stepper by collocation. */
export function variableCollocation(
  claims: Claims,
  build: (setting: Setting) => CollocationProgram,
  numbers: () => CollocationInDoubles,
): ImplicitStepper {
  const { stages, ...info } = claims;
  const compiled = new Map<string, CompiledCollocation>();
  return {
    ...info,
    knob: "tolerance",
    uneven: true,
    denseOutput: true,
    selfStarting: true,
    get stages() {
      return stages();
    },
    evaluationsPerStep: null,
    startEvaluations: null,
    collocation: build,
    begin(start: Start): Trajectory {
      const dimension = dimensionOf(start);
      const key = `${dimension} ${start.acceleration !== undefined}`;
      let code = compiled.get(key);
      if (code === undefined) {
        const force = start.acceleration === undefined ? pointMass : suppliedForce;
        code = compileCollocation(build({ dimension, summation: "plain", force }));
        compiled.set(key, code);
      }
      return new RadauRun(start, code, numbers());
    },
  };
}

function compileCollocation(program: CollocationProgram): CompiledCollocation {
  return {
    program,
    first: compile(program.first),
    sweep: compile(program.sweep),
    finish: compile(program.finish),
  };
}

class ImplicitRun implements Trajectory {
  evaluations = 0;
  readonly rejectedSteps = 0;
  readonly smallestStep: number;
  readonly #code: CompiledCollocation;
  readonly #h: number;
  readonly #force: SuppliedForce;
  readonly #width: number;
  /** State, compensations, node accelerations. */
  readonly #variables: Float64Array;
  readonly #nodesAt: number;
  /** State, node accelerations. */
  readonly #sweepInputs: Float64Array;
  readonly #sweepOutputs: Float64Array;
  readonly #finished: Float64Array;

  constructor(code: CompiledCollocation, state: Float64Array, h: number, force: SuppliedForce) {
    const { program } = code;
    this.#code = code;
    this.#h = h;
    this.smallestStep = Math.abs(h);
    this.#force = force;
    this.#width = state.length;
    this.#variables = new Float64Array(program.finish.inputs);
    this.#nodesAt = program.finish.inputs - (program.stages * state.length) / 2;
    this.#sweepInputs = new Float64Array(program.sweep.inputs);
    this.#sweepOutputs = new Float64Array(program.sweep.outputs.length);
    this.#finished = new Float64Array(program.finish.outputs.length);
    this.#variables.set(state);
    const first = new Float64Array(state.length / 2);
    code.first.evaluate(h, state, first, force);
    this.evaluations += countEvaluations(program.first);
    for (let i = 0; i < program.stages; i += 1) this.#variables.set(first, this.#nodesAt + i * first.length);
  }

  advance(maxSteps: number, rows: Float64Array): number {
    const width = this.#width;
    checkAdvance(maxSteps, width, rows, false, undefined);
    const state = this.#variables.subarray(0, width);
    const nodes = this.#variables.subarray(this.#nodesAt);
    const next = this.#finished.subarray(0, this.#variables.length);
    const solved = this.#sweepInputs.subarray(width);
    const { program, sweep, finish } = this.#code;
    for (let n = 0; n < maxSteps; n += 1) {
      this.#sweepInputs.set(state);
      this.#sweepInputs.set(nodes, width);
      this.evaluations += iterate(
        program.sweep,
        sweep,
        this.#h,
        this.#sweepInputs,
        this.#sweepOutputs,
        width,
        this.#force,
      );
      nodes.set(solved);
      finish.evaluate(this.#h, this.#variables, this.#finished, this.#force);
      this.#variables.set(next);
      rows.set(state, n * width);
    }
    return maxSteps;
  }
}
