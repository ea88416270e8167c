/**
 * Residual that the printed digits allow: a decimal of more than 15 digits is rounded in its last one. Fractions are exact, but for the
 * order-12 pair's, which stand for irrational numbers to 54 digits.
 */
export function tolerance(method: object): number {
  const words = JSON.stringify(method).match(/[-\d.]+(?:e[+-]?\d+)?(?:\/\d+)?/gi) ?? [];
  const lengths = words
    .filter((word) => word.includes(".") && !word.includes("/"))
    .map((word) => word.replace(/e.*$/i, "").replace(/\D/g, "").replace(/^0+/, "").length)
    .filter((digits) => digits > 15);
  // Coefficients up to 50, a few hundred products in a condition: four digits are lost.
  return lengths.length === 0 ? 1e-50 : 10 ** (4 - Math.min(...lengths));
}
