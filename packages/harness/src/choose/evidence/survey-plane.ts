import type { Stepper } from "@perigauge/steppers";
import type { PlaneCell, SurveyPlane } from "../../report/evidence.ts";
import type { CellPool } from "../../run/cell-pool.ts";
import type { Cell, Score } from "../../score/score.ts";
import type { ChoiceRun } from "../choose-stepper.ts";
import { corners, daysToSeconds, type FleetPoint, orbitsOf } from "../fleet.ts";
import { extrapolate, steepestGrowth } from "../growth-law.ts";
import { type Limit, measuresOf, readLimit, readMaxima } from "../limits.ts";
import { scoreCommand } from "../reproduce.ts";

const ORBITS = 10;
/** Off the line of apsides, where symmetric starts would flatter. */
const START_DEG = 30;
const MOST_STEPPERS = 6;
const ECCENTRICITIES: readonly number[] = [0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9];
/** Not whole, so that resonances and whole-orbit cancellations do not flatter. */
const STEPS_PER_ORBIT: readonly number[] = Array.from({ length: 9 }, (_, i) => 20 * 2 ** i + 0.3);

/**
 * Where in the plane of eccentricity and steps per orbit the leading steppers hold the scenario's limits: the choice, today's, the
 * best of the other kind (symplectic or not) and the next of the ranking, as far as they take a step. Errors of the short runs are carried on to the duration with the growth seen in them, as in
 * screening; limits in kilometres and seconds are read at the orbit of the largest eccentricity.
 */
export async function surveyPlane(
  run: ChoiceRun,
  pool: CellPool,
  steppers: readonly Stepper[],
): Promise<SurveyPlane> {
  const { context } = run;
  const { limits } = context.measurer;
  const leading = leadingSteppers(run, steppers);
  const place = corners(context.fleet).reduce((a, b) => (b.eccentricity > a.eccentricity ? b : a));
  const cells = leading.flatMap((stepper) =>
    ECCENTRICITIES.flatMap((eccentricity) =>
      STEPS_PER_ORBIT.map(
        (stepsPerOrbit): Cell => ({
          stepper: stepper.id,
          eccentricity,
          stepsPerOrbit,
          orbits: ORBITS,
          startAnomalyDeg: START_DEG,
          summation: "plain",
        }),
      ),
    ),
  );
  const scores = await pool.run(
    cells.map((cell) => ({ cell, horizons: [ORBITS / 2] })),
    { measures: [...new Set([...measuresOf(limits), "phase" as const])], summaries: "maxima" },
  );
  return {
    orbits: ORBITS,
    semiMajorAxisKm: place.semiMajorAxisKm,
    steppers: leading.map(({ id }) => id),
    eccentricities: ECCENTRICITIES,
    stepsPerOrbit: STEPS_PER_ORBIT,
    cells: cells.map((cell, i) => {
      const stepper = leading.find(({ id }) => id === cell.stepper) as Stepper;
      return planeCell(cell, scores[i] as Score, stepper, limits, place, context.measurer.durationSeconds);
    }),
  };
}

function leadingSteppers({ choice, tried }: ChoiceRun, steppers: readonly Stepper[]): Stepper[] {
  const winner = choice.ranking.find(({ stepper }) => stepper === choice.choice);
  const ofOtherKind = choice.ranking.find(({ symplectic }) => symplectic !== winner?.symplectic);
  const ids = [
    choice.choice,
    choice.current?.stepper,
    ofOtherKind?.stepper,
    ...choice.ranking.map(({ stepper }) => stepper),
    // Where nothing is ranked: in the order they were tried.
    ...tried.map(({ candidate }) => candidate.stepper.id),
  ];
  return [...new Set(ids)]
    .flatMap((id) => steppers.find((stepper) => stepper.id === id && stepper.knob === "step") ?? [])
    .slice(0, MOST_STEPPERS);
}

function planeCell(
  cell: Cell,
  score: Score,
  stepper: Stepper,
  limits: readonly Limit[],
  place: FleetPoint,
  durationSeconds: number,
): PlaneCell {
  const diverged = score.ended.status === "diverged";
  const worst = limits
    .map((limit) => ({ id: limit.id, ratio: ratioOf(limit, score, stepper, place, durationSeconds) }))
    .reduce((a, b) => (b.ratio > a.ratio ? b : a));
  return {
    stepper: cell.stepper,
    eccentricity: cell.eccentricity,
    stepsPerOrbit: cell.stepsPerOrbit as number,
    evaluationsPerOrbit: score.evaluationsPerOrbit,
    phase: diverged ? null : score.phase.max,
    ratio: Number.isFinite(worst.ratio) ? worst.ratio : null,
    bindingLimit: Number.isFinite(worst.ratio) ? worst.id : null,
    command: scoreCommand(cell),
  };
}

/** Error at the end of the limit's time over the limit. */
function ratioOf(
  limit: Limit,
  score: Score,
  stepper: Stepper,
  place: FleetPoint,
  durationSeconds: number,
): number {
  const { value } = readLimit({ ...limit, withinDays: null }, score, place);
  const seconds =
    limit.withinDays === null ? durationSeconds : Math.min(daysToSeconds(limit.withinDays), durationSeconds);
  const half = readMaxima(limit, score.horizons?.[0]?.maxima ?? {}, place);
  const wanted = orbitsOf(place, seconds);
  return extrapolate(half, value, ORBITS, wanted, steepestGrowth(stepper, limit.key)) / limit.limit;
}
