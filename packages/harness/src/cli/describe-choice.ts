import { join } from "node:path";
import type {
  BodyErrors,
  Choice,
  CurrentChoice,
  HandOver,
  LimitError,
  RankedStepper,
} from "../choose/choice.ts";
import { plain, scientific } from "../text/numbers.ts";
import { table } from "./table.ts";

const UNIT: Readonly<Record<string, string>> = {
  alongTrackKm: "km",
  radialKm: "km",
  positionKm: "km",
  timingSeconds: "s",
  semiMajorAxisM: "m",
  apsisDeg: "deg",
  phaseRad: "rad",
  energyRelative: "relative",
};

/** The choice on a terminal: the answer first, then today's choice, the limits, the ranking, the rest. */
export function describeChoice(choice: Choice, folder: string | null): string {
  const winner = choice.ranking.find(({ stepper }) => stepper === choice.choice) ?? null;
  const parts = [`${choice.scenario.title}`, "", ...answer(choice, winner)];
  if (choice.current !== null) parts.push("", ...currentLines(choice.current, winner));
  parts.push("", choice.explanation);
  if (winner !== null) parts.push("", limitsTable(winner));
  if (choice.ranking.length > 0) parts.push("", rankingTable(choice.ranking));
  if (choice.excluded.length > 0) {
    parts.push("", "Excluded:", ...choice.excluded.map(({ stepper, reason }) => `  ${stepper}: ${reason}`));
  }
  parts.push(
    "",
    "If the case changes (screened with the cheapest candidates, extrapolated):",
    sensitivityTable(choice),
  );
  if (choice.handOver !== null) parts.push("", handOverText(choice.handOver));
  if (choice.bodies !== null) parts.push("", bodiesText(choice.bodies));
  const projected = projectedTime(choice, winner);
  if (projected !== null) parts.push("", projected);
  parts.push("", "Cautions:", ...choice.cautions.map((line) => `  - ${line}`));
  const { cellsRun, seconds } = choice.provenance;
  parts.push(
    "",
    `${cellsRun} runs in ${seconds.total.toFixed(1)} s (screening ${seconds.screening.toFixed(1)}, search ${seconds.search.toFixed(1)}, verification ${seconds.verification.toFixed(1)}).`,
  );
  if (folder !== null) parts.push(`Report: ${join(folder, "report.html")}`);
  return `${parts.join("\n")}\n`;
}

function answer(choice: Choice, winner: RankedStepper | null): string[] {
  if (winner === null) {
    return [
      "No stepper qualifies. What would have to give:",
      ...choice.whatWouldHaveToGive.map((line) => `  - ${line}`),
    ];
  }
  const binding = winner.bindingLimit === null ? undefined : winner.errors[winner.bindingLimit];
  const lines = [
    `Use ${winner.stepper} with ${knobText(winner)}: ${plain(winner.evaluationsPerOrbit)} force evaluations per orbit.`,
    `Its worst error is ${plain(winner.margin, 3)} times smaller than its limit (${winner.bindingLimit}${binding === undefined ? "" : `; ${where(binding)}`}).`,
  ];
  if (winner.band !== null) {
    lines.push(`Verified in full over ${bandText(winner)} with ${winner.band.cellsRun} runs.`);
  }
  if (winner.cliff !== null) lines.push(cliffText(winner));
  const second = choice.ranking.find((entry) => entry !== winner);
  if (second !== undefined)
    lines.push(`Runner-up: ${second.stepper} with ${knobText(second)}, ${second.why}.`);
  return lines;
}

function where(error: LimitError): string {
  return `orbit ${error.orbit}, e = ${plain(error.eccentricity, 6)}, start at ${plain(error.startAnomalyDeg)} deg, after ${plain(error.atOrbit)} orbits`;
}

function knobText(entry: RankedStepper): string {
  if (entry.tolerance !== null) return `tolerance ${scientific(entry.tolerance)}`;
  if (entry.stepSeconds === null) return `${plain(entry.stepsPerOrbit ?? 0)} uneven steps per orbit`;
  return `a step of ${plain(entry.stepSeconds)} s (${plain(entry.stepsPerOrbit ?? 0)} steps per orbit)`;
}

function bandText({ band, stepSeconds, tolerance }: RankedStepper): string {
  if (band === null) return "";
  if (tolerance !== null) return `tolerances ${scientific(band.from)} to ${scientific(band.to)}`;
  return stepSeconds === null
    ? `${plain(band.from)} to ${plain(band.to)} steps per orbit`
    : `steps of ${plain(band.from)} to ${plain(band.to)} s`;
}

function cliffText({ cliff, stepsPerOrbit }: RankedStepper): string {
  if (cliff === null) return "";
  const knob =
    cliff.tolerance !== null
      ? `tolerance ${scientific(cliff.tolerance)}`
      : cliff.stepSeconds !== null
        ? `${plain(cliff.stepSeconds)} s`
        : `${plain((stepsPerOrbit ?? 0) / cliff.ratio)} steps per orbit`;
  return cliff.reason === "capped"
    ? `The limits still hold at ${knob}, the coarsest the scenario allows: no cliff within reach.`
    : `The cliff: every limit still holds at ${knob} (${plain(cliff.ratio, 3)} times the recommendation) and one fails beyond it.`;
}

function currentLines(current: CurrentChoice, winner: RankedStepper | null): string[] {
  const verdict = current.enough ? "Today's choice is enough" : "Today's choice is not enough";
  const lines = [`${verdict}: ${current.why}.`];
  if (winner !== null && current.costAgainstChoice !== null) {
    const ratio = current.costAgainstChoice;
    lines.push(
      ratio >= 1
        ? `Switching to ${winner.stepper} saves ${plain(100 * (1 - 1 / ratio), 3)} % of the force evaluations.`
        : `Switching to ${winner.stepper} costs ${plain(1 / ratio, 3)} times the force evaluations.`,
    );
  }
  return lines;
}

function limitsTable(entry: RankedStepper): string {
  const rows = Object.entries(entry.errors).map(([id, error]) => {
    const unit = UNIT[id.split("@")[0] as string] ?? "";
    const horizon = error.withinDays === null ? "" : ` in ${error.withinDays} d`;
    return [
      `${id.split("@")[0]}${horizon}`,
      unit,
      plain(error.limit),
      error.value === null ? "diverged" : plain(error.value, 3),
      plain(error.factor, 3),
      where(error),
    ];
  });
  return table(["limit", "unit", "allowed", "found", "factor", "worst case"], rows);
}

function rankingTable(ranking: readonly RankedStepper[]): string {
  const rows = ranking.map((entry, i) => [
    String(i + 1),
    entry.stepper,
    shortKnob(entry),
    plain(entry.evaluationsPerOrbit),
    entry.evaluationsTotal.toExponential(3).replace("e+", "e"),
    plain(entry.margin, 3),
    entry.evidence,
    entry.why,
  ]);
  return table(["rank", "stepper", "step", "eval/orbit", "eval total", "margin", "evidence", "why"], rows);
}

function sensitivityTable({ sensitivity }: Choice): string {
  const rows = sensitivity.map((entry) => [
    entry.change,
    entry.stepper ?? "none",
    entry.stepper === null ? "-" : shortKnob(entry),
    entry.evaluationsPerOrbit === null ? "-" : plain(entry.evaluationsPerOrbit),
  ]);
  return table(["change", "stepper", "step", "eval/orbit"], rows);
}

function shortKnob(entry: Pick<RankedStepper, "stepSeconds" | "stepsPerOrbit" | "tolerance">): string {
  if (entry.tolerance !== null) return `tol ${scientific(entry.tolerance)}`;
  if (entry.stepSeconds === null) return `${plain(entry.stepsPerOrbit ?? 0)} steps`;
  return `${plain(entry.stepSeconds)} s`;
}

function handOverText(test: HandOver): string {
  return [
    `Hand-over test: on the production code with the point mass alone, orbit ${test.orbit} (e = ${plain(test.eccentricity, 6)}) from ${plain(test.startAnomalyDeg)} deg for ${plain(test.days)} days,`,
    `runs with ${plain(test.stepSeconds)} s and ${plain(test.stepSeconds / 2)} s should part by ${plain(test.halfStepDifferenceKm, 3)} km at most, and a run forward and back should end ${plain(test.closureKm, 3)} km from its start. Then repeat with the full force model.`,
  ].join("\n");
}

function bodiesText({ massRatio, heavierShare, lighterShare }: BodyErrors): string {
  return `About the barycentre, at a mass ratio of ${massRatio}: position errors of the lighter body are ${plain(lighterShare, 4)} of those above, of the heavier ${plain(heavierShare, 4)}.`;
}

function projectedTime({ scenario }: Choice, winner: RankedStepper | null): string | null {
  const { evaluationMicroseconds } = scenario;
  if (evaluationMicroseconds === undefined || winner === null) return null;
  const seconds = (winner.evaluationsTotal * evaluationMicroseconds) / 1e6;
  return `At ${evaluationMicroseconds} microseconds a force evaluation the whole run takes ${plain(seconds, 3)} s of them.`;
}
