import { Decimal as DecimalBase } from "decimal.js";

/** Arithmetic of 60 digits: the outside measure of every accuracy claim here. */
export const Decimal: typeof DecimalBase = DecimalBase.clone({ precision: 60 });
export type Precise = DecimalBase;

export const two: Precise = new Decimal(2);
/** pi to 60 digits, from the library. */
export const precisePi: Precise = Decimal.acos(-1);
export const preciseTwoPi: Precise = precisePi.mul(2);

/** Digits enough for sums and products of doubles between 1e-100 and 1e100 to be exact. */
export const Exact: typeof DecimalBase = DecimalBase.clone({ precision: 700 });

/** The exact value of a double between 1e-100 and 1e100, for exact sums and products. */
export function exactly(x: number): Precise {
  if (!Number.isFinite(x)) throw new RangeError(`no exact value: ${x}`);
  let significand = x;
  let exponent = 0;
  while (!Number.isInteger(significand)) {
    significand *= 2;
    exponent -= 1;
  }
  return new Exact(BigInt(significand).toString()).mul(new Exact(2).pow(exponent));
}

/** The exact value of a double (the library itself would read its shortest decimal form). */
export function precise(x: number): Precise {
  if (!Number.isFinite(x)) throw new RangeError(`no exact value: ${x}`);
  let significand = x;
  let exponent = 0;
  while (!Number.isInteger(significand)) {
    significand *= 2;
    exponent -= 1;
  }
  return new Decimal(BigInt(significand).toString()).mul(two.pow(exponent));
}

/** The exact value of a pair of doubles. */
export function precisePair(pair: { readonly hi: number; readonly lo: number }): Precise {
  return precise(pair.hi).add(precise(pair.lo));
}

/** Unit in the last place of a double. */
export function ulp(x: number): number {
  const size = Math.abs(x);
  if (size < 2 ** -1022) return 2 ** -1074;
  const exponent = Math.floor(Math.log2(size));
  const power = 2 ** exponent;
  return (size < power ? power / 2 : size >= 2 * power ? 2 * power : power) * 2 ** -52;
}

/** Distance of a double from an exact value, in units of its last place. */
export function ulpsFrom(value: number, exact: Precise): number {
  return precise(value).sub(exact).div(ulp(exact.toNumber())).abs().toNumber();
}
