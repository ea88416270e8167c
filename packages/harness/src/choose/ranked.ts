import type { StepperInfo } from "@perigauge/steppers";
import { threeDigits } from "../text/numbers.ts";
import type { Candidate, ChoiceContext } from "./candidate.ts";
import type { ExcludedStepper, RankedStepper } from "./choice.ts";
import type { FleetOrbit } from "./fleet.ts";
import { limitErrors, margin, screenedErrors } from "./limit-errors.ts";
import type { Reading } from "./measure.ts";
import { evaluationsPerShortestOrbit, type Screened, type Screening } from "./screen.ts";
import type { Cliff, Found } from "./search.ts";
import type { Verified } from "./verify.ts";

/**
 * Evaluations of the whole fleet over the whole duration: of every orbit its costliest sampled run, and for every satellite the
 * evaluations of starting up again after each restart.
 */
export function fleetEvaluations(
  context: ChoiceContext,
  stepper: StepperInfo,
  readings: readonly Reading[],
): number {
  const again = restartsOf(context) * (stepper.startEvaluations ?? 1);
  return context.fleet.orbits.reduce((total: number, orbit: FleetOrbit, index: number) => {
    const own = readings.filter(({ sample }) => sample.point.orbitIndex === index);
    return total + orbit.count * (Math.max(...own.map(({ score }) => score.evaluations)) + again);
  }, 0);
}

/** Restarts of one satellite over the duration. */
export function restartsOf({ fleet, scenario }: ChoiceContext): number {
  return Math.floor(((scenario.restartsPerDay ?? 0) * fleet.durationSeconds) / 86400);
}

export function rankedRun(
  context: ChoiceContext,
  { stepper, knob }: Candidate,
  verified: Verified,
  cliff: Cliff,
): RankedStepper {
  const errors = limitErrors(context.measurer.limits, verified.at);
  const at = knob.physical(verified.fineness);
  const finest = knob.physical(verified.bandFinest);
  const edge = knob.physical(cliff.fineness);
  const floor = verified.floor === null ? null : knob.physical(verified.floor);
  return {
    stepper: stepper.id,
    title: stepper.title,
    symplectic: stepper.symplectic,
    ...at,
    evaluationsPerOrbit: evaluationsPerShortestOrbit(verified.at, context.fleet.shortestPeriodSeconds),
    evaluationsTotal: fleetEvaluations(context, stepper, verified.at),
    errors,
    ...margin(errors),
    band: {
      from: (at.stepSeconds ?? at.tolerance ?? at.stepsPerOrbit) as number,
      to: (finest.stepSeconds ?? finest.tolerance ?? finest.stepsPerOrbit) as number,
      cellsRun: verified.cellsRun,
    },
    cliff: {
      stepSeconds: edge.stepSeconds,
      tolerance: edge.tolerance,
      ratio: verified.fineness / cliff.fineness,
      reason: cliff.reason,
    },
    floor: floor === null ? null : { stepSeconds: floor.stepSeconds, tolerance: floor.tolerance },
    evidence: "run",
    why: "",
  };
}

/** A stepper whose cost by screening is too high to be worth running in full. */
export function rankedScreening(
  context: ChoiceContext,
  { stepper, knob }: Candidate,
  estimate: Screened,
): RankedStepper {
  const errors = screenedErrors(estimate.worst);
  const orbits = context.fleet.durationSeconds / context.fleet.shortestPeriodSeconds;
  const satellites = context.fleet.orbits.reduce((total, { count }) => total + count, 0);
  return {
    stepper: stepper.id,
    title: stepper.title,
    symplectic: stepper.symplectic,
    ...knob.physical(estimate.fineness),
    evaluationsPerOrbit: estimate.evaluationsPerOrbit,
    evaluationsTotal: Math.round(
      satellites *
        (estimate.evaluationsPerOrbit * orbits + restartsOf(context) * (stepper.startEvaluations ?? 1)),
    ),
    errors,
    ...margin(errors),
    band: null,
    cliff: null,
    floor: null,
    evidence: "extrapolated",
    why: "",
  };
}

/** One line for a stepper that holds the limits at no step: which limit is broken, by how much, and where. */
export function failedEntry(
  { measurer, designFactor }: ChoiceContext,
  { stepper, knob }: Candidate,
  screening: Screening,
  found: Found | null,
): ExcludedStepper {
  if (found !== null) {
    const { nearest, nearestFineness } = found;
    const index = nearest.limits.reduce(
      (best, { value }, i) =>
        value / (measurer.limits[i]?.limit ?? 1) >
        (nearest.limits[best]?.value ?? 0) / (measurer.limits[best]?.limit ?? 1)
          ? i
          : best,
      0,
    );
    const limit = measurer.limits[index];
    const value = nearest.limits[index]?.value ?? Number.POSITIVE_INFINITY;
    const allowed = (limit?.limit ?? 0) / designFactor;
    return {
      stepper: stepper.id,
      reason: `holds the limits over the band of no step allowed: ${limit?.id} is ${describe(value)} at ${describeKnob(knob.physical(nearestFineness))}, ${threeDigits(value / allowed)} times the ${describe(allowed)} allowed (limit / design factor), run in full${found.stalled ? "; finer steps do not help: rounding" : ""}`,
      limit: limit?.id ?? null,
      value: Number.isFinite(value) ? value : null,
      allowed,
    };
  }
  const best = screening.tried.reduce((a, b) => (b.ratio < a.ratio ? b : a));
  const binding = best.worst.reduce((a, b) => (b.value / b.limit.limit > a.value / a.limit.limit ? b : a));
  const allowed = binding.limit.limit / designFactor;
  const diverged = !Number.isFinite(binding.value);
  const how = diverged
    ? `the run diverges or ${binding.limit.id} is not defined`
    : `${binding.limit.id} is ${describe(binding.value)}, ${threeDigits(binding.value / allowed)} times the ${describe(allowed)} allowed (limit / design factor)`;
  return {
    stepper: stepper.id,
    reason: `holds the limits at no step tried: at ${describeKnob(knob.physical(best.fineness))} ${how}, extrapolated from short runs`,
    limit: binding.limit.id,
    value: diverged ? null : binding.value,
    allowed,
  };
}

function describe(value: number): string {
  return Number.isFinite(value) ? threeDigits(value) : "without bound";
}

export function describeKnob(at: {
  readonly stepSeconds: number | null;
  readonly stepsPerOrbit: number | null;
  readonly tolerance: number | null;
}): string {
  if (at.tolerance !== null) return `tolerance ${at.tolerance}`;
  if (at.stepSeconds !== null) return `a step of ${Number(at.stepSeconds.toPrecision(4))} s`;
  return `${threeDigits(at.stepsPerOrbit ?? 0)} uneven steps per orbit`;
}
