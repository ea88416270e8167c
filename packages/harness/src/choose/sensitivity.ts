import type { Scenario, ScenarioLimit } from "../scenario/scenario.ts";
import { type ChoiceContext, makeCandidate } from "./candidate.ts";
import { LIMIT_KEYS, type LimitKey, type Sensitivity } from "./choice.ts";
import type { Tried } from "./choose-stepper.ts";
import { buildFleet, corners } from "./fleet.ts";
import { limitsOf } from "./limits.ts";
import { screen } from "./screen.ts";

/** Candidates that a changed scenario is screened with: the best of the original by screened cost. */
const CANDIDATES = 12;
const ECCENTRICITY_STEP = 0.05;
const MOST_ECCENTRIC = 0.99;

interface Change {
  readonly change: string;
  readonly scenario: Scenario;
  /** Added to every eccentricity, at the same semi-major axis. */
  readonly eccentricityStep?: number;
}

/**
 * How the choice would change: limits ten times tighter or looser, a duration ten times longer, an eccentricity 0.05 higher. Each is screened
 * with the cheapest candidates of the scenario itself and extrapolated; none is run in full, and the result says so.
 */
export async function sensitivity(context: ChoiceContext, tried: readonly Tried[]): Promise<Sensitivity[]> {
  const steppers = tried
    .filter(({ screening }) => screening.estimate !== null)
    .toSorted(
      (a, b) =>
        (a.screening.estimate?.evaluationsPerOrbit ?? 0) - (b.screening.estimate?.evaluationsPerOrbit ?? 0),
    )
    .slice(0, CANDIDATES)
    .map(({ candidate }) => candidate.stepper);
  const rows: Sensitivity[] = [];
  for (const { change, scenario, eccentricityStep } of changes(context.scenario)) {
    const fleet = buildFleet(scenario, eccentricityStep);
    if (corners(fleet).some(({ eccentricity }) => eccentricity > MOST_ECCENTRIC)) continue;
    const limits = limitsOf(scenario.limits, scenario.integrationShare);
    const changed: ChoiceContext = {
      ...context,
      scenario,
      fleet,
      measurer: context.measurer.withLimits(limits, fleet.durationSeconds),
    };
    const cap = scenario.require?.evaluationsPerOrbit ?? Number.POSITIVE_INFINITY;
    const screened = await Promise.all(
      steppers.map(async (stepper) => {
        const candidate = makeCandidate(stepper, changed);
        const { estimate } = await screen(changed, candidate, Math.min(65_536, 4 * cap));
        return { candidate, estimate };
      }),
    );
    const best = screened
      .flatMap(({ candidate, estimate }) =>
        estimate === null || estimate.evaluationsPerOrbit > cap ? [] : [{ candidate, estimate }],
      )
      .toSorted((a, b) => a.estimate.evaluationsPerOrbit - b.estimate.evaluationsPerOrbit)[0];
    rows.push({
      change,
      stepper: best?.candidate.stepper.id ?? null,
      ...(best?.candidate.knob.physical(best.estimate.fineness) ?? {
        stepSeconds: null,
        stepsPerOrbit: null,
        tolerance: null,
      }),
      evaluationsPerOrbit: best?.estimate.evaluationsPerOrbit ?? null,
      evidence: "extrapolated",
    });
  }
  return rows;
}

function changes(scenario: Scenario): Change[] {
  const { duration } = scenario;
  const longer = "days" in duration ? { days: 10 * duration.days } : { orbits: 10 * duration.orbits };
  return [
    { change: "as asked", scenario },
    { change: "limits 10 times tighter", scenario: { ...scenario, limits: scaled(scenario.limits, 0.1) } },
    { change: "limits 10 times looser", scenario: { ...scenario, limits: scaled(scenario.limits, 10) } },
    { change: "duration 10 times longer", scenario: { ...scenario, duration: longer } },
    { change: `eccentricity ${ECCENTRICITY_STEP} higher`, scenario, eccentricityStep: ECCENTRICITY_STEP },
  ];
}

function scaled(limits: readonly ScenarioLimit[], factor: number): ScenarioLimit[] {
  return limits.map((limit) => {
    const key = LIMIT_KEYS.find((name) => limit[name] !== undefined) as LimitKey;
    return { ...limit, [key]: (limit[key] as number) * factor };
  });
}
