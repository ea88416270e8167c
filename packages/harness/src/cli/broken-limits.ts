import type { Score } from "../score/score.ts";
import { scientific } from "../text/numbers.ts";
import { brokenLimits, type ScoreLimit } from "./options.ts";
import { EXIT, type Outcome } from "./run-command-line.ts";

/** Says on stderr which of the scores break a limit, and sets the exit code. */
export function judgeLimits(scores: readonly Score[], limits: readonly ScoreLimit[], outcome: Outcome): void {
  for (const score of scores) {
    for (const { limit, value } of brokenLimits(score, limits)) {
      outcome.exitCode = EXIT.exceeded;
      const found = value === null ? "not defined" : scientific(value);
      const end = score.ended.status === "diverged" ? " (the run diverged)" : "";
      process.stderr.write(
        `perigauge: ${score.stepper}, e = ${score.eccentricity}, ${knobOf(score)}: ${limit.measure}.${limit.summary} is ${found}, limit ${scientific(limit.limit)}${end}\n`,
      );
    }
  }
}

/** Step or tolerance of a score, in words. */
export function knobOf({ stepsPerOrbit, tolerance }: Score): string {
  return stepsPerOrbit === null ? `tolerance ${scientific(tolerance)}` : `${stepsPerOrbit} steps per orbit`;
}
