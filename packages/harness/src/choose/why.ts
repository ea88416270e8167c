import { threeDigits } from "../text/numbers.ts";
import type { RankedStepper } from "./choice.ts";

/** Adds to every ranked stepper one line on why it wins or loses. */
export function explainRanking(ranking: readonly RankedStepper[]): RankedStepper[] {
  const winner = ranking.find(({ evidence }) => evidence === "run") ?? ranking[0];
  return winner === undefined ? [] : ranking.map((entry) => ({ ...entry, why: line(entry, winner) }));
}

function line(entry: RankedStepper, winner: RankedStepper): string {
  const bound = entry.bindingLimit === null ? "" : `, bound by ${entry.bindingLimit}`;
  if (entry === winner) {
    return entry.evidence === "run"
      ? `fewest force evaluations of those that hold every limit over their whole band${bound}`
      : `fewest force evaluations by extrapolation${bound}; nothing could be run in full within the budget`;
  }
  const times = threeDigits(entry.evaluationsTotal / winner.evaluationsTotal);
  const how = entry.evidence === "run" ? "" : " (extrapolated from short runs, not run in full)";
  return `costs ${times} times the choice${bound}${how}`;
}
