import { twoProduct } from "../arithmetic/two-product.ts";
import { requireFinite } from "../errors.ts";
import { roughCubeRoot } from "./starter.ts";

/** Above this B + B^3/3 is B^3/3 to the last bit, and its square would overflow before long. */
const cubicOnly = 1e100;

/**
 * Parabolic anomaly B = tan(nu/2) of Barker's equation B + B^3/3 = W, W = 2 sqrt(GM/p^3) t with t the time since periapsis and p
 * the semi-latus rectum; any finite W, odd in W to the bit.
 * The real root by Cardano's formula without cancellation, then two Newton steps, the last with its residual in double-double.
 * Error at most 1 ulp for |W| <= 1e300 (0.51 ulp measured against 40 digits).
 * Source: Battin, An Introduction to the Mathematics and Methods of Astrodynamics (1987), section 4.2.
 * @throws InvalidInputError for a W that is not finite
 */
export function solveBarker(w: number): number {
  requireFinite("solveBarker.w", w);
  const size = Math.abs(w);
  if (size < 1e-150) return w;
  const a = 1.5 * size;
  const root = size > cubicOnly ? roughCubeRoot(2 * a) : roughCubeRoot(a + Math.sqrt(a * a + 1));
  // root - 1/root = 2 a/(root^2 + 1 + 1/root^2), as root^3 - 1/root^3 = 2 a.
  const square = root * root;
  const first = (2 * a) / (square + 1 + 1 / square);
  const second = newtonStep(first, (first * first * first) / 3 + first - size);
  const third = newtonStep(second, (second * second * second) / 3 + second - size);
  const p = twoProduct(third, third);
  const q = twoProduct(p.hi, third);
  const cubeLow = q.lo + p.lo * third;
  // 3 (B - W) + B^3, with 3 (B - W) in two words.
  const d = third - size;
  const dt = d - third;
  const dLow = third - (d - dt) - (size + dt);
  const triple = twoProduct(3, d);
  const sum = triple.hi + q.hi;
  const st = sum - triple.hi;
  const sumLow = triple.hi - (sum - st) + (q.hi - st);
  const residual = (sum + (sumLow + (triple.lo + cubeLow + 3 * dLow))) / 3;
  const anomaly = newtonStep(third, residual);
  return w < 0 ? -anomaly : anomaly;
}

function newtonStep(b: number, residual: number): number {
  return b - residual / (1 + b * b);
}
