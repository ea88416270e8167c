import type { LaneCode } from "./lane-code.ts";
import type { Operand } from "./lane-layout.ts";

/** `power64` in lanes, for several exponents of one base at the cost of six square roots. */
export function writePowers(code: LaneCode, base: Operand, exponents: readonly number[]): Operand[] {
  const results = exponents.map((m) => (m >= 64 ? base : code.constant(1)));
  let root = base;
  for (let bit = 32; bit >= 1; bit >>= 1) {
    root = code.sqrt(root);
    exponents.forEach((m, i) => {
      if ((m & bit) !== 0) results[i] = code.mul(results[i]!, root);
    });
  }
  return results;
}
