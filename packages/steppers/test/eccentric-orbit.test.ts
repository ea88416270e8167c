import { describe, expect, it } from "vitest";
import { distance, energy, periapsis, stateAfter, stepper } from "./support/runs.ts";

/** Angle of the eccentricity vector of a planar state. */
function apsis(s: ArrayLike<number>): number {
  const [x, y, vx, vy] = [s[0]!, s[1]!, s[2]!, s[3]!];
  const r = Math.sqrt(x * x + y * y);
  const l = x * vy - y * vx;
  return Math.atan2(-vx * l - y / r, vy * l - x / r);
}

interface Passage {
  readonly time: number;
  readonly apsis: number;
}

/** Periapsis passages of a run: q.v rises through zero; time and apsis by the parabola through three steps around it. */
function passages(id: string, e: number, stepsPerOrbit: number, orbits: number): Passage[] {
  const steps = Math.round(stepsPerOrbit * (orbits + 0.25));
  const h = (2 * Math.PI) / stepsPerOrbit;
  const rows = new Float64Array(4 * steps);
  stepper(id)
    .begin({ state: periapsis(e), step: h })
    .advance(steps, rows);
  const at = (n: number): Float64Array => rows.subarray(4 * n, 4 * n + 4);
  const radial = (n: number): number => at(n)[0]! * at(n)[2]! + at(n)[1]! * at(n)[3]!;
  const found: Passage[] = [];
  for (let n = 5; n + 5 < steps; n += 1) {
    if (!(radial(n) < 0 && radial(n + 1) >= 0)) continue;
    // Inverse interpolation of the step number, then of the apsis, through seven steps: error far below h^6.
    const nodes = Array.from({ length: 8 }, (_, k) => n - 3 + k);
    const where = neville(nodes.map(radial), nodes, 0);
    found.push({
      time: (where + 1) * h,
      apsis: neville(
        nodes,
        nodes.map((m) => apsis(at(m))),
        where,
      ),
    });
  }
  return found;
}

function neville(xs: readonly number[], ys: readonly number[], x: number): number {
  const p = [...ys];
  for (let k = 1; k < xs.length; k += 1) {
    for (let i = 0; i + k < xs.length; i += 1) {
      p[i] = ((x - xs[i + k]!) * p[i]! + (xs[i]! - x) * p[i + 1]!) / (xs[i]! - xs[i + k]!);
    }
  }
  return p[0]!;
}

/** Precession per orbit and relative change of the period, between the first and the fifth passage. */
function secular(id: string, e: number, stepsPerOrbit: number): { precession: number; period: number } {
  const found = passages(id, e, stepsPerOrbit, 5);
  const [first, last] = [found[0]!, found[4]!];
  return {
    precession: (last.apsis - first.apsis) / 4,
    period: (last.time - first.time) / (8 * Math.PI) - 1,
  };
}

/** Leading constants: value / h^p for two step sizes, the next term (relative h^2) removed. */
function leading(
  id: string,
  e: number,
  order: number,
  stepsPerOrbit: number,
): { precession: number; period: number } {
  const [coarse, fine] = [stepsPerOrbit, 2 * stepsPerOrbit].map((n) => {
    const h = (2 * Math.PI) / n;
    const { precession, period } = secular(id, e, n);
    return { precession: precession / h ** order, period: period / h ** order };
  });
  return {
    precession: (4 * fine!.precession - coarse!.precession) / 3,
    period: (4 * fine!.period - coarse!.period) / 3,
  };
}

describe("leapfrogs: closed forms from the modified Hamiltonian (technique: Hairer, Lubich & Wanner 2006, ch. IX)", () => {
  const cases = ["leapfrog", "velocity-verlet"].flatMap((id) => [0.1, 0.3, 0.6].map((e) => [id, e] as const));
  it.each(cases)("%s, e = %d: precession, period and energy", (id, e) => {
    const kdk = id === "velocity-verlet";
    const eta2 = 1 - e * e;
    const h2 = (r: number): number =>
      kdk
        ? 1 / (6 * r ** 3) - 3 / (8 * r ** 4) + eta2 / (4 * r ** 5)
        : -1 / (12 * r ** 3) + 1 / (4 * r ** 4) - eta2 / (8 * r ** 5);
    const measured = leading(id, e, 2, 600);
    const precession = (-Math.PI / 8) * ((4 + e * e) / eta2 ** 3);
    const period = 3 * h2(1 - e) - 1 / (24 * eta2 ** 1.5);
    // What is left is of relative size (h / (1-e)^(3/2))^4 times a constant: below 1e-4 for e = 0.6 at 600 steps.
    expect(Math.abs(measured.precession / precession - 1)).toBeLessThan(1e-4);
    expect(Math.abs(measured.period / period - 1)).toBeLessThan(1e-4);

    const h = (2 * Math.PI) / 2000;
    const rows = new Float64Array(4 * 1000);
    stepper(id)
      .begin({ state: periapsis(e), step: h })
      .advance(1000, rows);
    for (const n of [200, 500, 999]) {
      const state = rows.subarray(4 * n, 4 * n + 4);
      const r = Math.sqrt(state[0]! ** 2 + state[1]! ** 2);
      const predicted = -h * h * (h2(r) - h2(1 - e));
      expect(Math.abs((energy(state) + 0.5) / predicted - 1)).toBeLessThan(20 * (h / (1 - e) ** 1.5) ** 2);
    }
  });
});

/** Precession and period constants at e = 0.2 (measured at 45 digits, printed to the digits that two extrapolations share). */
const constants: readonly (readonly [string, number, number, number, number])[] = [
  ["velocity-verlet", 2, -1.7931951, 0.38294832, 300],
  ["mclachlan-atela-2", 2, -0.8702, 0.14141, 300],
  ["forest-ruth-4-kdk", 4, 18.5306, 0.5491633, 300],
  ["calvo-sanz-serna-4", 4, -0.1559, -0.00237, 150],
  ["mclachlan-4-five", 4, -0.073315852, 0.0056632997, 120],
  ["blanes-moan-4", 4, -0.02357331, -0.0012216935, 100],
  ["blanes-moan-6", 6, -0.02946634, -0.001526126, 40],
  ["forest-ruth-4", 4, -8.39555, 0.292494, 300],
  ["suzuki-4", 4, -0.11800698, 0.0032401996, 150],
  ["yoshida-6", 6, -1.49746, -0.027106, 80],
  ["kahan-li-6", 6, -0.0712061, -0.00134824, 50],
];

describe("leading constants of symplectic methods at e = 0.2", () => {
  it.each(constants)("%s", (id, order, precession, period, stepsPerOrbit) => {
    const measured = leading(id, 0.2, order, stepsPerOrbit);
    // One extrapolation leaves the h^4 correction; doubles leave 1e-13 in an angle, 1e-3 of the smallest constant here.
    expect(Math.abs(measured.precession / precession - 1)).toBeLessThan(0.02);
    expect(Math.abs(measured.period / period - 1)).toBeLessThan(0.02);
  });
});

describe("leapfrog and velocity Verlet", () => {
  const h = 0.05;
  const steps = 100;
  const start = periapsis(0.4);
  const drift = ([x, y, vx, vy]: number[]): number[] => [x! + (h / 2) * vx!, y! + (h / 2) * vy!, vx!, vy!];
  const kick = ([x, y, vx, vy]: number[]): number[] => {
    const w = h / 2 / (x! * x! + y! * y!) ** 1.5;
    return [x!, y!, vx! - w * x!, vy! - w * y!];
  };
  it("are one method seen half a drift and half a kick apart", () => {
    const leapfrog = stateAfter("leapfrog", steps, { state: start, step: h });
    const moved = Float64Array.from(kick(drift([...start])));
    const verlet = stateAfter("velocity-verlet", steps - 1, { state: moved, step: h });
    // The same steps with differently rounded operations: some ulps a step, growing with time.
    expect(distance(drift(kick([...verlet])), leapfrog)).toBeLessThan(1e-15 * steps ** 2);
  });
  it("are not the same: their errors differ at the order of the method", () => {
    const ends = ["leapfrog", "velocity-verlet"].map((id) =>
      stateAfter(id, steps, { state: start, step: h }),
    );
    expect(distance(ends[0]!, ends[1]!)).toBeGreaterThan(h * h);
  });
});
