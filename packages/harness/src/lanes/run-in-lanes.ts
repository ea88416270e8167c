import { lanesAvailable, type Stepper } from "@perigauge/steppers";
import type { CellJob } from "../run/cell-task.ts";
import { stepsBy } from "../run/orbit-times.ts";
import { type ResolvedCell, resolveCell } from "../run/resolve-cell.ts";
import type { ScoringPlan } from "../score/run-scorer.ts";
import { type MeasureName, type Score, STEP_MEASURES, type StepMeasure } from "../score/score.ts";
import { EvenBlock } from "./even-block.ts";
import { LaneMachine, runsInLanes } from "./lane-machine.ts";
import type { LaneRun } from "./lane-run.ts";
import { StepRun } from "./step-run.ts";
import { TrialRun } from "./trial-run.ts";
import { UnevenBlock } from "./uneven-block.ts";

/** Steps of a group that repay the compilation of its stepper's kernel. */
const WORTH_COMPILING = 50_000;

/** Measures that compare with the exact states at the same times. */
const TRACKED = ["phase", "position", "alongTrack", "radial", "period", "timing"] as const;

let machine: LaneMachine | null | undefined;

interface Member {
  readonly index: number;
  readonly resolved: ResolvedCell;
  readonly horizons: readonly number[];
}

/**
 * Runs what can be run in lanes and writes those scores to their places; returns the indices of the cells that are left. The scores are
 * those of `runCell`, digit for digit, however cells are grouped.
 */
export function runInLanes(
  jobs: readonly CellJob[],
  stepperOf: (job: CellJob) => Stepper,
  measures: ReadonlySet<MeasureName>,
  scores: Score[],
): number[] {
  const left: number[] = [];
  const groups = new Map<string, Member[]>();
  jobs.forEach((job, index) => {
    const stepper = stepperOf(job);
    const resolved = runsInLanes(stepper) ? resolveCell(job.cell, stepper) : null;
    if (resolved === null || !fits(job, resolved)) {
      left.push(index);
      return;
    }
    const key = `${stepper.id} ${job.cell.summation} ${job.cell.eccentricity === 0}`;
    const members = groups.get(key) ?? [];
    members.push({ index, resolved, horizons: job.horizons });
    groups.set(key, members);
  });
  for (const members of groups.values()) left.push(...runGroup(members, measures, scores));
  return left.sort((a, b) => a - b);
}

/** A horizon of no whole step is kept where a run by itself first looks, which lanes do not. */
function fits({ horizons }: CellJob, { stepper, stepsPerOrbit }: ResolvedCell): boolean {
  return stepper.uneven || horizons.every((orbits) => stepsBy(orbits, stepsPerOrbit as number) >= 1);
}

/** Runs cells of one stepper; returns the indices of those that are left. */
function runGroup(members: readonly Member[], measures: ReadonlySet<MeasureName>, scores: Score[]): number[] {
  const all = members.map(({ index }) => index);
  const [first] = members;
  if (first === undefined) return [];
  const { stepper, cell } = first.resolved;
  const steps = members.reduce((sum, { resolved }) => sum + expectedSteps(resolved), 0);
  if (machine?.knows(stepper, cell.summation) !== true && steps < WORTH_COMPILING) return all;
  const lanes = theMachine();
  const code = lanes?.stepper(stepper, cell.summation) ?? null;
  if (lanes === null || code === null) return all;
  const circular = cell.eccentricity === 0;
  const score = lanes.score({
    measures: stepMeasures(measures, circular),
    passages: measures.has("period") || measures.has("timing"),
    circular,
    uneven: stepper.uneven,
    streamBytes: code.kernel.streamBytes,
  });
  // The longest first: the last lanes then end together.
  const order = members.toSorted(
    (a, b) => expectedSteps(b.resolved) - expectedSteps(a.resolved) || a.index - b.index,
  );
  function* runs<Run>(make: (member: Member, plan: ScoringPlan) => Run): Generator<Run> {
    for (const member of order) {
      yield make(member, { measures, summaries: "maxima", horizons: member.horizons });
    }
  }
  const setting = {
    machine: lanes,
    kernel: code.kernel,
    tracks: TRACKED.some((name) => measures.has(name)),
    score: (from: number, count: number, width: number) => score(from, count, width),
    scores,
  };
  const stepRun = ({ index, resolved }: Member, plan: ScoringPlan): StepRun => {
    if (code.kind !== "steps") throw new Error("lanes: a run of steps needs a kernel of steps");
    return new StepRun(index, resolved, plan, code.program, code.kernel);
  };
  if (!stepper.uneven) {
    new EvenBlock({ ...setting, queue: runs(stepRun) }).run();
    return [];
  }
  const queue =
    code.kind === "steps"
      ? runs<LaneRun>(stepRun)
      : runs<LaneRun>(({ index, resolved }, plan) => new TrialRun(index, resolved, plan, code.kernel));
  const block = new UnevenBlock({ ...setting, queue });
  block.run();
  return block.left;
}

/** Steps of a cell; those of a variable step are not known beforehand: some hundred an orbit are usual. */
function expectedSteps({ steps, cell }: ResolvedCell): number {
  return steps ?? 300 * cell.orbits;
}

function stepMeasures(measures: ReadonlySet<MeasureName>, circular: boolean): Set<StepMeasure> {
  return new Set(STEP_MEASURES.filter((name) => measures.has(name) && !(name === "apsis" && circular)));
}

function theMachine(): LaneMachine | null {
  if (machine === undefined) machine = lanesAvailable() ? new LaneMachine() : null;
  return machine;
}
