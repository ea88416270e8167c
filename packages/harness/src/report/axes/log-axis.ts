import { superscript } from "../text/number.ts";

/** A logarithmic axis with its decades chosen: domain in data units, ticks at whole powers of ten only. */
export interface LogAxis {
  readonly domain: [number, number];
  readonly scale: { readonly type: "log"; readonly domain: [number, number]; readonly nice: false };
  readonly values: number[];
  readonly labelExpr: string;
}

const MOST_LABELS = 9;

/**
 * The decades that hold all positive values given, with a little air; at least two are labelled. Where there would be more than nine
 * labels only every second, third... decade gets one. Labels read 0.01, 1, 100 while the axis stays near 1 and 10⁻⁹ beyond.
 */
export function logAxis(values: Iterable<number | null>, airDecades = 0.12): LogAxis {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (const value of values) {
    if (value === null || !(value > 0) || !Number.isFinite(value)) continue;
    low = Math.min(low, Math.log10(value));
    high = Math.max(high, Math.log10(value));
  }
  if (low > high) [low, high] = [0, 1];
  low -= airDecades;
  high += airDecades;
  if (Math.floor(high) - Math.ceil(low) < 1) {
    // Fewer than two decades in sight: widen to the nearest ones, the cheaper end first.
    if (Math.ceil(low) > Math.floor(high)) [low, high] = [Math.floor(low), Math.ceil(high)];
    else if (low - Math.floor(low) < Math.ceil(high) - high && low > Math.floor(low)) low = Math.floor(low);
    else high = Math.max(Math.ceil(high), Math.floor(low) + 1);
  }
  const first = Math.ceil(low - 1e-9);
  const last = Math.floor(high + 1e-9);
  const stride = Math.ceil((last - first + 1) / MOST_LABELS);
  const exponents: number[] = [];
  // Anchored at 10^0 so that 1 keeps its label when it is in sight.
  for (let exponent = Math.ceil(first / stride) * stride; exponent <= last; exponent += stride) {
    exponents.push(exponent);
  }
  const plain = first >= -3 && last <= 5;
  const labels = exponents.map((exponent) => decadeLabel(exponent, plain));
  const domain: [number, number] = [10 ** low, 10 ** high];
  return {
    domain,
    scale: { type: "log", domain, nice: false },
    values: exponents.map((exponent) => Number(`1e${exponent}`)),
    labelExpr: `${JSON.stringify(labels)}[round((log(datum.value) / LN10 - ${exponents[0] ?? 0}) / ${stride})]`,
  };
}

function decadeLabel(exponent: number, plain: boolean): string {
  if (plain) return String(Number(`1e${exponent}`)).replace(/\B(?=(\d{3})+$)/g, "\u202f");
  if (exponent === 0) return "1";
  return exponent === 1 ? "10" : `10${superscript(exponent)}`;
}
