import { findStepper, LANES } from "@perigauge/steppers";
import { runsInLanes } from "../lanes/lane-machine.ts";
import type { CellJob } from "./cell-task.ts";

/**
 * A task should take this many steps, give or take: long enough to hide the hand-over, short enough to keep all threads busy. Steps in
 * lanes are several times faster.
 */
const STEPS_PER_TASK = 400_000;
const LANE_STEPS_PER_TASK = 2_000_000;
/** A lone task above this many steps is shared among the threads. */
const WORTH_SHARING = 100_000;

interface Task {
  readonly indices: readonly number[];
  readonly steps: number;
}

/** Indices of jobs, task by task, the largest first: cells of one stepper together, in whole blocks of lanes where there are enough. */
export function taskIndices(jobs: readonly CellJob[], workers: number): number[][] {
  const groups = new Map<string, number[]>();
  jobs.forEach(({ cell }, index) => {
    const stepper = findStepper(cell.stepper);
    const lanes = stepper !== undefined && runsInLanes(stepper);
    const key = lanes ? `${cell.stepper} ${cell.summation}` : "";
    const group = groups.get(key);
    if (group === undefined) groups.set(key, [index]);
    else group.push(index);
  });
  const tasks = [...groups].flatMap(([key, group]) => {
    const order = group.toSorted((a, b) => expectedSteps(jobs[b]) - expectedSteps(jobs[a]) || a - b);
    return key === "" ? cut(jobs, order, STEPS_PER_TASK, 1) : cut(jobs, order, LANE_STEPS_PER_TASK, LANES);
  });
  const [only] = tasks;
  if (tasks.length === 1 && only !== undefined && only.steps > WORTH_SHARING) return shared(only, workers);
  return tasks.toSorted((a, b) => b.steps - a.steps).map(({ indices }) => [...indices]);
}

/** Tasks of so many steps, and of whole blocks but for the last. */
function cut(jobs: readonly CellJob[], order: readonly number[], wanted: number, block: number): Task[] {
  const tasks: Task[] = [];
  let indices: number[] = [];
  let steps = 0;
  for (const index of order) {
    indices.push(index);
    steps += expectedSteps(jobs[index]);
    if (steps >= wanted && indices.length % block === 0) {
      tasks.push({ indices, steps });
      indices = [];
      steps = 0;
    }
  }
  if (indices.length > 0) tasks.push({ indices, steps });
  return tasks;
}

/** One task dealt out among the threads. */
function shared({ indices }: Task, workers: number): number[][] {
  const hands = Array.from({ length: Math.min(workers, indices.length) }, (): number[] => []);
  indices.forEach((index, i) => {
    hands[i % hands.length]?.push(index);
  });
  return hands;
}

function expectedSteps(job: CellJob | undefined): number {
  if (job === undefined) return 0;
  const { orbits, step, stepsPerOrbit } = job.cell;
  // A variable-step run is not known beforehand; some hundred steps an orbit is usual.
  return orbits * (stepsPerOrbit ?? (step === undefined ? 300 : (2 * Math.PI) / step));
}
