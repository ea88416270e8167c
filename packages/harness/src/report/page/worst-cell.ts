import type { LimitError } from "../../choose/choice.ts";
import { formatNumber } from "../text/number.ts";

/** Where and when the worst value of a limit was met. */
export function worstCellWords(error: LimitError): string {
  return `${error.orbit}, e = ${formatNumber(error.eccentricity, 5)}, start at ${formatNumber(error.startAnomalyDeg, 5)}°, after ${formatNumber(
    error.atOrbit,
    4,
  )} orbits`;
}
