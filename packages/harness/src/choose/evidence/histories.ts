import type { Stepper } from "@perigauge/steppers";
import type { History } from "../../report/evidence.ts";
import { runCell } from "../../run/run-cell.ts";
import type { Cell, MeasureName } from "../../score/score.ts";
import type { LimitError, RankedStepper } from "../choice.ts";
import type { ChoiceRun } from "../choose-stepper.ts";
import { type FleetPoint, orbitsOf } from "../fleet.ts";
import { describeKnob } from "../ranked.ts";
import { scoreCommand } from "../reproduce.ts";
import { OrbitByOrbit } from "./orbit-by-orbit.ts";
import { stepOf } from "./step-of.ts";

const POINTS = 200;
const TWO_PI = 2 * Math.PI;
const MEASURED: ReadonlySet<MeasureName> = new Set(["energy", "phase", "alongTrack", "period"]);

/**
 * Energy, phase and along-track error over the whole duration for the chosen stepper, its best rival of the other kind (symplectic or
 * not) and today's choice, each from its own worst start on the orbit where the choice is worst.
 */
export function histories(run: ChoiceRun, steppers: readonly Stepper[]): History[] {
  const { choice, context } = run;
  const winner = choice.ranking.find(({ stepper }) => stepper === choice.choice);
  if (winner === undefined) return [];
  const place = worstPlace(winner);
  const point = place && nearestPoint(run, place);
  if (place === undefined || point === undefined) return [];
  const rival =
    choice.ranking.find((entry) => entry.symplectic !== winner.symplectic) ?? rivalOfOtherKind(run, winner);
  const roles: {
    role: History["role"];
    entry: Pick<
      RankedStepper,
      "stepper" | "title" | "symplectic" | "stepSeconds" | "stepsPerOrbit" | "tolerance"
    >;
  }[] = [{ role: "choice", entry: winner }];
  if (rival !== undefined) roles.push({ role: "rival", entry: rival });
  if (choice.current !== null) roles.push({ role: "current", entry: choice.current });
  return roles.map(({ role, entry }) => {
    const cell: Cell = {
      stepper: entry.stepper,
      eccentricity: point.eccentricity,
      ...(entry.tolerance !== null
        ? { tolerance: entry.tolerance, ...maxStepOf(run, point) }
        : { step: stepOf(entry, context.fleet.shortestPeriodSeconds, point) }),
      orbits: orbitsOf(point, context.measurer.durationSeconds),
      startAnomalyDeg: place.startAnomalyDeg,
      summation: "plain",
    };
    const stepper = steppers.find(({ id }) => id === entry.stepper) as Stepper;
    return {
      stepper: entry.stepper,
      title: entry.title,
      symplectic: entry.symplectic,
      role,
      label: `${entry.stepper}, ${describeKnob(entry)}`,
      orbit: point.orbit,
      eccentricity: point.eccentricity,
      startAnomalyDeg: place.startAnomalyDeg,
      command: scoreCommand(cell),
      ...historyOf(cell, stepper, point),
    };
  });
}

function worstPlace(entry: RankedStepper): LimitError | undefined {
  return entry.bindingLimit === null ? undefined : entry.errors[entry.bindingLimit];
}

function nearestPoint({ context }: ChoiceRun, place: LimitError): FleetPoint | undefined {
  return context.measurer.readings
    .map(({ sample }) => sample.point)
    .find((point) => point.orbit === place.orbit && point.eccentricity === place.eccentricity);
}

function maxStepOf({ context }: ChoiceRun, point: FleetPoint): { maxStep?: number } {
  const seconds = context.scenario.step?.maxSeconds;
  return seconds === undefined ? {} : { maxStep: seconds * point.meanMotion };
}

/** Where no stepper of the other kind is ranked: the one that screening brought nearest, at the cost of the choice. */
function rivalOfOtherKind(
  { tried }: ChoiceRun,
  winner: RankedStepper,
):
  | Pick<RankedStepper, "stepper" | "title" | "symplectic" | "stepSeconds" | "stepsPerOrbit" | "tolerance">
  | undefined {
  const others = tried
    .filter(({ candidate }) => candidate.stepper.symplectic !== winner.symplectic)
    .flatMap(({ candidate, screening }) =>
      screening.tried
        .filter(({ ratio }) => Number.isFinite(ratio))
        .map(({ fineness, ratio, evaluationsPerOrbit }) => ({
          candidate,
          fineness,
          // Error at the cost of the choice, by the method's order.
          ratioAtCost: ratio * (evaluationsPerOrbit / winner.evaluationsPerOrbit) ** candidate.stepper.order,
        })),
    );
  const best = others.toSorted((a, b) => a.ratioAtCost - b.ratioAtCost)[0];
  if (best === undefined) return undefined;
  const { stepper, knob } = best.candidate;
  const perStep = stepper.evaluationsPerStep;
  const fineness =
    knob.kind === "step" && perStep !== null ? winner.evaluationsPerOrbit / perStep : best.fineness;
  const { stepSeconds, stepsPerOrbit, tolerance } = knob.physical(Math.max(5, fineness));
  return {
    stepper: stepper.id,
    title: stepper.title,
    symplectic: stepper.symplectic,
    stepSeconds,
    stepsPerOrbit,
    tolerance,
  };
}

/**
 * Largest absolute errors within each of at most 200 intervals that are even in log time; the period error of single orbits; the energy
 * error over the first orbit.
 */
function historyOf(
  cell: Cell,
  stepper: Stepper,
  point: FleetPoint,
): Required<Pick<History, "points" | "periods" | "oscillation">> {
  const first = 1 / 4;
  const edges = Array.from({ length: POINTS }, (_, i) => first * (cell.orbits / first) ** (i / (POINTS - 1)));
  edges[POINTS - 1] = Number.POSITIVE_INFINITY;
  const points: History["points"][number][] = [];
  let bin = 0;
  let last = 0;
  let energy = 0;
  let phase = 0;
  let along = 0;
  const oneOrbit = new OrbitByOrbit(cell.orbits);
  const close = (): void => {
    if (last > 0) {
      points.push({
        orbit: last,
        days: (last * point.periodSeconds) / 86400,
        energyRelative: energy,
        phaseRad: phase,
        alongTrackKm: along * point.semiMajorAxisKm,
      });
    }
    last = 0;
    energy = 0;
    phase = 0;
    along = 0;
  };
  runCell(cell, stepper, {
    observePassage: (passage) => oneOrbit.acceptPassage(passage),
    measures: MEASURED,
    summaries: "maxima",
    horizons: [],
    observe: ({ chunk, from, to, errors }) => {
      for (let i = from; i < to; i++) {
        const time =
          cell.step === undefined ? (chunk.times[2 * i] as number) : (chunk.firstStep + i) * cell.step;
        const orbit = time / TWO_PI;
        while (orbit > (edges[bin] as number)) {
          close();
          bin += 1;
        }
        last = orbit;
        if (orbit <= 1) oneOrbit.acceptEnergy(orbit, errors.energy[i] as number);
        energy = Math.max(energy, Math.abs(errors.energy[i] as number));
        phase = Math.max(phase, Math.abs(errors.phase[i] as number));
        along = Math.max(along, Math.abs(errors.alongTrack[i] as number));
      }
    },
  });
  close();
  return { points, periods: oneOrbit.periods, oscillation: oneOrbit.oscillation() };
}
