import { propagate, stateAtTrueAnomalyDegrees } from "@perigauge/kepler";
import { catalogue, type Stepper } from "@perigauge/steppers";
import { describe, expect, it } from "vitest";

/*
 * The five orbits of T.E. Hull, W.H. Enright, B.M. Fellen, A.E. Sedgwick, SIAM J. Numer. Anal. 9 (1972) 603, class D: x'' = -x/r^3 from
 * perihelion to t = 20, e = 0.1 to 0.9. End states from Kepler's equation at 40 digits, here to double precision;
 * the sixteen digits in circulation agree.
 */
const problems: readonly (readonly [string, number, readonly [number, number, number, number]])[] = [
  ["D1", 0.1, [0.21988353520083967, 0.9427076846341813, -0.9787659841058176, 0.3287977990962036]],
  ["D2", 0.3, [-0.17770273571404116, 0.9467784719905893, -1.0302941631929696, 0.12110748900539521]],
  ["D3", 0.5, [-0.5780432953035362, 0.8633840009194192, -0.9595083730380727, -0.06504915126712091]],
  ["D4", 0.7, [-0.9538990293416394, 0.6907409024219432, -0.8212674270877434, -0.15395742591258246]],
  ["D5", 0.9, [-1.2952662509875743, 0.4003938963792322, -0.6775390924707566, -0.12708381542786862]],
];
const END = 20;
const ROWS = 4096;
const rows = new Float64Array(4 * ROWS);
const times = new Float64Array(2 * ROWS);

/** State at t = 20 after `steps` steps of equal h, or with a tolerance. Steps uneven in time stop short; the exact flow makes up the rest. */
function endState(method: Stepper, eccentricity: number, knob: number): readonly number[] {
  const { x, y, vx, vy } = stateAtTrueAnomalyDegrees(eccentricity, 0);
  const state = Float64Array.of(x, y, vx, vy);
  const trajectory =
    method.knob === "tolerance"
      ? method.begin({ state, step: 0, tolerance: knob, endTime: [END, 0] })
      : method.begin({ state, step: END / knob });
  let last = state;
  let time = 0;
  for (let left = method.knob === "step" && !method.uneven ? knob : Number.POSITIVE_INFINITY; left > 0; ) {
    const made = trajectory.advance(
      method.uneven && method.knob === "step" ? 1 : Math.min(ROWS, left),
      rows,
      times,
    );
    if (made === 0) break;
    if (method.uneven && times[2 * (made - 1)]! > END) break;
    last = rows.slice(4 * (made - 1), 4 * made);
    time = method.uneven ? times[2 * (made - 1)]! : END;
    left -= made;
  }
  const rest = propagate(
    { position: [...last.subarray(0, 2)], velocity: [...last.subarray(2)] },
    END - time,
    1,
  );
  return [...rest.position, ...rest.velocity];
}

/** Steps to t = 20 at the coarsest, per turn at the periapsis rate: fine enough for the asymptotic regime. */
function coarsest({ order, family }: Stepper): number {
  if (family === "multistep") return 24 * order;
  if (order === 1) return family === "symplectic-splitting" ? 3000 : 60_000;
  if (order <= 3) return order === 2 ? 300 : 160;
  return order <= 6 ? 40 + 280 / order : 40;
}

/** Rounding at t = 20, three times its root mean square of 2 u t sqrt(steps) along the track, times the speed-up at periapsis; each stage rounds. */
const floor = (rate: number, steps: number, stages: number | null): number =>
  6 * 2 ** -53 * END * Math.sqrt(steps * (stages ?? 10)) * rate;

describe("orbits of class D: end states converge to the published ones", () => {
  it.each(catalogue.map((method) => [method.id, method] as const))("%s", (_, method) => {
    for (const [name, e, published] of problems) {
      const error = (knob: number): number =>
        endState(method, e, knob).reduce(
          (most, value, i) => Math.max(most, Math.abs(value - published[i]!)),
          0,
        );
      const rate = Math.sqrt((1 + e) / (1 - e) ** 3);
      if (method.knob === "tolerance") {
        const [loose, tight] = [error(1e-6), error(1e-12)];
        // Six decades of tolerance must bring four of error, whatever power of the tolerance the controller makes of it.
        expect(tight, `${name}: ${loose} ${tight}`).toBeLessThan(
          Math.max(1e-4 * loose, floor(rate, 4000, method.stages)),
        );
        expect(tight).toBeLessThan(2e-8);
        continue;
      }
      const steps = Math.round(coarsest(method) * (method.uneven ? Math.min(2, rate) : rate));
      const errors = [error(steps), error(2 * steps), error(4 * steps)] as const;
      // Two halvings bring 2 p octaves where the error is a single power; over half of that is asked where it is still bending.
      const wanted = Math.max(errors[0] * 2 ** (-1.1 * method.order), floor(rate, 4 * steps, method.stages));
      expect(errors[2], `${name}: ${errors.join(" ")}`).toBeLessThan(wanted);
      expect(errors[2]).toBeLessThan(0.1);
    }
  });
});
