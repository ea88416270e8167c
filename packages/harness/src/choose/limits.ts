import type { ScenarioLimit } from "../scenario/scenario.ts";
import { angleFloor, energyFloor } from "../score/growth.ts";
import type { HorizonMaxima, MeasureName, Score } from "../score/score.ts";
import { LIMIT_KEYS, type LimitKey } from "./choice.ts";
import { daysToSeconds, type FleetPoint, orbitsOf } from "./fleet.ts";

/** One limit of the scenario, ready to be held against scores. */
export interface Limit {
  /** `alongTrackKm`, or `alongTrackKm@7` with a horizon of seven days. */
  readonly id: string;
  readonly key: LimitKey;
  readonly limit: number;
  readonly withinDays: number | null;
}

/** Which measure each limit reads, and how its normalised maximum becomes the physical value. */
const PHYSICAL: Readonly<
  Record<
    LimitKey,
    { readonly measure: MeasureName; readonly convert: (max: number, point: FleetPoint) => number }
  >
> = {
  alongTrackKm: { measure: "alongTrack", convert: (max, point) => max * point.semiMajorAxisKm },
  radialKm: { measure: "radial", convert: (max, point) => max * point.semiMajorAxisKm },
  positionKm: { measure: "position", convert: (max, point) => max * point.semiMajorAxisKm },
  timingSeconds: { measure: "timing", convert: (max, point) => max * point.periodSeconds },
  // a = a0/(1 - dE/|E0|) exactly; the positive sign of the energy error is the worse of the two.
  semiMajorAxisM: {
    measure: "energy",
    convert: (max, point) => 1000 * point.semiMajorAxisKm * (max / (1 - max)),
  },
  apsisDeg: { measure: "apsis", convert: (max) => (max * 180) / Math.PI },
  phaseRad: { measure: "phase", convert: (max) => max },
  energyRelative: { measure: "energy", convert: (max) => max },
};

/** The limits as held against runs: each reduced to the share of it that integration may use. */
export function limitsOf(limits: readonly ScenarioLimit[], integrationShare = 1): Limit[] {
  return limits.map((entry) => {
    const key = LIMIT_KEYS.find((name) => entry[name] !== undefined) as LimitKey;
    const withinDays = entry.withinDays ?? null;
    return {
      id: withinDays === null ? key : `${key}@${withinDays}`,
      key,
      limit: (entry[key] as number) * integrationShare,
      withinDays,
    };
  });
}

export function measuresOf(limits: readonly Limit[]): MeasureName[] {
  return [...new Set(limits.map(({ key }) => PHYSICAL[key].measure))];
}

/** A limit held against a score: the physical value (infinite where the run diverged or the measure is not defined) and when it was met. */
export interface LimitReading {
  readonly value: number;
  readonly atOrbit: number;
}

export function readLimit(limit: Limit, score: Score, point: FleetPoint): LimitReading {
  const { measure, convert } = PHYSICAL[limit.key];
  if (score.ended.status === "diverged")
    return { value: Number.POSITIVE_INFINITY, atOrbit: score.ended.atOrbit };
  const orbits = limit.withinDays === null ? null : orbitsOf(point, daysToSeconds(limit.withinDays));
  const horizon = orbits === null ? undefined : score.horizons?.find((entry) => entry.orbits === orbits);
  const { max, maxAtOrbit } = horizon?.maxima[measure] ?? score[measure];
  // A horizon shorter than one step has no error yet.
  if (max === null && horizon !== undefined && measure !== "timing") return { value: 0, atOrbit: 0 };
  // On a circular orbit there is no apsis to turn: that limit says nothing. Any other measure that is undefined cannot be shown to hold.
  if (max === null)
    return {
      value: measure === "apsis" && score.eccentricity === 0 ? 0 : Number.POSITIVE_INFINITY,
      atOrbit: 0,
    };
  const value = convert(max, point);
  return { value: value >= 0 ? value : Number.POSITIVE_INFINITY, atOrbit: maxAtOrbit ?? 0 };
}

/** Rounding floor of a limit at the end of a run, as `growth.ts` states it for each kind of measure. */
export function roundingFloor(
  limit: Limit,
  point: FleetPoint,
  orbits: number,
  evaluationsPerOrbit: number,
): number {
  const { measure, convert } = PHYSICAL[limit.key];
  if (measure === "energy") return convert(energyFloor(evaluationsPerOrbit)(orbits), point);
  const angle = angleFloor(evaluationsPerOrbit)(orbits);
  return convert(measure === "timing" ? angle / (2 * Math.PI) : angle, point);
}

/** Physical value of a limit from maxima kept at a horizon; 0 where the measure was not defined yet. */
export function readMaxima(limit: Limit, maxima: HorizonMaxima["maxima"], point: FleetPoint): number {
  const { measure, convert } = PHYSICAL[limit.key];
  const max = maxima[measure]?.max ?? null;
  return max === null ? 0 : convert(max, point);
}

/** Horizons of a point's run, in its own orbits, ascending and shorter than the run. */
export function horizonsOf(limits: readonly Limit[], point: FleetPoint, runOrbits: number): number[] {
  const orbits = limits.flatMap(({ withinDays }) =>
    withinDays === null ? [] : [orbitsOf(point, daysToSeconds(withinDays))],
  );
  return [...new Set(orbits)].filter((value) => value < runOrbits).sort((a, b) => a - b);
}
