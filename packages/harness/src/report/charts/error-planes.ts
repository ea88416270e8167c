import { logAxis } from "../axes/log-axis.ts";
import type { Chart } from "../chart.ts";
import type { ChoiceEvidence, PlaneCell, SurveyPlane } from "../evidence.ts";
import { type ColourName, colour } from "../look/palette.ts";
import { formatNumber } from "../text/number.ts";
import { durationWords, plural } from "../text/words.ts";
import { type Layer, makeChart, type Row } from "./make-chart.ts";
import { nearestEccentricity, PLANE_TIPS, planeRows, stepsThatHold } from "./plane-rows.ts";
import { symplecticOf } from "./symplectic-of.ts";

const HEATS: readonly ColourName[] = ["heat0", "heat1", "heat2", "heat3", "heat4", "heat5"];

/** Where in the plane of eccentricity and steps per orbit do the limits hold? One heat map for each leading stepper, the limit as a contour. */
export function errorPlanes(evidence: ChoiceEvidence): Chart[] {
  const { plane } = evidence.survey;
  if (plane === undefined || plane.cells.length === 0) return [];
  const rows = planeRows(plane, symplecticOf(evidence));
  return plane.steppers.map((stepper, index) => {
    const cells = plane.cells.filter((cell) => cell.stepper === stepper);
    const contour = contourOf(plane, cells);
    return makeChart({
      name: `error-plane-${index + 1}`,
      section: "plane",
      title: findingOf(evidence, plane, stepper, contour),
      description: `Largest error of ${stepper} over its limit, for ${plural(plane.eccentricities.length, "eccentricity", "eccentricities")} (vertical) and ${plural(plane.stepsPerOrbit.length, "number")} of steps per orbit (horizontal, logarithmic): runs of ${plural(plane.orbits, "orbit")}, carried on to ${durationWords(
        evidence.choice.scenario,
      )} with the growth seen in them, at a semi-major axis of ${formatNumber(plane.semiMajorAxisKm, 4)} km. Steps per orbit from which every limit holds: ${contour
        .map(({ eccentricity, steps }) =>
          steps === null
            ? `none drawn at e = ${formatNumber(eccentricity)}`
            : `${formatNumber(steps, 2)} at e = ${formatNumber(eccentricity)}`,
        )
        .join(", ")}.`,
      note: "Figures: power of ten of error over limit, darker is more; × left the orbit. Red line: the limit, which holds to its right.",
      height: 250,
      rows,
      transform: [{ filter: { field: "stepper", equal: stepper } }],
      layers: layersOf(plane, contour),
    });
  });
}

interface ContourPoint {
  readonly eccentricity: number;
  readonly steps: number | null;
}

function contourOf(plane: SurveyPlane, cells: readonly PlaneCell[]): ContourPoint[] {
  return plane.eccentricities.map((eccentricity) => ({
    eccentricity,
    steps: stepsThatHold(cells.filter((cell) => cell.eccentricity === eccentricity)),
  }));
}

function layersOf(plane: SurveyPlane, contour: readonly ContourPoint[]): Layer[] {
  const { stepsPerOrbit, eccentricities } = plane;
  // Half a cell's width in ratio, half its height in eccentricity: the grid is even in both.
  const half = Math.sqrt((stepsPerOrbit[1] ?? 2) / (stepsPerOrbit[0] ?? 1));
  const rise = ((eccentricities[1] ?? 0.1) - (eccentricities[0] ?? 0)) / 2;
  const across = { ...logAxis([...stepsPerOrbit, (stepsPerOrbit.at(-1) ?? 1) * half], 0) };
  const domainX: [number, number] = [(stepsPerOrbit[0] ?? 1) / half, (stepsPerOrbit.at(-1) ?? 1) * half];
  const domainY: [number, number] = [(eccentricities[0] ?? 0) - rise, (eccentricities.at(-1) ?? 1) + rise];
  const scaleX = { type: "log" as const, domain: domainX, nice: false as const };
  const scaleY = { type: "linear" as const, domain: domainY, nice: false as const, zero: false };
  const x = {
    field: "steps",
    type: "quantitative" as const,
    scale: scaleX,
    title: "steps per orbit",
    axis: { grid: false, values: across.values, labelExpr: across.labelExpr },
  };
  const y = {
    field: "eccentricity",
    type: "quantitative" as const,
    scale: scaleY,
    title: "eccentricity",
    axis: { grid: false, values: [...eccentricities], format: ".1f" },
  };
  const tooltip = PLANE_TIPS.map(({ field, title, format }) =>
    format === undefined
      ? { field, title, type: "nominal" as const }
      : { field, title, type: "quantitative" as const, format },
  );
  // Two decades a shade; the border between the third and the fourth is the limit.
  const shade = "datum.ended === 'diverged' ? 5 : clamp(floor(log(datum.ratio) / LN10 / 2) + 3, 0, 5)";
  return [
    {
      transform: [
        { calculate: shade, as: "shade" },
        { calculate: `datum.steps / ${half}`, as: "left" },
        { calculate: `datum.steps * ${half}`, as: "right" },
        { calculate: `datum.eccentricity - ${rise}`, as: "low" },
        { calculate: `datum.eccentricity + ${rise}`, as: "high" },
      ],
      mark: { type: "rect", stroke: colour("paper"), strokeWidth: 1 },
      encoding: {
        x: { ...x, field: "left" },
        x2: { field: "right" },
        y: { ...y, field: "low" },
        y2: { field: "high" },
        color: {
          field: "shade",
          type: "ordinal",
          scale: { domain: [0, 1, 2, 3, 4, 5], range: HEATS.map(colour) },
          legend: null,
        },
        tooltip,
      },
    },
    {
      data: { values: contourRows(contour, domainX, rise) },
      transform: [],
      mark: { type: "line", color: colour("limit"), strokeWidth: 2.4, interpolate: "linear", clip: true },
      encoding: { x, y, order: { field: "eccentricity", type: "quantitative" } },
    },
    {
      transform: [
        {
          calculate:
            "datum.ended === 'diverged' ? '×' : datum.ratio > 0 ? replace(format(floor(log(datum.ratio) / LN10), 'd'), '-', '−') : '0'",
          as: "power",
        },
      ],
      mark: { type: "text", fontSize: 9, color: colour("ink") },
      encoding: { x, y, text: { field: "power", type: "nominal" } },
    },
  ];
}

/** Where no step of the grid holds, the contour runs along the edge; it reaches to the borders of the first and the last row. */
function contourRows(
  contour: readonly ContourPoint[],
  domain: readonly [number, number],
  rise: number,
): Row[] {
  const rows = contour.map(({ eccentricity, steps }) => ({ eccentricity, steps: steps ?? domain[1] }));
  const [first, last] = [rows[0], rows.at(-1)];
  if (first === undefined || last === undefined) return [];
  return [
    { ...first, eccentricity: first.eccentricity - rise },
    ...rows,
    { ...last, eccentricity: last.eccentricity + rise },
  ];
}

function findingOf(
  evidence: ChoiceEvidence,
  plane: SurveyPlane,
  stepper: string,
  contour: readonly ContourPoint[],
): string {
  const wanted = nearestEccentricity(plane, evidence.survey.eccentricity);
  const near = contour.find(({ eccentricity }) => eccentricity === wanted);
  if (near === undefined) return stepper;
  const base =
    near.steps === null
      ? `${stepper} does not hold every limit at e = ${formatNumber(wanted)} with any number of steps drawn`
      : `${stepper} holds every limit from ${formatNumber(near.steps, 2)} steps per orbit on at e = ${formatNumber(wanted)}`;
  const farthest = contour.findLast(({ steps }) => steps !== null);
  if (farthest === undefined) return `${stepper} breaks a limit in every row drawn`;
  if (farthest.eccentricity === wanted || farthest.steps === null) return base;
  return `${base}, and from ${formatNumber(farthest.steps, 2)} at e = ${formatNumber(farthest.eccentricity)}`;
}
