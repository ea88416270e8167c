import { type Candidate, type ChoiceContext, makeCandidate } from "../../src/choose/candidate.ts";
import { buildFleet } from "../../src/choose/fleet.ts";
import { limitsOf } from "../../src/choose/limits.ts";
import { Measurer } from "../../src/choose/measure.ts";
import { CellPool } from "../../src/run/cell-pool.ts";
import { parseScenario } from "../../src/scenario/parse-scenario.ts";
import type { Scenario } from "../../src/scenario/scenario.ts";
import { stepper } from "../support.ts";

/** One orbit of 26,600 km about the Earth (gravitational parameter: IERS Conventions 2010, TN 36, Table 1.1), invented for these tests. */
export function scenarioOf(
  fields: Partial<Scenario> & Pick<Scenario, "limits">,
  eccentricity: number,
): Scenario {
  return parseScenario({
    format: "perigauge-scenario/1",
    title: "test orbit",
    gravitationalParameterKm3S2: 398600.4418,
    orbits: [{ name: "only", semiMajorAxisKm: 26600, eccentricity }],
    duration: { orbits: 100 },
    ...fields,
  });
}

/** The shared context of the search, in the calling thread. */
export function contextOf(scenario: Scenario): ChoiceContext {
  const fleet = buildFleet(scenario);
  const measurer = new Measurer(
    new CellPool({ workers: 1 }),
    limitsOf(scenario.limits),
    fleet.durationSeconds,
  );
  return { scenario, fleet, measurer, designFactor: scenario.designFactor ?? 2, seed: 1 };
}

export function candidateOf(context: ChoiceContext, id: string): Candidate {
  return makeCandidate(stepper(id), context);
}
