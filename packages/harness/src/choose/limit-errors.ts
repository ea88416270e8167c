import type { LimitErrors } from "./choice.ts";
import { daysToSeconds, orbitsOf } from "./fleet.ts";
import type { Limit } from "./limits.ts";
import type { Reading } from "./measure.ts";
import { scoreCommand } from "./reproduce.ts";
import type { ScreenedLimit } from "./screen.ts";

/** For each limit its own worst reading, with the command that measures it again. */
export function limitErrors(limits: readonly Limit[], readings: readonly Reading[]): LimitErrors {
  return Object.fromEntries(
    limits.map((limit, i) => {
      const reading = readings.reduce((a, b) =>
        (b.limits[i]?.value ?? 0) > (a.limits[i]?.value ?? 0) ? b : a,
      );
      const { value, atOrbit } = reading.limits[i] as { value: number; atOrbit: number };
      return [limit.id, entry(limit, reading, value, atOrbit)];
    }),
  );
}

/** The same from a screening, whose values are extrapolated from the short runs named. */
export function screenedErrors(worst: readonly ScreenedLimit[]): LimitErrors {
  return Object.fromEntries(
    worst.map(({ limit, value, reading, uncertaintyFactor }) => [
      limit.id,
      {
        ...entry(limit, reading, value, Math.min(reading.cell.orbits, horizonOrbits(limit, reading))),
        uncertaintyFactor,
      },
    ]),
  );
}

function horizonOrbits({ withinDays }: Limit, { sample }: Reading): number {
  return withinDays === null ? Number.POSITIVE_INFINITY : orbitsOf(sample.point, daysToSeconds(withinDays));
}

function entry(limit: Limit, { sample, cell }: Reading, value: number, atOrbit: number): LimitErrors[string] {
  const { point, startAnomalyDeg } = sample;
  const horizon = limit.withinDays === null ? null : orbitsOf(point, daysToSeconds(limit.withinDays));
  return {
    value: Number.isFinite(value) ? value : null,
    limit: limit.limit,
    factor: value === 0 ? Number.MAX_VALUE : limit.limit / value,
    orbit: point.orbit,
    eccentricity: point.eccentricity,
    startAnomalyDeg,
    atOrbit,
    withinDays: limit.withinDays,
    uncertaintyFactor: 1,
    command: scoreCommand(cell, horizon === null || horizon >= cell.orbits ? null : horizon),
  };
}

/** Smallest factor over the limits, and which limit that is. */
export function margin(errors: LimitErrors): {
  readonly margin: number;
  readonly bindingLimit: string | null;
} {
  const [id, error] = Object.entries(errors).reduce<readonly [string | null, { readonly factor: number }]>(
    (a, b) => (b[1].factor < a[1].factor ? b : a),
    [null, { factor: Number.POSITIVE_INFINITY }],
  );
  return { margin: error.factor, bindingLimit: id };
}
