import { threeDigits } from "../text/numbers.ts";
import type { ChoiceContext } from "./candidate.ts";
import type { ExcludedStepper } from "./choice.ts";
import type { Tried } from "./choose-stepper.ts";
import { describeKnob } from "./ranked.ts";

/** Where nothing qualifies: the smallest changes to the scenario, as far as the runs tell, that would let something qualify. */
export function whatWouldHaveToGive(
  { designFactor, scenario }: ChoiceContext,
  tried: readonly Tried[],
  excluded: readonly ExcludedStepper[],
): string[] {
  const lines: string[] = [];
  const overCap = excluded.filter(({ limit, value }) => limit === "evaluationsPerOrbit" && value !== null);
  const cheapest = overCap.reduce<ExcludedStepper | null>(
    (a, b) => (a === null || (b.value as number) < (a.value as number) ? b : a),
    null,
  );
  if (cheapest !== null) {
    lines.push(
      `the cap of ${cheapest.allowed} force evaluations per orbit: ${cheapest.stepper} would hold every limit with about ${cheapest.value}`,
    );
  }
  const nearest = tried
    .flatMap(({ candidate, screening }) => screening.tried.map((at) => ({ candidate, at })))
    .filter(
      ({ at }) =>
        Number.isFinite(at.ratio) &&
        at.evaluationsPerOrbit <= (scenario.require?.evaluationsPerOrbit ?? Number.POSITIVE_INFINITY),
    )
    .toSorted((a, b) => a.at.ratio - b.at.ratio)[0];
  if (nearest !== undefined && nearest.at.ratio * designFactor > 1) {
    const { candidate, at } = nearest;
    const binding = at.worst.reduce((a, b) => (b.value / b.limit.limit > a.value / a.limit.limit ? b : a));
    const needed = binding.value * designFactor;
    lines.push(
      `the limit ${binding.limit.id}: ${candidate.stepper.id} with ${describeKnob(candidate.knob.physical(at.fineness))} would need ${threeDigits(needed)} instead of ${binding.limit.limit} (extrapolated from short runs, design factor ${designFactor} included)`,
    );
  }
  const properties = Object.entries(scenario.require ?? {}).filter(([, value]) => value === true);
  if (properties.length > 0) {
    const count = excluded.filter(
      ({ limit, value }) => value === null && properties.some(([name]) => name === limit),
    ).length;
    if (count > 0)
      lines.push(
        `the required properties (${properties.map(([name]) => name).join(", ")}): they excluded ${count} steppers unseen`,
      );
  }
  if (lines.length === 0) lines.push("the limits: no stepper came within reach of them at any step tried");
  return lines;
}
