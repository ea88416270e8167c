/** 0.00012345 -> "1.23e-4"; "-" where there is no value. */
export function scientific(value: number | null): string {
  if (value === null) return "-";
  if (value === 0) return "0";
  return value.toExponential(2).replace("e+", "e");
}

/** Up to so many significant digits, thousands grouped, no exponent: for seconds, kilometres and counts. */
export function plain(value: number, digits = 4): string {
  if (!Number.isFinite(value)) return "-";
  const size = Math.abs(value);
  if (size !== 0 && (size < 1e-3 || size >= 1e9)) return scientific(value);
  const decimals = size === 0 ? 0 : Math.max(0, digits - 1 - Math.floor(Math.log10(size)));
  return value.toLocaleString("en-US", { maximumFractionDigits: Math.min(decimals, 12) });
}

/** Three significant digits, in plain figures while they stay readable: 0.00321, 38.8, 5,240, 1.36e8. */
export function threeDigits(value: number): string {
  const size = Math.abs(value);
  return size !== 0 && (size < 1e-3 || size >= 1e6) ? scientific(value) : plain(value, 3);
}
