import type { Stepper } from "@perigauge/steppers";
import type { ChoiceEvidence } from "../report/evidence.ts";
import type { CellPool } from "../run/cell-pool.ts";
import type { ChoiceRun } from "./choose-stepper.ts";
import { costPoints } from "./evidence/cost-points.ts";
import { histories } from "./evidence/histories.ts";
import { orbitTrack } from "./evidence/orbit-track.ts";
import { survey } from "./evidence/survey.ts";

/** Runs what the report shows beyond the search itself: a survey of all candidates, histories over the duration, one orbit step by step. */
export async function gatherEvidence(
  run: ChoiceRun,
  pool: CellPool,
  steppers: readonly Stepper[],
): Promise<ChoiceEvidence> {
  return {
    choice: run.choice,
    costPoints: costPoints(run),
    survey: await survey(run, pool, steppers),
    histories: histories(run, steppers),
    track: orbitTrack(run, steppers),
  };
}
