import { invalid } from "../errors.ts";
import { divide, type Rational, rational } from "./rational.ts";

/**
 * Coefficients as a method file writes them: separated by spaces, each `p/q` or a decimal with every printed digit, zeros kept. Text,
 * because a number literal would be rounded to 16 digits before anything could be proved of it.
 */
export type Coefficients = string;

/** One coefficient, exactly. @throws InvalidInputError where the text is neither a fraction nor a decimal. */
export function parseCoefficient(text: string): Rational {
  const [top, bottom] = text.split("/");
  return bottom === undefined ? parseDecimal(text) : divide(parseDecimal(top!), parseDecimal(bottom));
}

/** All coefficients of one row, exactly; none for an empty row. @throws InvalidInputError as `parseCoefficient`. */
export function parseRow(row: Coefficients): readonly Rational[] {
  const words = row.split(/\s+/).filter((word) => word !== "");
  return words.map(parseCoefficient);
}

function parseDecimal(text: string): Rational {
  const match = /^([+-]?)(\d+)(?:\.(\d+))?(?:e([+-]?\d+))?$/i.exec(text);
  if (match === null) throw invalid.coefficient(text);
  const [, sign, whole, fraction = "", exponent = "0"] = match;
  const digits = BigInt(`${whole}${fraction}`) * (sign === "-" ? -1n : 1n);
  const power = Number(exponent) - fraction.length;
  return power < 0 ? rational(digits, 10n ** BigInt(-power)) : rational(digits * 10n ** BigInt(power));
}
