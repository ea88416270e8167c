import { plain, threeDigits } from "../text/numbers.ts";
import type { ChoiceContext } from "./candidate.ts";
import type { RankedStepper } from "./choice.ts";
import { describeKnob } from "./ranked.ts";

/** One paragraph in plain words: why this stepper wins, what limits it, what to watch for, and what the result does not show. */
export function explain(
  { designFactor, scenario }: ChoiceContext,
  winner: RankedStepper | null,
  ranking: readonly RankedStepper[],
): string {
  if (winner === null)
    return "No stepper holds every limit as asked; the list of what would have to give says how near the best came.";
  const sentences: string[] = [];
  const second = ranking.find((entry) => entry !== winner);
  const lead =
    second === undefined
      ? "no other candidate holds the limits"
      : `the next, ${second.stepper}, needs ${threeDigits(second.evaluationsTotal / winner.evaluationsTotal)} times as many`;
  sentences.push(
    `${winner.stepper} with ${describeKnob(winner)} holds every limit divided by the design factor ${designFactor} with the fewest force evaluations (${plain(winner.evaluationsPerOrbit)} per orbit); ${lead}.`,
  );
  const binding = winner.bindingLimit === null ? undefined : winner.errors[winner.bindingLimit];
  if (binding !== undefined) {
    sentences.push(
      `${winner.bindingLimit} binds: its worst value, ${threeDigits(winner.margin)} times below the limit, is met on orbit ${binding.orbit} at eccentricity ${plain(binding.eccentricity, 5)} from a start at ${plain(binding.startAnomalyDeg)} degrees.`,
    );
  }
  const { cliff } = winner;
  if (cliff?.reason === "capped") {
    sentences.push(
      winner.stepSeconds !== null && scenario.step?.maxSeconds !== undefined
        ? "The step is held by the cap of the scenario and not by an error, so the margin is room to spare."
        : "No limit broke up to the coarsest setting tried.",
    );
  } else if (cliff !== null) {
    sentences.push(
      `${cliff.ratio < 1.2 ? "Watch out, the cliff is near: the" : "The"} ${winner.tolerance === null ? "step" : "tolerance"} can grow by a factor of ${threeDigits(cliff.ratio)}, and a limit breaks beyond.`,
    );
  }
  sentences.push(
    winner.symplectic
      ? "Being symplectic it keeps the energy error bounded, so a longer duration costs it less than its rivals."
      : "Its energy error grows with time, so a longer duration asks for a finer step.",
    "None of this shows how the production force model, manoeuvres or the production code's own rounding behave: repeat the hand-over test there.",
  );
  return sentences.join(" ");
}
