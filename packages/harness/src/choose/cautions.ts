import type { ChoiceContext } from "./candidate.ts";
import type { RankedStepper } from "./choice.ts";
import { corners } from "./fleet.ts";

/** Below this many steps per orbit times the periapsis rate, symplectic steppers of high order meet step resonances. */
const RESONANCE_FACTOR = 22;
const FEW_STEPS = 30;

/** What holds for every result: shown with each. */
const ALWAYS: readonly string[] = [
  "The scores hold for the two-body problem. Perturbations, close encounters, discontinuous forces and the production code's own rounding can dominate: verify the choice on the production force model.",
  "By itself this result qualifies nothing for flight safety, conjunction assessment or any other decision in which people can be hurt: applicable standards, local codes and licensed practice decide.",
];

/** Cautions of this result, the particular ones first. */
export function cautionsOf(
  { fleet, scenario }: ChoiceContext,
  winner: RankedStepper | null,
  ranking: readonly RankedStepper[],
  beyondBudget: readonly string[],
): string[] {
  const lines: string[] = [];
  if (winner?.evidence === "extrapolated") {
    lines.push(
      "The choice itself is EXTRAPOLATED: its errors come from runs of at most 60 orbits, carried on by their growth law. Give more time (--minutes) to run it in full before relying on it.",
    );
  } else if (beyondBudget.length > 0) {
    lines.push(
      `Not run in full because the budget was spent (--minutes): ${beyondBudget.slice(0, 5).join(", ")}${beyondBudget.length > 5 ? ` and ${beyondBudget.length - 5} more` : ""}.`,
    );
  }
  const ends = corners(fleet);
  const eccentricity = Math.max(...ends.map((point) => point.eccentricity));
  if (winner?.stepsPerOrbit != null) {
    const rate = Math.sqrt((1 + eccentricity) / (1 - eccentricity) ** 3);
    if (winner.symplectic && winner.stepsPerOrbit < RESONANCE_FACTOR * rate) {
      lines.push(
        `${winner.stepper} takes ${winner.stepsPerOrbit.toPrecision(4)} steps per orbit, fewer than 22 times the periapsis rate (${(RESONANCE_FACTOR * rate).toPrecision(3)}): step resonances are possible at whole numbers of steps per orbit. Whole and nearly whole numbers near it were run.`,
      );
    }
    if (winner.stepsPerOrbit < FEW_STEPS) {
      lines.push(
        `With ${winner.stepsPerOrbit.toPrecision(3)} steps per orbit the orbit is seen at that many points only; errors between steps are not scored.`,
      );
    }
    if (winner.cliff?.reason === "capped") {
      lines.push(
        "The step is held back by the scenario's cap, not by an error limit; the cliff lies beyond it and was not searched.",
      );
    }
  }
  if (winner?.stepper === "logarithmic-leapfrog") {
    lines.push(
      "logarithmic-leapfrog follows the two-body path exactly and errs in time only: energy and apsis limits say nothing about it here, and perturbed motion will not flatter it so.",
    );
  }
  if (winner?.tolerance != null && scenario.step?.multipleOfSeconds !== undefined) {
    lines.push(
      "A variable-step stepper does not step on the grid of the scenario; output on the grid needs interpolation.",
    );
  }
  if (winner?.floor != null)
    lines.push(
      "Steps much finer than the recommended one break a limit by rounding: the qualifying steps form an interval with two ends.",
    );
  if (ends.some((point) => point.eccentricity === 0) && eccentricity > 0) {
    lines.push(
      "Timing counts returns of the polar angle at eccentricity 0 and periapsis passages above it: it jumps between the two.",
    );
  }
  if (ranking.some(({ evidence }) => evidence === "extrapolated")) {
    lines.push(
      "Steppers marked extrapolated were screened with runs of at most 60 orbits and carried on by their growth law; they were not run in full.",
    );
  }
  return [...lines, ...ALWAYS];
}
