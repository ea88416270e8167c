import { type OrbitSampler, orbitSampler } from "../scenario/orbit-sampler.ts";
import type { Scenario } from "../scenario/scenario.ts";

/** One orbit of the fleet at one place of its ranges. */
export interface FleetPoint {
  readonly orbitIndex: number;
  readonly orbit: string;
  /** Free parameters in [0, 1]; 0 where there is none. */
  readonly parameters: readonly [first: number, second: number];
  readonly semiMajorAxisKm: number;
  readonly eccentricity: number;
  /** rad/s */
  readonly meanMotion: number;
  readonly periodSeconds: number;
}

export interface FleetOrbit {
  readonly name: string;
  readonly count: number;
  readonly sampler: OrbitSampler;
}

/** The scenario's orbits with what they share: duration and the shortest period, to which steps per orbit refer. */
export interface Fleet {
  readonly gravitationalParameterKm3S2: number;
  readonly orbits: readonly FleetOrbit[];
  readonly durationSeconds: number;
  readonly shortestPeriodSeconds: number;
  readonly longestPeriodSeconds: number;
}

const SECONDS_PER_DAY = 86400;

/** `eccentricityStep` is added to every eccentricity, at the same semi-major axis: for asking what if. */
export function buildFleet(scenario: Scenario, eccentricityStep = 0): Fleet {
  const orbits = scenario.orbits.map((orbit, i) => ({
    name: orbit.name,
    count: orbit.count ?? 1,
    sampler: shifted(orbitSampler(orbit, `scenario.orbits[${i}]`, scenario.bodyRadiusKm), eccentricityStep),
  }));
  const { gravitationalParameterKm3S2 } = scenario;
  const draft: Fleet = {
    gravitationalParameterKm3S2,
    orbits,
    durationSeconds: 0,
    shortestPeriodSeconds: 0,
    longestPeriodSeconds: 0,
  };
  const periods = corners(draft).map((point) => point.periodSeconds);
  const shortestPeriodSeconds = Math.min(...periods);
  const durationSeconds =
    "days" in scenario.duration
      ? scenario.duration.days * SECONDS_PER_DAY
      : scenario.duration.orbits * shortestPeriodSeconds;
  return { ...draft, durationSeconds, shortestPeriodSeconds, longestPeriodSeconds: Math.max(...periods) };
}

function shifted(sampler: OrbitSampler, eccentricityStep: number): OrbitSampler {
  if (eccentricityStep === 0) return sampler;
  return {
    ...sampler,
    at: (first, second) => {
      const { semiMajorAxisKm, eccentricity } = sampler.at(first, second);
      return { semiMajorAxisKm, eccentricity: eccentricity + eccentricityStep };
    },
  };
}

export function pointAt(fleet: Fleet, orbitIndex: number, first: number, second: number): FleetPoint {
  const orbit = fleet.orbits[orbitIndex] as FleetOrbit;
  const { semiMajorAxisKm, eccentricity } = orbit.sampler.at(first, second);
  const meanMotion = Math.sqrt(fleet.gravitationalParameterKm3S2 / semiMajorAxisKm) / semiMajorAxisKm;
  return {
    orbitIndex,
    orbit: orbit.name,
    parameters: [first, second],
    semiMajorAxisKm,
    eccentricity,
    meanMotion,
    periodSeconds: (2 * Math.PI) / meanMotion,
  };
}

/** Ends of every range: one, two or four points an orbit. */
export function corners(fleet: Fleet): FleetPoint[] {
  return grid(fleet, [0, 1], [0, 1]);
}

/** Nine places of every range, ends included: nine along one free parameter, three by three over two. */
export function nineEach(fleet: Fleet): FleetPoint[] {
  const ninths = Array.from({ length: 9 }, (_, i) => i / 8);
  return grid(fleet, ninths, [0, 0.5, 1]);
}

function grid(fleet: Fleet, alongOne: readonly number[], alongTwo: readonly number[]): FleetPoint[] {
  return fleet.orbits.flatMap(({ sampler }, index) => {
    if (sampler.parameters === 0) return [pointAt(fleet, index, 0, 0)];
    if (sampler.parameters === 1) return alongOne.map((first) => pointAt(fleet, index, first, 0));
    return alongTwo.flatMap((first) => alongTwo.map((second) => pointAt(fleet, index, first, second)));
  });
}

/** Run length of a point in orbits of its own. */
export function orbitsOf(point: FleetPoint, seconds: number): number {
  return (seconds * point.meanMotion) / (2 * Math.PI);
}

export function daysToSeconds(days: number): number {
  return days * SECONDS_PER_DAY;
}
