import type { StepperInfo } from "@perigauge/steppers";
import type { Scenario } from "../scenario/scenario.ts";
import type { Fleet } from "./fleet.ts";
import { daysToSeconds, nineEach } from "./fleet.ts";
import { type Knob, knobOf } from "./knob.ts";
import type { Measurer, Reading, Sample } from "./measure.ts";
import { startsOf } from "./starts.ts";

/** A stepper on its way through the search, with all that its runs need. */
export interface Candidate {
  readonly stepper: StepperInfo;
  readonly knob: Knob;
  /** Grows as the worst case is refined. */
  readonly samples: Sample[];
}

/** What every stage of the search shares. */
export interface ChoiceContext {
  readonly scenario: Scenario;
  readonly fleet: Fleet;
  readonly measurer: Measurer;
  readonly designFactor: number;
  readonly seed: number;
}

export function makeCandidate(stepper: StepperInfo, { scenario, fleet }: ChoiceContext): Candidate {
  const { durationSeconds, longestPeriodSeconds } = fleet;
  const horizons = scenario.limits.map(({ withinDays }) =>
    daysToSeconds(withinDays ?? Number.POSITIVE_INFINITY),
  );
  const shortest = Math.min(durationSeconds, ...horizons) / longestPeriodSeconds;
  const starts = startsOf(scenario, stepper.timeReversible, shortest);
  const samples = nineEach(fleet).flatMap((point) =>
    starts.map((startAnomalyDeg) => ({ point, startAnomalyDeg })),
  );
  return { stepper, knob: knobOf(stepper, scenario, fleet), samples };
}

/** Full-length runs of the samples at one fineness. */
export function runFull(
  context: ChoiceContext,
  { knob }: Candidate,
  samples: readonly Sample[],
  fineness: number,
): Promise<Reading[]> {
  const { measurer } = context;
  return measurer.measure(
    samples.map((sample) => ({
      sample,
      cell: knob.cellAt(sample.point, sample.startAnomalyDeg, fineness, measurer.durationSeconds),
    })),
  );
}
