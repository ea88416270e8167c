import { lanesAvailable, type Stepper } from "@perigauge/steppers";
import type { CellJob } from "../run/cell-task.ts";
import { stepsBy } from "../run/orbit-times.ts";
import { type ResolvedCell, resolveCell } from "../run/resolve-cell.ts";
import { type MeasureName, type Score, STEP_MEASURES, type StepMeasure } from "../score/score.ts";
import { LaneBlock } from "./lane-block.ts";
import { isProgramStepper, LaneMachine } from "./lane-machine.ts";
import { LaneRun } from "./lane-run.ts";

/** Steps of a group that repay the compilation of its stepper's kernel. */
const WORTH_COMPILING = 50_000;

let machine: LaneMachine | null | undefined;
let noted = false;

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
    const resolved = isProgramStepper(stepper) && !stepper.uneven ? resolveCell(job.cell, stepper) : null;
    if (resolved === null || !fits(job, resolved)) {
      left.push(index);
      return;
    }
    const key = `${stepper.id} ${job.cell.summation} ${job.cell.eccentricity === 0}`;
    const members = groups.get(key) ?? [];
    members.push({ index, resolved, horizons: job.horizons });
    groups.set(key, members);
  });
  for (const members of groups.values()) {
    if (!runGroup(members, measures, scores)) left.push(...members.map(({ index }) => index));
  }
  return left.sort((a, b) => a - b);
}

/** A horizon of no whole step is kept where a run by itself first looks, which lanes do not. */
function fits({ horizons }: CellJob, { stepsPerOrbit }: ResolvedCell): boolean {
  return horizons.every((orbits) => stepsBy(orbits, stepsPerOrbit as number) >= 1);
}

function runGroup(members: readonly Member[], measures: ReadonlySet<MeasureName>, scores: Score[]): boolean {
  const [first] = members;
  if (first === undefined) return true;
  const { stepper, cell } = first.resolved;
  const steps = members.reduce((sum, { resolved }) => sum + (resolved.steps as number), 0);
  if (machine?.knows(stepper, cell.summation) !== true && steps < WORTH_COMPILING) return false;
  const lanes = theMachine();
  const code = lanes?.stepper(stepper, cell.summation) ?? null;
  if (lanes === null || code === null) return false;
  const { program } = code;
  const circular = cell.eccentricity === 0;
  const score = lanes.score({
    measures: stepMeasures(measures, circular),
    passages: measures.has("period") || measures.has("timing"),
    circular,
    streamBytes: code.kernel.streamBytes,
  });
  // The longest first: the last lanes then end together.
  const order = members.toSorted(
    (a, b) => (b.resolved.steps as number) - (a.resolved.steps as number) || a.index - b.index,
  );
  function* queue(): Generator<LaneRun> {
    for (const { index, resolved, horizons } of order) {
      yield new LaneRun(index, resolved, program, { measures, summaries: "maxima", horizons });
    }
  }
  new LaneBlock(lanes, code, (count, width) => score(count, width), queue(), scores).run();
  return true;
}

function stepMeasures(measures: ReadonlySet<MeasureName>, circular: boolean): Set<StepMeasure> {
  return new Set(STEP_MEASURES.filter((name) => measures.has(name) && !(name === "apsis" && circular)));
}

function theMachine(): LaneMachine | null {
  if (machine === undefined) machine = lanesAvailable() ? new LaneMachine() : null;
  if (machine === null && !noted) {
    noted = true;
    process.stderr.write(
      "note: this host has no WebAssembly vectors; cells run one by one, several times slower\n",
    );
  }
  return machine;
}
