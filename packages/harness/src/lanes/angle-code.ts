import { arctangentNodes, pi } from "@perigauge/kepler";
import type { LaneCode, Operand, Pointer } from "@perigauge/steppers";
import { NODES_AT } from "./memory-map.ts";

const SPLITTER = 134217729;
const NODES = 32;
const TWO_PI = 2 * Math.PI;

/** Puts the table that `writeAngle` reads into memory. */
export function fillNodes(doubles: Float64Array): void {
  doubles.set(arctangentNodes, NODES_AT / 8);
}

/** `angleOf` (score/angle-difference.ts) in lanes, operation for operation. `nodes`: two pointers of its own. */
export function writeAngle(
  code: LaneCode,
  cross: Operand,
  dot: Operand,
  nodes: readonly [Pointer, Pointer],
): Operand & { readonly local: number } {
  const c = (value: number): Operand => code.constant(value);
  const positive = code.greater(dot, c(0));
  const below = code.lessEqual(cross, code.mul(c(0.0625), dot));
  const above = code.greaterEqual(cross, code.mul(c(-0.0625), dot));
  const small = code.and(code.and(positive, below), above);
  const t = code.div(cross, dot);
  const s = code.mul(t, t);
  let tail = code.sub(c(1 / 11), code.mul(s, c(1 / 13)));
  for (const term of [1 / 9, 1 / 7, 1 / 5, 1 / 3]) tail = code.sub(c(term), code.mul(s, tail));
  const angle = code.variable(code.sub(t, code.mul(code.mul(t, s), tail)));
  const rest = code.not(small);
  code.when(code.anyTrue(rest), () => {
    code.assign(angle, code.select(small, angle, writeArctangent(code, cross, dot, nodes)));
  });
  return angle;
}

/** `arctangent2` of the reference package in lanes. */
function writeArctangent(
  code: LaneCode,
  y: Operand,
  x: Operand,
  [first, second]: readonly [Pointer, Pointer],
): Operand {
  const c = (value: number): Operand => code.constant(value);
  const ax = code.abs(x);
  const ay = code.abs(y);
  const steep = code.greater(ay, ax);
  const big = code.select(steep, ay, ax);
  const small = code.select(steep, ax, ay);
  const k = code.floor(code.add(code.mul(code.div(small, big), c(NODES)), c(0.5)));
  const valid = code.lessEqual(k, c(NODES));
  // The number of the node from the last bits of 2^52 + k.
  const node = code.and(valid, k);
  const index = code.shiftLeft(code.add(node, c(2 ** 52)), 4);
  code.extract(first, index, 0);
  code.extract(second, index, 1);
  const [a, b] = [code.load(first, NODES_AT), code.load(second, NODES_AT)];
  const t = code.mul(node, c(1 / NODES));
  const scaled = code.mul(c(SPLITTER), big);
  const upper = code.sub(scaled, code.sub(scaled, big));
  const numerator = code.sub(code.sub(small, code.mul(t, upper)), code.mul(t, code.sub(big, upper)));
  const d = code.div(numerator, code.add(big, code.mul(t, small)));
  const z = code.mul(d, d);
  let tail = code.sub(c(1 / 9), code.mul(z, c(1 / 11)));
  for (const term of [-1 / 7, 1 / 5, -1 / 3]) tail = code.add(c(term), code.mul(z, tail));
  const series = code.mul(code.mul(d, z), tail);
  let hi = code.lows(a, b);
  let lo = code.add(code.highs(a, b), series);
  let rest = d;
  const reflect = (about: { readonly hi: number; readonly lo: number }, mask: Operand): void => {
    const turned = code.sub(c(about.hi), hi);
    const low = code.add(code.sub(code.sub(c(about.hi), turned), hi), code.sub(c(about.lo), lo));
    lo = code.select(mask, low, lo);
    hi = code.select(mask, turned, hi);
    rest = code.select(mask, code.negate(rest), rest);
  };
  reflect({ hi: 0.5 * pi.hi, lo: 0.5 * pi.lo }, steep);
  reflect(pi, code.less(x, c(0)));
  const sum = code.add(hi, rest);
  const angle = code.add(sum, code.add(code.add(code.sub(hi, sum), rest), lo));
  const signed = code.select(code.less(y, c(0)), code.negate(angle), angle);
  const atOrigin = code.equal(big, c(0));
  return code.select(atOrigin, c(0), code.select(valid, signed, c(Number.NaN)));
}

/** `nearestTurn` in lanes: changes `angle` in place. */
export function writeNearestTurn(
  code: LaneCode,
  angle: Operand & { readonly local: number },
  previous: Operand,
): void {
  const c = (value: number): Operand => code.constant(value);
  const difference = code.variable(code.sub(previous, angle));
  const near = code.and(code.greater(difference, c(-Math.PI)), code.lessEqual(difference, c(Math.PI)));
  const far = code.not(near);
  code.when(code.anyTrue(far), () => {
    const turns = code.floor(code.add(code.div(difference, c(TWO_PI)), c(0.5)));
    code.assign(angle, code.select(near, angle, code.add(angle, code.mul(c(TWO_PI), turns))));
  });
}
