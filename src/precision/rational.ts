/**
 * Exact fractions, for the coefficients of expansions.
 */

/** numerator / denominator in lowest terms, denominator > 0. */
export interface Fraction {
  readonly numerator: bigint;
  readonly denominator: bigint;
}

/** numerator / denominator, reduced. */
export function fraction(numerator: bigint, denominator = 1n): Fraction {
  let a = numerator < 0n ? -numerator : numerator;
  let b = denominator < 0n ? -denominator : denominator;
  while (b !== 0n) [a, b] = [b, a % b];
  const common = denominator < 0n ? -a : a;
  return { numerator: numerator / common, denominator: denominator / common };
}

/** a + b. */
export function addFractions(a: Fraction, b: Fraction): Fraction {
  return fraction(a.numerator * b.denominator + b.numerator * a.denominator, a.denominator * b.denominator);
}

/** a b. */
export function multiplyFractions(a: Fraction, b: Fraction): Fraction {
  return fraction(a.numerator * b.numerator, a.denominator * b.denominator);
}

/** a / b, b ≠ 0. */
export function divideFractions(a: Fraction, b: Fraction): Fraction {
  return fraction(a.numerator * b.denominator, a.denominator * b.numerator);
}
