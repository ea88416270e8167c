/** Fractional bits kept: 1024 for the exponent of the argument, 192 for the result. */
const bits = 1216n;
/** Fractional bits handed on as two doubles. */
const kept = 160n;
let piScaled: bigint | undefined;

/** arctan(1/n) 2^scale by its series, each term rounded down: a few hundred units of error. */
function inverseArctangent(n: bigint, scale: bigint): bigint {
  let power = (1n << scale) / n;
  let sum = power;
  for (let k = 3n; power !== 0n; k += 2n) {
    power = -power / (n * n);
    sum += power / k;
  }
  return sum;
}

/** pi 2^bits, by Machin's formula pi = 16 arctan(1/5) - 4 arctan(1/239) with 32 guard bits; computed once, when first needed. */
function scaledPi(): bigint {
  if (piScaled === undefined) {
    const guarded = bits + 32n;
    piScaled = (16n * inverseArctangent(5n, guarded) - 4n * inverseArctangent(239n, guarded)) >> 32n;
  }
  return piScaled;
}

/**
 * Remainder of a finite x >= 1 after the nearest multiple of (pi/2) quarters, in integers: the exact remainder rounded to
 * 2^-160, as out[0] + out[1]. Returns the multiple modulo 4. Some microseconds: for arguments too large for words of pi.
 */
export function reduceExactly(x: number, quarters: number, out: Float64Array): number {
  let significand = x;
  let fraction = 0n;
  while (!Number.isInteger(significand)) {
    significand *= 2;
    fraction += 1n;
  }
  const scaled = BigInt(significand) << (bits - fraction);
  const unit = (scaledPi() * BigInt(quarters)) >> 1n;
  const count = (2n * scaled + unit) / (2n * unit);
  const rest = (scaled - count * unit) >> (bits - kept);
  const scale = 2 ** -Number(kept);
  const hi = Number(rest);
  out[0] = hi * scale;
  out[1] = Number(rest - BigInt(hi)) * scale;
  return Number(count % 4n);
}
