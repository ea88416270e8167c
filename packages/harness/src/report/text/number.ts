/** Keeps a number and what belongs to it on one line. */
export const NO_BREAK = "\u00a0";
const SUPERSCRIPTS = "⁰¹²³⁴⁵⁶⁷⁸⁹";
/** Groups digits without letting a line break fall between them. */
const GROUP = "\u202f";

/** An integer as raised digits: -12 gives `⁻¹²`. */
export function superscript(exponent: number): string {
  const digits = String(Math.abs(exponent)).replace(/\d/g, (digit) => SUPERSCRIPTS[Number(digit)] ?? digit);
  return exponent < 0 ? `⁻${digits}` : digits;
}

/**
 * A measured number for people: plain from 0.001 to 99,999, `1.2 × 10⁻⁹` outside, never more than `digits` significant ones.
 * Zeros that carry nothing are dropped; what is not finite is a dash.
 */
export function formatNumber(value: number | null | undefined, digits = 3): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return "–";
  if (value === 0) return "0";
  const [mantissa = "", power = "0"] = value.toExponential(digits - 1).split("e");
  const exponent = Number(power);
  if (exponent >= -3 && exponent < 5) {
    const decimals = Math.max(0, digits - 1 - exponent);
    return groupDigits(dropZeros(Number(value.toPrecision(digits)).toFixed(decimals)));
  }
  return minus(`${dropZeros(mantissa)}${NO_BREAK}×${NO_BREAK}10${superscript(exponent)}`);
}

/** Every digit of a whole number, in groups of three. */
export function formatCount(value: number): string {
  if (!Number.isFinite(value)) return "–";
  return value < 1e15 ? groupDigits(String(Math.round(value))) : formatNumber(value);
}

/** How many times larger: two significant digits, `1` only where they say so. */
export function formatTimes(ratio: number): string {
  return formatNumber(ratio, ratio < 1.1 && ratio > 1 ? 3 : 2);
}

function groupDigits(text: string): string {
  const [whole = "", fraction] = text.split(".");
  const grouped = whole.replace(/\B(?=(\d{3})+$)/g, GROUP);
  return minus(fraction === undefined ? grouped : `${grouped}.${fraction}`);
}

function dropZeros(text: string): string {
  return text.includes(".") ? text.replace(/\.?0+$/, "") : text;
}

function minus(text: string): string {
  return text.replace(/^-/, "−");
}
