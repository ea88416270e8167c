import type { LinearAxis, Quantity } from "../axes/axis-channel.ts";
import { logAxis } from "../axes/log-axis.ts";
import type { Chart } from "../chart.ts";
import type { ChoiceEvidence, SurveyPoint } from "../evidence.ts";
import type { Looks } from "../look/stepper-look.ts";
import { formatCount, formatNumber, formatTimes } from "../text/number.ts";
import { plural } from "../text/words.ts";
import { fittedOrders, groundLayers, orderLabels, orderWords } from "./convergence-layers.ts";
import { makeChart, type Row } from "./make-chart.ts";
import { mutedNote } from "./muted-note.ts";
import { seriesLayers, type Tip } from "./series-layers.ts";

interface Measure {
  readonly field: "phase" | "energy" | "period";
  readonly words: string;
  readonly axisTitle: string;
  readonly unit: string;
}

const MEASURES: readonly Measure[] = [
  { field: "phase", words: "phase error", axisTitle: "largest phase error, rad", unit: " rad" },
  { field: "energy", words: "energy error", axisTitle: "largest energy error, relative", unit: "" },
  { field: "period", words: "period error", axisTitle: "largest period error, relative", unit: "" },
];

const TIPS: readonly Tip[] = [
  { field: "stepper", title: "stepper" },
  { field: "eccentricity", title: "eccentricity", format: ".4e" },
  { field: "steps", title: "steps per orbit", format: ".4e" },
  { field: "tolerance", title: "tolerance", format: ".3e" },
  { field: "evaluationsPerOrbit", title: "force evaluations per orbit", format: ".4e" },
  { field: "phase", title: "phase error, rad", format: ".3e" },
  { field: "energy", title: "energy error, relative", format: ".3e" },
  { field: "period", title: "period error, relative", format: ".3e" },
  { field: "ended", title: "ended" },
  { field: "command", title: "command" },
];

/** How does each error grow with eccentricity, at equal cost? One chart for each measure. */
export function againstEccentricity(evidence: ChoiceEvidence, looks: Looks): Chart[] {
  const { survey } = evidence;
  const points = survey.againstEccentricity;
  if (points.length === 0) return [];
  const rows = points.map(rowOf);
  const x: Quantity = {
    field: "eccentricity",
    title: "eccentricity",
    axis: linearAxis(points.map((point) => point.eccentricity)),
  };
  return MEASURES.filter((measure) => points.some((point) => positive(point, measure))).map((measure) =>
    makeChart({
      name: `${measure.field}-against-eccentricity`,
      section: "eccentricity",
      title: eccentricityFinding(evidence, measure),
      description: `Largest ${measure.words} (vertical, logarithmic) against eccentricity, over ${plural(survey.orbits, "orbit")} from ${startWords(
        survey.startAnomalyDeg,
      )}, ${costWords(evidence)}. ${endWords(points, measure)}${divergedWords(points)}`,
      note: mutedNote(looks),
      height: 300,
      rows,
      layers: seriesLayers(x, quantityOf(measure, points), looks, TIPS),
    }),
  );
}

/** How fast does each error fall with the step? One chart for each measure, at the largest eccentricity. */
export function againstSteps(evidence: ChoiceEvidence, looks: Looks): Chart[] {
  const { survey } = evidence;
  const points = survey.againstStep.filter((point) => stepsOf(point) !== null);
  if (points.length === 0) return [];
  const rows = points.map(rowOf);
  const x: Quantity = {
    field: "steps",
    title: "steps per orbit",
    axis: logAxis(points.map(stepsOf), 0.05),
  };
  const omitted = new Set(
    survey.againstStep.filter((point) => stepsOf(point) === null).map((point) => point.stepper),
  );
  return MEASURES.filter((measure) => points.some((point) => positive(point, measure))).map((measure) => {
    const y = quantityOf(measure, points);
    const orders = fittedOrders(survey, measure.field, looks, stepsOf);
    return makeChart({
      name: `${measure.field}-against-steps`,
      section: "step",
      title: stepFinding(evidence, points, measure),
      description: `Largest ${measure.words} (vertical, logarithmic) against steps per orbit (horizontal, logarithmic) at eccentricity ${formatNumber(
        survey.eccentricity,
      )}, over ${plural(survey.orbits, "orbit")} from ${startWords(survey.startAnomalyDeg)}. A straight line is a power law; where it bends level, rounding takes over. Shaded: what rounding alone would give at one evaluation a step.${orderWords(orders)}${
        omitted.size > 0
          ? ` Not drawn, having no fixed number of steps: ${omitted.size <= 4 ? [...omitted].join(", ") : plural(omitted.size, "variable-step stepper")}.`
          : ""
      }${divergedWords(points)}`,
      note: `Shaded: rounding floor. Dotted: reference slopes. ${mutedNote(looks)}`.trim(),
      height: 320,
      rows,
      layers: [
        ...groundLayers(measure.field, survey, orders, x, y),
        ...seriesLayers(x, y, looks, TIPS),
        ...orderLabels(orders),
      ],
    });
  });
}

function rowOf(point: SurveyPoint): Row {
  return {
    stepper: point.stepper,
    symplectic: point.symplectic,
    eccentricity: point.eccentricity,
    steps: stepsOf(point),
    tolerance: point.tolerance,
    evaluationsPerOrbit: point.evaluationsPerOrbit,
    phase: point.phase,
    energy: point.energy,
    period: point.period,
    ended: point.ended,
    command: point.command,
  };
}

function stepsOf(point: SurveyPoint): number | null {
  return point.stepsPerOrbit ?? point.meanStepsPerOrbit ?? null;
}

function quantityOf(measure: Measure, points: readonly SurveyPoint[]): Quantity {
  const values = points.filter((point) => point.ended === "completed").map((point) => point[measure.field]);
  // Room above the data for the crosses of runs that left the orbit.
  const top = points.some((point) => point.ended === "diverged")
    ? 6 * Math.max(...values.map((value) => value ?? 0))
    : null;
  return { field: measure.field, title: measure.axisTitle, axis: logAxis([...values, top]) };
}

function linearAxis(values: readonly number[]): LinearAxis {
  const low = Math.min(...values);
  const high = Math.max(...values);
  const air = 0.04 * Math.max(high - low, 0.01);
  const domain: [number, number] = [low - air, high + air];
  return { domain, scale: { type: "linear", domain, nice: false } };
}

function eccentricityFinding(evidence: ChoiceEvidence, measure: Measure): string {
  const points = evidence.survey.againstEccentricity.filter(
    (point) => positive(point, measure) && atEqualCost(point, evidence.survey.evaluationsPerOrbit),
  );
  // Where the scenario is hardest, not where the chart ends.
  const distance = (point: SurveyPoint): number =>
    Math.abs(point.eccentricity - evidence.survey.eccentricity);
  const nearest = [...points].sort((a, b) => distance(a) - distance(b))[0]?.eccentricity ?? 0;
  const there = points
    .filter((point) => point.eccentricity === nearest)
    .sort((a, b) => errorOf(a, measure) - errorOf(b, measure));
  const best = there[0];
  if (best === undefined) return `No run gave a ${measure.words}`;
  const base = `At equal cost and e = ${formatNumber(nearest)}, ${best.stepper} has the smallest ${measure.words}, ${formatNumber(errorOf(best, measure), 2)}${measure.unit}`;
  const subject = there.find((point) => point.stepper === evidence.choice.choice);
  if (subject !== undefined && subject !== best) {
    return `${base}; ${subject.stepper} has ${formatTimes(errorOf(subject, measure) / errorOf(best, measure))} times as much`;
  }
  const last = there.at(-1);
  return last === undefined || last === best
    ? base
    : `${base}; ${last.stepper} has the largest of those in orbit, ${formatNumber(errorOf(last, measure), 2)}${measure.unit}`;
}

function stepFinding(evidence: ChoiceEvidence, points: readonly SurveyPoint[], measure: Measure): string {
  const subject = evidence.choice.choice ?? evidence.choice.current?.stepper ?? points[0]?.stepper ?? "";
  const own = points
    .filter((point) => point.stepper === subject && positive(point, measure))
    .sort((a, b) => (stepsOf(a) ?? 0) - (stepsOf(b) ?? 0));
  // Pairs near the smallest error met say how rounding behaves, not the stepper.
  const floor = 30 * Math.min(...own.map((point) => errorOf(point, measure)));
  const factors = own.slice(1).flatMap((finer, index) => {
    const coarser = own[index] ?? finer;
    if (errorOf(finer, measure) < floor) return [];
    const doublings = Math.log2((stepsOf(finer) ?? 1) / (stepsOf(coarser) ?? 1));
    return [(errorOf(coarser, measure) / errorOf(finer, measure)) ** (1 / doublings)];
  });
  const middle = median(factors);
  if (middle === null)
    return `How the ${measure.words} falls as the step shrinks, at e = ${formatNumber(evidence.survey.eccentricity)}`;
  return middle >= 1
    ? `At e = ${formatNumber(evidence.survey.eccentricity)}, twice as many steps divide the ${measure.words} of ${subject} by ${formatTimes(middle)} (median above the rounding floor)`
    : `At e = ${formatNumber(evidence.survey.eccentricity)}, twice as many steps do not lessen the ${measure.words} of ${subject} (median factor ${formatNumber(1 / middle, 2)})`;
}

function endWords(points: readonly SurveyPoint[], measure: Measure): string {
  const known = points.filter((point) => positive(point, measure));
  const lowest = Math.min(...known.map((point) => point.eccentricity));
  const highest = Math.max(...known.map((point) => point.eccentricity));
  const range = (eccentricity: number): string => {
    const values = known
      .filter((point) => point.eccentricity === eccentricity)
      .map((point) => errorOf(point, measure));
    return `${formatNumber(Math.min(...values), 2)} to ${formatNumber(Math.max(...values), 2)}${measure.unit}`;
  };
  return `From best to worst stepper: ${range(lowest)} at e = ${formatNumber(lowest)}, ${range(highest)} at e = ${formatNumber(highest)}.`;
}

function divergedWords(points: readonly SurveyPoint[]): string {
  const diverged = points.filter((point) => point.ended === "diverged");
  if (diverged.length === 0) return "";
  const steppers = [...new Set(diverged.map((point) => point.stepper))];
  const named =
    steppers.length <= 4 ? `: ${steppers.join(", ")}` : ` of ${formatCount(steppers.length)} steppers`;
  return ` Crosses at the upper edge: ${plural(diverged.length, "run")} that did not stay in orbit${named}.`;
}

/** A comparison at equal cost takes steppers within a sixth of it; the others are drawn, not compared. */
const SAME_COST = 1.17;

function atEqualCost(point: SurveyPoint, evaluationsPerOrbit: number): boolean {
  const ratio = point.evaluationsPerOrbit / evaluationsPerOrbit;
  return ratio <= SAME_COST && ratio >= 1 / SAME_COST;
}

function costWords({ survey }: ChoiceEvidence): string {
  const base = `each stepper at about ${formatCount(survey.evaluationsPerOrbit)} force evaluations per orbit`;
  const others = survey.againstEccentricity
    .filter((point) => point.ended === "completed" && !atEqualCost(point, survey.evaluationsPerOrbit))
    .map((point) => point.evaluationsPerOrbit);
  if (others.length === 0) return base;
  return `${base}, but for variable-step ones and others that cannot be set to it, which took ${formatCount(Math.min(...others))} to ${formatCount(Math.max(...others))} and are left out of the finding`;
}

function startWords(startAnomalyDeg: number): string {
  if (startAnomalyDeg === 0) return "periapsis";
  return startAnomalyDeg === 180 ? "apoapsis" : `true anomaly ${formatNumber(startAnomalyDeg)}°`;
}

function positive(point: SurveyPoint, measure: Measure): boolean {
  const value = point[measure.field];
  return point.ended === "completed" && value !== null && value > 0;
}

function errorOf(point: SurveyPoint, measure: Measure): number {
  return point[measure.field] ?? Number.NaN;
}

function median(values: readonly number[]): number | null {
  const sorted = values.filter(Number.isFinite).sort((a, b) => a - b);
  const middle = sorted.length / 2;
  if (sorted.length === 0) return null;
  const upper = sorted[Math.floor(middle)] ?? 0;
  return Number.isInteger(middle) ? (upper + (sorted[middle - 1] ?? upper)) / 2 : upper;
}
