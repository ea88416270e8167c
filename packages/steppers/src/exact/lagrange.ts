import { type Rational, rational } from "./rational.ts";

/**
 * Numbers times 2^240, cut to whole ones: 72 digits, for what follows from nodes of 40 digits, where exact fractions would only grow.
 * Polynomials hold their coefficients lowest power first.
 */
export type Scaled = bigint;
export type ScaledPolynomial = readonly Scaled[];

const bits = 240n;
export const scaledOne: Scaled = 1n << bits;

export const toScaled = ({ numerator, denominator }: Rational): Scaled => (numerator << bits) / denominator;
export const fromScaled = (x: Scaled): Rational => rational(x, scaledOne);
export const scaledProduct = (x: Scaled, y: Scaled): Scaled => (x * y) >> bits;

/** The Lagrange basis polynomials of distinct nodes; error of a coefficient below 2^-200 for up to 8 nodes in [0, 1]. */
export function lagrangeBasis(nodes: readonly Scaled[]): readonly ScaledPolynomial[] {
  return nodes.map((node, i) => {
    let polynomial: Scaled[] = [scaledOne];
    nodes.forEach((other, j) => {
      if (i === j) return;
      // Times (x - other) / (node - other).
      const product = [0n, ...polynomial].map((x, k) => x - scaledProduct(other, polynomial[k] ?? 0n));
      polynomial = product.map((x) => (x << bits) / (node - other));
    });
    return polynomial;
  });
}

export const evaluate = (polynomial: ScaledPolynomial, x: Scaled): Scaled =>
  polynomial.reduceRight((value, coefficient) => scaledProduct(value, x) + coefficient, 0n);

/** Integral from 0. */
export const integral = (polynomial: ScaledPolynomial): ScaledPolynomial => [
  0n,
  ...polynomial.map((coefficient, k) => coefficient / BigInt(k + 1)),
];
