import type { Quantity } from "../axes/axis-channel.ts";
import { logAxis } from "../axes/log-axis.ts";
import type { Chart } from "../chart.ts";
import type { ChoiceEvidence, SurveyPlane } from "../evidence.ts";
import { colour } from "../look/palette.ts";
import type { Looks } from "../look/stepper-look.ts";
import { formatNumber } from "../text/number.ts";
import { durationWords, plural } from "../text/words.ts";
import { levelLayers } from "./level-layers.ts";
import { makeChart } from "./make-chart.ts";
import { nearestEccentricity, PLANE_TIPS, planeRows, stepsThatHold } from "./plane-rows.ts";
import { seriesLayers } from "./series-layers.ts";
import { symplecticOf } from "./symplectic-of.ts";

const LEAST_RATIO = 1e-6;
const MOST_RATIO = 1e6;

/** How many steps does each leading stepper need at an eccentricity that the reader sets with a slider? */
export function atOneEccentricity(evidence: ChoiceEvidence, looks: Looks): Chart | null {
  const { plane } = evidence.survey;
  if (plane === undefined || plane.cells.length === 0) return null;
  const drawn = plane.cells.flatMap(({ ratio }) =>
    ratio !== null && ratio >= LEAST_RATIO && ratio <= MOST_RATIO ? [ratio] : [],
  );
  const x: Quantity = { field: "steps", title: "steps per orbit", axis: logAxis(plane.stepsPerOrbit, 0.05) };
  const y: Quantity = {
    field: "ratio",
    title: "largest error over its limit",
    axis: logAxis([...drawn, 1]),
  };
  const limit = levelLayers(y, 1, "limit", { dash: [1, 0], side: "above" });
  const [low = 0, next = 0.1] = plane.eccentricities;
  const start = nearestEccentricity(plane, evidence.survey.eccentricity);
  return makeChart({
    name: "error-at-one-eccentricity",
    section: "plane",
    title: findingOf(evidence, plane),
    description: `Largest error over its limit (vertical, logarithmic) against steps per orbit (horizontal, logarithmic) for ${plural(plane.steppers.length, "stepper")} at one eccentricity: ${formatNumber(
      start,
    )}, the nearest of the grid to the scenario's largest, or in the page the one that its slider is set to. Runs of ${plural(plane.orbits, "orbit")}, carried on to ${durationWords(
      evidence.choice.scenario,
    )} with the growth seen in them.`,
    note: "Below the line every limit holds. Crosses: runs that left the orbit.",
    height: 280,
    rows: planeRows(plane, symplecticOf(evidence)),
    params: [
      {
        name: "eccentricity",
        value: start,
        bind: {
          input: "range",
          min: low,
          max: plane.eccentricities.at(-1) ?? low,
          step: Number((next - low).toPrecision(6)),
          name: "eccentricity",
        },
      },
    ],
    transform: [{ filter: "abs(datum.eccentricity - eccentricity) < 1e-6" }],
    layers: [
      ...limit.line,
      ...seriesLayers(x, y, { highlighted: looks.highlighted, muted: mutedHere(plane, looks) }, PLANE_TIPS, {
        clip: true,
      }),
      ...limit.words,
      {
        data: { values: [{}] },
        mark: {
          type: "text",
          align: "right",
          baseline: "top",
          dx: -4,
          dy: 4,
          fontSize: 12,
          color: colour("ink"),
        },
        encoding: {
          x: { value: "width" },
          y: { value: 0 },
          text: { value: { expr: "'e = ' + format(eccentricity, '.1f')" } },
        },
      },
    ],
  });
}

function mutedHere(plane: SurveyPlane, { muted }: Looks): string[] {
  return muted.filter((stepper) => plane.steppers.includes(stepper));
}

function findingOf(evidence: ChoiceEvidence, plane: SurveyPlane): string {
  const subject = plane.steppers.includes(evidence.choice.choice ?? "")
    ? evidence.choice.choice
    : plane.steppers[0];
  const found = plane.eccentricities.flatMap((eccentricity) => {
    const steps = stepsThatHold(
      plane.cells.filter((cell) => cell.stepper === subject && cell.eccentricity === eccentricity),
    );
    return steps === null ? [] : [{ eccentricity, steps }];
  });
  const [first, last] = [found[0], found.at(-1)];
  if (first === undefined || last === undefined || first === last)
    return `Error over its limit at one eccentricity, for ${plural(plane.steppers.length, "leading stepper")}`;
  return `${subject} needs ${formatNumber(first.steps, 2)} steps per orbit at e = ${formatNumber(first.eccentricity)} and ${formatNumber(last.steps, 2)} at e = ${formatNumber(last.eccentricity)}`;
}
