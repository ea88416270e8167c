import { describe, expect, it } from "vitest";
import { findStepper, type ProgramStepper } from "../src/index.ts";
import { force, type Pairs, pairs } from "./support/interpret-double-double.ts";
import { runExactly } from "./support/observed-order.ts";
import { stateAfter } from "./support/runs.ts";

/** Change of energy in one step from the circle of radius 1, in double-double arithmetic. */
function energyChange(id: string, steps: number): number {
  const { program } = findStepper(id) as ProgramStepper;
  const circle = pairs(4);
  circle.hi.set([1, 0, 0, 1]);
  const end = runExactly(program({ dimension: 2, summation: "plain", force }), circle, 1, 1 / steps);
  return energyAbove(end);
}

/** E + 1/2 of a state near the unit circle, without cancellation: r = 1 + dr, v2 = 1 + dv. */
function energyAbove({ hi, lo }: Pairs): number {
  const square = (k: number): bigint => exact(hi[k]!, lo[k]!) ** 2n / unit;
  const r2 = square(0) + square(1);
  const v2 = square(2) + square(3);
  return Number(v2 / 2n - (unit * unit) / root(r2 * unit) + unit / 2n) / 1e40;
}

const unit = 10n ** 40n;
const exact = (hi: number, lo: number): bigint => scaled(hi) + scaled(lo);
/** x 10^40, truncated: x is a whole number over a power of two. */
function scaled(x: number): bigint {
  let power = 0;
  let value = x;
  while (!Number.isInteger(value)) {
    value *= 2;
    power += 1;
  }
  return (BigInt(value) * unit) >> BigInt(power);
}
function root(n: bigint): bigint {
  let x = BigInt(Math.floor(Math.sqrt(Number(n))));
  for (let i = 0; i < 8; i += 1) x = (x + n / x) / 2n;
  return x;
}

/**
 * Secular energy change of one step on the unit circle, C h^q (computed at 60 to 150 digits; the fractions are exact). The next term is of
 * relative size h^2 times a constant of order one to some tens: h = 1/64 and 1/128, one Richardson step, leaves a thousandth or less.
 */
const constants: readonly (readonly [string, number, number])[] = [
  ["explicit-euler", 1, 2],
  ["explicit-midpoint", 1 / 16, 4],
  ["heun-2", 1 / 4, 4],
  ["ralston-2", 1 / 12, 4],
  ["heun-3", -7 / 432, 6],
  ["rk4", -1 / 72, 6],
  ["kutta-38", -1 / 24, 6],
  ["bogacki-shampine-3", 1 / 96, 4],
  ["cash-karp-5", -121 / 115200, 6],
  ["dormand-prince-5", 1 / 3600, 6],
  ["bogacki-shampine-5", 43 / 2257920, 6],
  ["tsitouras-5", 0.00028142659261, 6],
  ["verner-6-1978", 0.000393850488085, 8],
  ["verner-6-robust", 0.000116007091268, 8],
  ["dormand-prince-8", -1.6512702e-7, 10],
  ["nystrom-4", -1 / 288, 6],
  ["nystrom-5", 1 / 1800, 6],
  ["dormand-nystrom-4", -277 / 466560, 6],
  ["bettis-nystrom-5", 7 / 115200, 6],
  ["dormand-nystrom-6", -3.23019844914e-6, 8],
  ["dormand-nystrom-6-dense", 1.021112e-5, 8],
  ["dormand-nystrom-8", 2.4245384e-8, 10],
];

describe("leading secular energy change on the circle", () => {
  it.each(constants)("%s: %d h^%d", (id, constant, power) => {
    const [coarse, fine] = [64, 128].map((n) => energyChange(id, n) * n ** power);
    const extrapolated = (4 * fine! - coarse!) / 3;
    expect(Math.abs(extrapolated / constant - 1)).toBeLessThan(2e-3);
  });
});

describe("exact discrete circles of the two leapfrogs (derived: sin(theta/2) = h/2, and (h/2) cos(theta/2)^(3/2))", () => {
  it.each([
    ["velocity-verlet", Math.sqrt(1 - 0.01 / 4), 0.1 * (1 + 0.000417136115400293)],
    ["leapfrog", 0.9993767511279995, 0.1 * (1 - 0.00145378116261851)],
  ])("%s at h = 0.1", (id, speed, theta) => {
    const state = stateAfter(id, 50, { state: Float64Array.of(1, 0, 0, speed), step: 0.1 });
    // Fifty steps of rounding, each of a few ulps, on a stable circle; the angle collects them twice over.
    expect(Math.abs(Math.hypot(state[0]!, state[1]!) - 1)).toBeLessThan(5e-14);
    expect(Math.abs(Math.atan2(state[1]!, state[0]!) - wrapped(50 * theta))).toBeLessThan(1e-12);
  });
});

const wrapped = (angle: number): number => angle - 2 * Math.PI * Math.round(angle / (2 * Math.PI));
