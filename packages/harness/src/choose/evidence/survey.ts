import type { Stepper } from "@perigauge/steppers";
import type { Survey, SurveyPoint } from "../../report/evidence.ts";
import type { CellPool } from "../../run/cell-pool.ts";
import type { Cell, Score } from "../../score/score.ts";
import type { ChoiceRun } from "../choose-stepper.ts";
import { corners } from "../fleet.ts";
import { scoreCommand } from "../reproduce.ts";
import { surveyPlane } from "./survey-plane.ts";

const ORBITS = 10;
/** Off the line of apsides, where symmetric starts would flatter. */
const START_DEG = 30;
const ECCENTRICITIES: readonly number[] = [0.001, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 0.95];
const FEWEST_STEPS = 8;
const TWO_PI = 2 * Math.PI;

/**
 * Short runs of every candidate: over eccentricity at equal cost (that of the choice), and over step size at the scenario's largest
 * eccentricity. Steps per orbit are not whole, so that resonances and whole-orbit cancellations do not flatter.
 */
export async function survey(run: ChoiceRun, pool: CellPool, steppers: readonly Stepper[]): Promise<Survey> {
  const { choice, context, tried } = run;
  const eccentricity = Math.max(...corners(context.fleet).map((point) => point.eccentricity));
  const winner = choice.ranking.find(({ stepper }) => stepper === choice.choice);
  const evaluationsPerOrbit = Math.round(winner?.evaluationsPerOrbit ?? 2000);
  const candidates = tried.map(
    ({ candidate }) => steppers.find(({ id }) => id === candidate.stepper.id) as Stepper,
  );
  const fromCost = (stepper: Stepper, cost: number): Partial<Cell> | null => {
    if (stepper.knob === "tolerance" || stepper.evaluationsPerStep === null) return null;
    const stepsPerOrbit = Math.floor(cost / stepper.evaluationsPerStep) + 0.3;
    return stepsPerOrbit < FEWEST_STEPS ? null : { stepsPerOrbit };
  };
  const tolerance = winner?.tolerance ?? 1e-10;
  const cellsAgainstEccentricity = candidates.flatMap((stepper) =>
    ECCENTRICITIES.flatMap((e) => {
      const knob = stepper.knob === "tolerance" ? { tolerance } : fromCost(stepper, evaluationsPerOrbit);
      return knob === null ? [] : [cellOf(stepper, e, knob)];
    }),
  );
  const costs = Array.from({ length: 11 }, (_, i) => 125 * 2 ** (i * 0.75));
  const tolerances = Array.from({ length: 10 }, (_, i) => Number(`1e-${3 + i}`));
  const cellsAgainstStep = candidates.flatMap((stepper) => {
    const knobs =
      stepper.knob === "tolerance"
        ? tolerances.map((value) => ({ tolerance: value }))
        : costs.flatMap((cost) => fromCost(stepper, cost) ?? []);
    return knobs.map((knob) => cellOf(stepper, eccentricity, knob));
  });
  const cells = [...cellsAgainstEccentricity, ...cellsAgainstStep];
  const scores = await pool.run(
    cells.map((cell) => ({ cell, horizons: [] })),
    { measures: ["phase", "energy", "period"], summaries: "maxima" },
  );
  const points = cells.map((cell, i) => pointOf(cell, scores[i] as Score, candidates));
  return {
    orbits: ORBITS,
    startAnomalyDeg: START_DEG,
    evaluationsPerOrbit,
    againstEccentricity: points.slice(0, cellsAgainstEccentricity.length),
    eccentricity,
    againstStep: points.slice(cellsAgainstEccentricity.length),
    plane: await surveyPlane(run, pool, candidates),
  };
}

function cellOf(stepper: Stepper, eccentricity: number, knob: Partial<Cell>): Cell {
  return {
    stepper: stepper.id,
    eccentricity,
    ...knob,
    orbits: ORBITS,
    startAnomalyDeg: START_DEG,
    summation: "plain",
  };
}

/** Accepted steps per orbit of a variable-step run that ended well. */
function meanSteps(cell: Cell, score: Score): { meanStepsPerOrbit?: number } {
  if (cell.tolerance === undefined || score.ended.status === "diverged") return {};
  return { meanStepsPerOrbit: score.steps / cell.orbits };
}

function pointOf(cell: Cell, score: Score, steppers: readonly Stepper[]): SurveyPoint {
  const stepper = steppers.find(({ id }) => id === cell.stepper) as Stepper;
  const diverged = score.ended.status === "diverged";
  return {
    stepper: cell.stepper,
    title: stepper.title,
    symplectic: stepper.symplectic,
    eccentricity: cell.eccentricity,
    stepsPerOrbit: cell.stepsPerOrbit ?? (cell.step === undefined ? null : TWO_PI / cell.step),
    tolerance: cell.tolerance ?? null,
    evaluationsPerOrbit: score.evaluationsPerOrbit,
    phase: diverged ? null : score.phase.max,
    energy: diverged ? null : score.energy.max,
    period: diverged ? null : score.period.max,
    ended: score.ended.status,
    ...meanSteps(cell, score),
    command: scoreCommand(cell),
  };
}
