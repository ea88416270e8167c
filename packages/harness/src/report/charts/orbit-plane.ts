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
  const rows: Row[] = [
    ...track.exact.map((point, index) => ({ what: "exact", index, xKm: point.xKm, yKm: point.yKm })),
    ...track.numerical.map((point) => ({
      what: "numerical",
      index: point.step,
      xKm: point.xKm,
      yKm: point.yKm,
    })),
    ...bodyOutline(track.bodyRadiusKm ?? 0),
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
      encoding: { ...position, order: { field: "index", type: "quantitative" } },
    },
    {
      transform: [{ filter: "datum.what === 'numerical'" }],
      mark: { type: "circle", size: 16, opacity: 1, color: colour("stepper0") },
      encoding: {
        ...position,
        tooltip: [
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
    )} step marks of ${track.stepper} from the end of the run, the central body ${
      track.bodyRadiusKm === null
        ? "as a cross, its size not being given"
        : `as a disc of radius ${formatNumber(track.bodyRadiusKm, 5)} km`
    }. Closest to the centre ${formatNumber(Math.min(...track.exact.map(radius)), 4)} km, farthest ${formatNumber(
      Math.max(...track.exact.map(radius)),
      4,
    )} km.${turn === null ? "" : ` Between neighbouring steps the body turns by at most ${formatNumber(turn.degrees, 2)}° as seen from the centre.`}`,
    note: `Line: exact. Marks: every step of ${track.stepper}. Disc: the central body.`,
    height: HEIGHT,
    rows,
    layers,
  });
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
