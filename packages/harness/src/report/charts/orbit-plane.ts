import type { Chart } from "../chart.ts";
import type { ChoiceEvidence, OrbitTrack } from "../evidence.ts";
import { colour } from "../look/palette.ts";
import { formatCount, formatNumber } from "../text/number.ts";
import { type Layer, makeChart, type Row } from "./make-chart.ts";

const HEIGHT = 400;
const OUTLINE_POINTS = 96;

/** Is the orbit resolved where it bends most? Exact and numerical orbit in their plane, to scale, with a mark at every step. */
export function orbitPlane(evidence: ChoiceEvidence): Chart | null {
  const { track } = evidence;
  if (track.exact.length < 2) return null;
  const { massRatio } = evidence.choice.scenario;
  const bodies = bodiesOf(massRatio);
  const rows: Row[] = [
    ...bodies.flatMap(({ body, share }) => [
      ...track.exact.map(({ xKm, yKm }, index) => ({
        what: "exact",
        body,
        index,
        xKm: share * xKm,
        yKm: share * yKm,
      })),
      ...track.numerical.map(({ xKm, yKm, step }) => ({
        what: "numerical",
        body,
        index: step,
        xKm: share * xKm,
        yKm: share * yKm,
      })),
    ]),
    // About the barycentre the central body moves: it has an orbit of its own instead of a disc.
    ...bodyOutline(massRatio === undefined ? (track.bodyRadiusKm ?? 0) : 0),
  ];
  const extent = extentOf(rows);
  // One length for a kilometre on both axes, whatever the width the page gives: whichever side is short of room decides.
  const kmPerPixel = `max(${extent.width} / width, ${extent.height} / height)`;
  const axis = (
    centre: number,
    size: "width" | "height",
  ): {
    type: "linear";
    nice: false;
    zero: false;
    domainMin: { expr: string };
    domainMax: { expr: string };
  } => ({
    type: "linear",
    nice: false,
    zero: false,
    domainMin: { expr: `${centre} - ${size} / 2 * ${kmPerPixel}` },
    domainMax: { expr: `${centre} + ${size} / 2 * ${kmPerPixel}` },
  });
  const position = {
    x: {
      field: "xKm",
      type: "quantitative" as const,
      scale: axis(extent.x, "width"),
      title: "x, thousand km (periapsis to the right)",
      axis: { tickCount: 5, labelExpr: "format(datum.value / 1000, '~g')", grid: false },
    },
    y: {
      field: "yKm",
      type: "quantitative" as const,
      scale: axis(extent.y, "height"),
      title: "y, thousand km",
      axis: { tickCount: 5, labelExpr: "format(datum.value / 1000, '~g')", grid: false },
    },
  };
  const layers: Layer[] = [
    {
      transform: [{ filter: "datum.what === 'body'" }],
      mark: {
        type: "line",
        filled: true,
        fill: colour("body"),
        stroke: colour("soft"),
        strokeWidth: 1,
        interpolate: "linear-closed",
      },
      encoding: { ...position, order: { field: "index", type: "quantitative" } },
    },
    {
      transform: [{ filter: "datum.what === 'exact'" }],
      mark: { type: "line", stroke: colour("soft"), strokeWidth: 1.4, interpolate: "linear-closed" },
      encoding: {
        ...position,
        detail: { field: "body", type: "nominal" },
        order: { field: "index", type: "quantitative" },
      },
    },
    {
      transform: [{ filter: "datum.what === 'numerical'" }],
      mark: { type: "point", filled: true, size: 16, opacity: 1 },
      encoding: {
        ...position,
        color: {
          condition: { test: "datum.body === 'heavier body'", value: colour("stepper1") },
          value: colour("stepper0"),
        },
        shape: {
          condition: { test: "datum.body === 'heavier body'", value: "square" },
          value: "circle",
        },
        tooltip: [
          { field: "body", title: "body", type: "nominal" },
          { field: "index", title: "step", type: "quantitative", format: "d" },
          { field: "xKm", title: "x, km", type: "quantitative", format: ".5e" },
          { field: "yKm", title: "y, km", type: "quantitative", format: ".5e" },
        ],
      },
    },
    {
      data: { values: [{ xKm: 0, yKm: 0 }] },
      mark: { type: "point", shape: "cross", size: 40, color: colour("ink"), filled: true, opacity: 1 },
      encoding: position,
    },
  ];
  const turn = largestTurnDeg(track);
  return makeChart({
    name: "orbit-in-the-plane",
    section: "orbit",
    title: titleOf(track, turn),
    description: `The orbit "${track.orbit}" (eccentricity ${formatNumber(track.eccentricity)}) to scale: the exact orbit as a line, ${formatCount(
      track.numerical.length,
    )} step marks of ${track.stepper} over one period from periapsis, ${centreWords(track, massRatio)}. Closest to the ${massRatio === undefined ? "centre" : "other body"} ${formatNumber(Math.min(...track.exact.map(radius)), 4)} km, farthest ${formatNumber(
      Math.max(...track.exact.map(radius)),
      4,
    )} km.${turn === null ? "" : ` Between neighbouring steps the body turns by at most ${formatNumber(turn.degrees, 2)}° as seen from the centre.`}`,
    note:
      massRatio === undefined
        ? `Line: exact. Marks: every step of ${track.stepper}. Disc: the central body.`
        : `Lines: exact. Marks: every step of ${track.stepper}, discs the lighter body, squares the heavier. Cross: the barycentre.`,
    height: HEIGHT,
    rows,
    layers,
  });
}

interface Body {
  readonly body: string;
  /** Position about the barycentre over the relative position. */
  readonly share: number;
}

/** With a mass ratio q each body's own orbit: 1/(1 + q) of the relative one for the lighter, -q/(1 + q) for the heavier. */
function bodiesOf(massRatio: number | undefined): Body[] {
  if (massRatio === undefined) return [{ body: "", share: 1 }];
  return [
    { body: "lighter body", share: 1 / (1 + massRatio) },
    { body: "heavier body", share: -massRatio / (1 + massRatio) },
  ];
}

function centreWords({ bodyRadiusKm }: OrbitTrack, massRatio: number | undefined): string {
  if (massRatio !== undefined)
    return `for both bodies about their barycentre, a cross (mass ratio ${formatNumber(massRatio)})`;
  return bodyRadiusKm === null
    ? "the central body as a cross, its size not being given"
    : `the central body as a disc of radius ${formatNumber(bodyRadiusKm, 5)} km`;
}

interface Turn {
  readonly degrees: number;
  /** Distance from the centre at the middle of that step, km. */
  readonly radiusKm: number;
}

/** The largest angle about the centre between neighbouring steps. */
function largestTurnDeg(track: OrbitTrack): Turn | null {
  let largest: Turn | null = null;
  track.numerical.forEach((point, index) => {
    const before = track.numerical[index - 1];
    if (before === undefined) return;
    const cross = before.xKm * point.yKm - before.yKm * point.xKm;
    const dot = before.xKm * point.xKm + before.yKm * point.yKm;
    const degrees = (Math.abs(Math.atan2(cross, dot)) * 180) / Math.PI;
    if (largest === null || degrees > largest.degrees) {
      largest = { degrees, radiusKm: (radius(before) + radius(point)) / 2 };
    }
  });
  return largest;
}

function titleOf(track: OrbitTrack, turn: Turn | null): string {
  if (turn === null) return `The orbit "${track.orbit}" in its plane`;
  return `In one step ${track.stepper} turns at most ${formatNumber(turn.degrees, 2)}° about the centre, at ${formatNumber(turn.radiusKm, 3)} km from it`;
}

function bodyOutline(radiusKm: number): Row[] {
  if (radiusKm <= 0) return [];
  return Array.from({ length: OUTLINE_POINTS }, (_, index) => {
    const angle = (2 * Math.PI * index) / OUTLINE_POINTS;
    return { what: "body", index, xKm: radiusKm * Math.cos(angle), yKm: radiusKm * Math.sin(angle) };
  });
}

function extentOf(rows: readonly Row[]): { x: number; y: number; width: number; height: number } {
  const xs = rows.map((row) => Number(row.xKm));
  const ys = rows.map((row) => Number(row.yKm));
  const [left, right] = [Math.min(...xs), Math.max(...xs)];
  const [low, high] = [Math.min(...ys), Math.max(...ys)];
  const air = 1.08;
  return {
    x: (left + right) / 2,
    y: (low + high) / 2,
    width: (right - left) * air,
    height: (high - low) * air,
  };
}

function radius(point: { readonly xKm: number; readonly yKm: number }): number {
  return Math.sqrt(point.xKm * point.xKm + point.yKm * point.yKm);
}
