import {
  eccentricFromTrueAnomaly,
  elementsFromState,
  InvalidInputError,
  type Motion,
  meanFromEccentricAnomaly,
  propagate,
  trueFromEccentricAnomaly,
} from "@perigauge/kepler";
import fc from "fast-check";
import { describe, expect, test } from "vitest";

/** Half a unit of the last digit of each printed component. */
function expectPrinted(actual: readonly number[], printed: readonly number[], half: number): void {
  for (let k = 0; k < printed.length; k++)
    expect(Math.abs(actual[k]! - printed[k]!)).toBeLessThanOrEqual(half);
}

function length(vector: readonly number[]): number {
  return Math.sqrt(vector.reduce((sum, value) => sum + value * value, 0));
}

function distance(a: readonly number[], b: readonly number[]): number {
  return length(a.map((value, k) => value - b[k]!));
}

// Printed values are recalled, or quoted at second hand, from the sources named; each was recomputed at 40 digits from its inputs.
describe("published examples", () => {
  test("Vallado, example 2-4", () => {
    const start = { position: [1131.34, -2282.343, 6672.423], velocity: [-5.64305, 4.30333, 2.42879] };
    const end = propagate(start, 40 * 60, 398600.4415);
    expectPrinted(end.position, [-4219.7527, 4363.0292, -3958.7666], 0.6e-4);
    expectPrinted(end.velocity, [3.689866, -1.916735, -6.112511], 0.6e-6);
    // Computed at 40 digits from the decimal inputs; their rounding to doubles is worth 2400 s times 4e-16 km/s.
    expectPrinted(end.position, [-4219.752753707861, 4363.029188398585, -3958.7666051311962], 1e-11);
    expectPrinted(end.velocity, [3.6898660058408814, -1.9167347598047024, -6.112511105005843], 1e-14);
  });

  test("Curtis, example 3.7 (numbering of the first editions)", () => {
    const end = propagate({ position: [7000, -12124], velocity: [2.6679, 4.621] }, 3600, 398600);
    expectPrinted(end.position, [-3297.8, 7413.4], 0.05);
    expectPrinted(end.velocity, [-8.2976, -0.96404], 0.5e-4);
    // Computed at 40 digits.
    expectPrinted(end.position, [-3297.7686251992905, 7413.396645787403], 2e-11);
    expectPrinted(end.velocity, [-8.29760302426652, -0.9640449446737768], 2e-14);
  });

  test("Curtis, example 3.5: hyperbola, 100 degrees and three hours later", () => {
    const perigee = { position: [6678, 0, 0], velocity: [0, 15, 0] };
    const elements = elementsFromState(perigee, 398600);
    expect(Math.abs(elements.eccentricity - 2.7696)).toBeLessThan(0.6e-4);
    const later = propagate(perigee, 4141.44700349644, 398600);
    expect(Math.abs(length(later.position) - 48497)).toBeLessThan(0.6);
    const end = propagate(later, 3 * 3600, 398600);
    expect(Math.abs(length(end.position) - 163180)).toBeLessThan(0.6);
    expect(Math.abs(length(end.velocity) - 10.51)).toBeLessThan(0.6e-2);
    // Computed at 40 digits.
    expect(length(end.position)).toBeCloseTo(163180.53883637, 7);
    expect(length(end.velocity)).toBeCloseTo(10.5122941117125, 12);
  });

  test("Curtis, examples 3.1 and 3.2: time from perigee and back", () => {
    const e = (21000 - 9600) / (21000 + 9600);
    const period = 2 * Math.PI * Math.sqrt(15300 ** 3 / 398600);
    const anomaly = eccentricFromTrueAnomaly(e, (120 * Math.PI) / 180);
    const mean = meanFromEccentricAnomaly(e, anomaly);
    expect(
      [period, anomaly, mean, (mean / (2 * Math.PI)) * period].map((x) => Number(x.toPrecision(5))),
    ).toEqual([18834, 1.7281, 1.3601, 4077]);
    // Computed at 40 digits: true anomaly three hours after perigee.
    const start = { position: [9600, 0], velocity: [0, Math.sqrt((398600 / 9600) * (1 + e))] };
    const [x, y] = propagate(start, 3 * 3600, 398600).position as [number, number];
    expect((Math.atan2(y, x) * 180) / Math.PI + 360).toBeCloseTo(193.155734722415, 11);
    expect((trueFromEccentricAnomaly(e, 3.4794409957724977) * 180) / Math.PI).toBeCloseTo(
      193.155734722415,
      11,
    );
  });

  // Hull, Enright, Fellen & Sedgwick, SIAM J. Numer. Anal. 9 (1972) 603, class D: x'' = -x/r^3 from perihelion, t = 20; end values
  // computed at 40 digits.
  test.each([
    ["D1", 0.1, 0.21988353520083967, 0.9427076846341813, -0.9787659841058176, 0.3287977990962036],
    ["D2", 0.3, -0.17770273571404116, 0.9467784719905925, -1.0302941631929696, 0.12110748900539521],
    ["D3", 0.5, -0.5780432953035362, 0.8633840009194192, -0.9595083730380727, -0.06504915126712091],
    ["D4", 0.7, -0.9538990293416394, 0.6907409024219432, -0.8212674270877434, -0.15395742591258246],
    ["D5", 0.9, -1.2952662509875743, 0.4003938963792322, -0.6775390924707566, -0.12708381542786862],
  ])("Hull et al. 1972, %s", (_, e, x, y, vx, vy) => {
    const speed = Math.sqrt((1 + e) / (1 - e));
    const end = propagate({ position: [1 - e, 0], velocity: [0, speed] }, 20);
    // The start is rounded: half an ulp of speed and distance (1.5 with the roundings before) moves the energy by v dv + dr/r^2,
    // a by twice that, and the phase after t by 3/2 t da.
    const energy = 1.5 * 2 ** -52 * (speed * speed + 1 / (1 - e));
    const bound = 3 * 20 * energy + 2 ** -50;
    expectPrinted(end.position, [x, y], bound);
    expectPrinted(end.velocity, [vx, vy], bound);
  });
});

describe("properties", () => {
  // Subnormal numbers do not scale: they count as zero here.
  const component = fc.double({ min: -2, max: 2, noNaN: true }).map((x) => (Math.abs(x) < 1e-100 ? 0 : x));
  const state: fc.Arbitrary<Motion> = fc
    .tuple(component, component, component, component, component, component)
    .map(([a, b, c, d, e, f]) => ({ position: [a, b, c], velocity: [d, e, f] }))
    .filter(({ position, velocity }) => {
      const [x, y, z] = position as [number, number, number];
      const [u, v, w] = velocity as [number, number, number];
      const momentum = length([y * w - z * v, z * u - x * w, x * v - y * u]);
      return length(position) > 0.1 && momentum > 0.1;
    });
  const time = fc.double({ min: -30, max: 30, noNaN: true }).map((t) => (Math.abs(t) < 1e-100 ? 0 : t));

  /** What one rounding of a state costs after dt: it moves the energy by v dv + dr/r^2, so the phase by 3 n a dt dE, and positions at once. */
  function roundingCost(from: Motion, to: Motion, dt: number): number {
    const spread = Math.max(
      ...[from, to].map((s) => (length(s.velocity) + 1) ** 2 + 1 / length(s.position) ** 2),
    );
    return (
      2 ** -50 * spread * spread * (1 + Math.abs(dt)) ** 2 * (1 + length(to.position) + length(from.position))
    );
  }

  test("forward and back is the start", () => {
    fc.assert(
      fc.property(state, time, (start, dt) => {
        const end = propagate(start, dt);
        const back = propagate(end, -dt);
        const bound = roundingCost(start, end, dt);
        expect(distance(back.position, start.position)).toBeLessThanOrEqual(bound);
        expect(distance(back.velocity, start.velocity)).toBeLessThanOrEqual(bound);
      }),
      { seed: 41, numRuns: 200 },
    );
  });

  test("backward is forward with the velocity reversed, to the bit", () => {
    fc.assert(
      fc.property(state, time, (start, dt) => {
        const back = propagate(start, -dt);
        const mirrored = propagate({ position: start.position, velocity: start.velocity.map((v) => -v) }, dt);
        expect(mirrored.position.map((x) => x + 0)).toEqual(back.position.map((x) => x + 0));
        expect(mirrored.velocity.map((x) => 0 - x)).toEqual(back.velocity.map((x) => x + 0));
      }),
      { seed: 42, numRuns: 100 },
    );
  });

  test("two steps are one", () => {
    fc.assert(
      fc.property(
        state,
        fc.integer({ min: -20, max: 20 }),
        fc.integer({ min: -20, max: 20 }),
        (start, a, b) => {
          const middle = propagate(start, a / 4);
          const once = propagate(start, (a + b) / 4);
          const twice = propagate(middle, b / 4);
          const bound = Math.max(roundingCost(start, once, a / 4), roundingCost(middle, once, b / 4));
          expect(distance(once.position, twice.position)).toBeLessThanOrEqual(bound);
        },
      ),
      { seed: 43, numRuns: 150 },
    );
  });

  test("energy, angular momentum and eccentricity vector stay", () => {
    fc.assert(
      fc.property(state, time, (start, dt) => {
        const end = propagate(start, dt);
        const before = elementsFromState(start);
        const after = elementsFromState(end);
        const bound =
          2 ** -50 *
          Math.max(
            ...[start, end].map(
              (s) =>
                (length(s.velocity) + 1) ** 2 * (1 + 1 / length(s.position)) ** 2 * (1 + length(s.position)),
            ),
          );
        expect(Math.abs(after.energy - before.energy)).toBeLessThanOrEqual(bound);
        expect(Math.abs(after.angularMomentum - before.angularMomentum)).toBeLessThanOrEqual(bound);
        expect(distance(after.eccentricityVector, before.eccentricityVector)).toBeLessThanOrEqual(
          bound * (1 + before.angularMomentum),
        );
      }),
      { seed: 44, numRuns: 150 },
    );
  });

  test("the scaling law: lengths by 4, times by 8, speeds by 1/2, to the bit", () => {
    fc.assert(
      fc.property(state, time, (start, dt) => {
        const end = propagate(start, dt);
        const scaled = propagate(
          { position: start.position.map((x) => 4 * x), velocity: start.velocity.map((v) => v / 2) },
          8 * dt,
        );
        expect(scaled.position).toEqual(end.position.map((x) => 4 * x));
        expect(scaled.velocity).toEqual(end.velocity.map((v) => v / 2));
      }),
      { seed: 45, numRuns: 100 },
    );
  });

  test("GM enters as the square of a speed", () => {
    const start = { position: [1, 0.5, -0.3], velocity: [0.2, 0.9, 0.1] };
    const end = propagate(start, 7);
    const faster = propagate(
      { position: start.position, velocity: start.velocity.map((v) => 4 * v) },
      7 / 4,
      16,
    );
    expect(faster.position).toEqual(end.position);
  });
});

describe("across the parabola", () => {
  test("continuous in e to first order through e = 1", () => {
    const at = (e: number): readonly number[] =>
      propagate({ position: [1, 0], velocity: [0, Math.sqrt(1 + e)] }, 50).position;
    const parabola = at(1);
    const slope = distance(at(1 + 1e-4), at(1 - 1e-4)) / 2e-4;
    expect(slope).toBeGreaterThan(1);
    for (const d of [1e-5, 1e-6, 1e-8, 1e-10, 1e-12]) {
      const above = at(1 + d);
      const below = at(1 - d);
      // 1e-13: the speed sqrt(1 + e) is rounded, worth 2^-53 of it times the time and the slope.
      expect(Math.abs(distance(above, below) - 2 * d * slope)).toBeLessThan(1e-4 * d * slope + 1e-13);
      const middle = above.map((value, k) => 0.5 * (value + below[k]!));
      expect(distance(middle, parabola)).toBeLessThan(100 * slope * d * d + 1e-13);
    }
  });

  test("a parabola satisfies Barker's equation", () => {
    // p = 2, so W = 2 sqrt(1/8) t = t/sqrt 2; r = (1 + B^2), x = 1 - B^2, y = 2 B.
    const [x, y] = propagate({ position: [1, 0], velocity: [0, Math.SQRT2] }, 20).position as [
      number,
      number,
    ];
    const b = y / 2;
    expect(x).toBeCloseTo(1 - b * b, 12);
    expect(b + b ** 3 / 3).toBeCloseTo(20 / Math.SQRT2, 12);
  });

  test("whole revolutions are dropped exactly: a circle after 1e9", () => {
    const [x, y] = propagate({ position: [1, 0], velocity: [0, 1] }, 1e9 + 0.5).position as [number, number];
    // cos and sin of 1000000000.5, computed at 40 digits.
    expect(x).toBeCloseTo(0.47362388945091793, 15);
    expect(y).toBeCloseTo(0.8807272059732143, 15);
  });
});

describe("bad input", () => {
  const good = { position: [1, 0], velocity: [0, 1] };
  test.each([
    ["centre", { position: [0, 0], velocity: [0, 1] }, 1, "propagate.state.position: must be at a distance"],
    [
      "rectilinear",
      { position: [1, 0], velocity: [0.5, 0] },
      1,
      "propagate.state: must have an angular momentum",
    ],
    [
      "not a number",
      { position: [1, Number.NaN], velocity: [0, 1] },
      1,
      "propagate.state.position[1]: must be a finite number, got NaN",
    ],
    [
      "four components",
      { position: [1, 0, 0, 0], velocity: [0, 1, 0, 0] },
      1,
      "propagate.state: must have two or three components",
    ],
    ["infinite time", good, Number.POSITIVE_INFINITY, "propagate.dt: must be a finite number, got Infinity"],
  ])("%s", (_, state, dt, message) => {
    expect(() => propagate(state, dt)).toThrow(InvalidInputError);
    expect(() => propagate(state, dt)).toThrow(message);
  });
  test("gravitational parameter", () => {
    expect(() => propagate(good, 1, -1)).toThrow(
      "propagate.gravitationalParameter: must be finite and positive, got -1",
    );
  });
});
