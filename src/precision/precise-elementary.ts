/**
 * Elementary functions to many digits.
 */
import { InvalidArgumentError } from "../core/errors.ts";
import { numberFromExact, type PreciseInput, rationalFromExact, readExact } from "./decimal.ts";
import { exponentialOf, logarithmOf, realPower, sineCosineOf } from "./enclosed-functions.ts";
import { negate, rootOf } from "./enclosure.ts";
import { absolute, bitLength } from "./fixed-point.ts";
import type { PreciseEstimate } from "./precise-estimate.ts";
import { digitsOf, encloseExact, exactly, log2OfExact, type PreciseOptions, refine } from "./refine.ts";

/** Largest |log| of a result: e^(10^6) has 434,294 digits before the point. */
const MOST_LOGARITHM = 1e6;

/**
 * e^x.
 *
 * @param x - Any number with |x| ≤ 10^6: a double (its exact binary value), a bigint or a decimal string.
 * @param options - `digits` from 1 to 1000.
 * @returns The value with a relative error of at most 10^−digits, proved. Cost: about 2 √digits long products.
 * @throws {@link InvalidArgumentError} for a bad number, |x| > 10^6, other digits.
 * @category Arbitrary precision
 * @since 0.2.0
 */
export function preciseExp(x: PreciseInput, options: PreciseOptions): PreciseEstimate {
  const digits = digitsOf(options);
  const exact = readExact("x", x);
  if (exact.numerator === 0n) return exactly(1n, digits);
  if (Math.abs(numberFromExact(exact)) > MOST_LOGARITHM) {
    throw new InvalidArgumentError("x", `a number with |x| ≤ ${MOST_LOGARITHM}`, x);
  }
  const size = Math.max(1, log2OfExact(exact));
  return refine(digits, size, (bits) => exponentialOf(encloseExact(exact, bits), bits));
}

/**
 * The natural logarithm log x.
 *
 * @param x - A number > 0: a double (its exact binary value), a bigint or a decimal string.
 * @param options - `digits` from 1 to 1000.
 * @returns The value with a relative error of at most 10^−digits, proved; exactly 0 for x = 1. Near 1 as many digits more
 * are spent as log x is small. Cost: about 1.5 exponentials.
 * @throws {@link InvalidArgumentError} for a bad number, x ≤ 0, other digits.
 * @category Arbitrary precision
 * @since 0.2.0
 */
export function preciseLog(x: PreciseInput, options: PreciseOptions): PreciseEstimate {
  const digits = digitsOf(options);
  const exact = readExact("x", x);
  if (exact.numerator <= 0n) throw new InvalidArgumentError("x", "a number > 0", x);
  const { numerator, denominator } = rationalFromExact(exact);
  if (numerator === denominator) return exactly(0n, digits);
  // |log x| is about |x − 1| near 1.
  const near = bitLength(denominator) - bitLength(numerator - denominator);
  return refine(digits, near, (bits) => logarithmOf(encloseExact(exact, bits), bits));
}

/**
 * √x.
 *
 * @param x - A number ≥ 0: a double (its exact binary value), a bigint or a decimal string.
 * @param options - `digits` from 1 to 1000.
 * @returns The value with a relative error of at most 10^−digits, proved; exact for squares of short numbers.
 * @throws {@link InvalidArgumentError} for a bad number, x < 0, other digits.
 * @category Arbitrary precision
 * @since 0.2.0
 */
export function preciseSquareRoot(x: PreciseInput, options: PreciseOptions): PreciseEstimate {
  const digits = digitsOf(options);
  const exact = readExact("x", x);
  if (exact.numerator < 0n) throw new InvalidArgumentError("x", "a number ≥ 0", x);
  if (exact.numerator === 0n) return exactly(0n, digits);
  return refine(digits, 0, (bits) => {
    const root = rootOf(encloseExact(exact, bits), bits);
    const a = encloseExact(exact, bits);
    const isSquare = a.units === 0n && sameNumber(root.value * root.value, 2n * root.bits, a.value, a.bits);
    return isSquare ? { ...root, units: 0n } : root;
  });
}

function sameNumber(a: bigint, aBits: bigint, b: bigint, bBits: bigint): boolean {
  return aBits >= bBits ? a === b << (aBits - bBits) : a << (bBits - aBits) === b;
}

function circular(x: PreciseInput, options: PreciseOptions, which: 0 | 1): PreciseEstimate {
  const digits = digitsOf(options);
  const exact = readExact("x", x);
  if (exact.numerator === 0n) return exactly(which === 0 ? 0n : 1n, digits);
  const size = log2OfExact(exact);
  return refine(digits, Math.abs(size) + 2, (bits) => sineCosineOf(encloseExact(exact, bits), bits)[which]);
}

/**
 * sin x, x in radians.
 *
 * @param x - Any number: a double (its exact binary value), a bigint or a decimal string.
 * @param options - `digits` from 1 to 1000.
 * @returns The value with a relative error of at most 10^−digits, proved; exactly 0 for x = 0. Near the other zeros, and
 * for large x, as many digits more are spent as reducing the argument costs.
 * @throws {@link InvalidArgumentError} for a bad number, other digits.
 * @category Arbitrary precision
 * @since 0.2.0
 */
export function preciseSine(x: PreciseInput, options: PreciseOptions): PreciseEstimate {
  return circular(x, options, 0);
}

/**
 * cos x, x in radians.
 *
 * @param x - Any number: a double (its exact binary value), a bigint or a decimal string.
 * @param options - `digits` from 1 to 1000.
 * @returns The value with a relative error of at most 10^−digits, proved. Near zeros, and for large x, as many digits
 * more are spent as reducing the argument costs.
 * @throws {@link InvalidArgumentError} for a bad number, other digits.
 * @category Arbitrary precision
 * @since 0.2.0
 */
export function preciseCosine(x: PreciseInput, options: PreciseOptions): PreciseEstimate {
  return circular(x, options, 1);
}

/**
 * x^y: e^{y log x} for x > 0, and for whole y the product of |y| factors x or 1/x.
 *
 * @param x - The base: a double (its exact binary value), a bigint or a decimal string. Not 0 when y < 0, and not
 * negative unless y is whole.
 * @param y - The exponent, likewise; |y log x| ≤ 10^6.
 * @param options - `digits` from 1 to 1000.
 * @returns The value with a relative error of at most 10^−digits, proved; x^0 is 1.
 * @throws {@link InvalidArgumentError} for a bad number, a power that is not real or too large, other digits.
 * @category Arbitrary precision
 * @since 0.2.0
 */
export function precisePower(x: PreciseInput, y: PreciseInput, options: PreciseOptions): PreciseEstimate {
  const digits = digitsOf(options);
  const base = readExact("x", x);
  const exponent = rationalFromExact(readExact("y", y));
  if (exponent.numerator === 0n) return exactly(1n, digits);
  if (base.numerator === 0n) {
    if (exponent.numerator < 0n) throw new InvalidArgumentError("x", "a base other than 0 when y < 0", x);
    return exactly(0n, digits);
  }
  if (base.numerator < 0n && exponent.denominator !== 1n)
    throw new InvalidArgumentError("x", "a base ≥ 0 unless y is whole", x);
  const positive = { ...base, numerator: absolute(base.numerator) };
  const negative = base.numerator < 0n && exponent.numerator % 2n !== 0n;
  const { numerator, denominator } = rationalFromExact(positive);
  if (numerator === denominator) return exactly(negative ? -1n : 1n, digits);
  const whole = BigInt(bitLength(exponent.numerator / exponent.denominator));
  const rough = logarithmOf(encloseExact(positive, 2n * whole + 64n), whole + 32n);
  if (
    absolute(rough.value * exponent.numerator) >> rough.bits >
    BigInt(MOST_LOGARITHM) * exponent.denominator
  ) {
    throw new InvalidArgumentError("y", `an exponent with |y log x| ≤ ${MOST_LOGARITHM}`, y);
  }
  return refine(digits, Number(whole) + 20, (bits) => {
    const power = realPower(encloseExact(positive, bits), exponent, bits);
    return negative ? negate(power) : power;
  });
}
