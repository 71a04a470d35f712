/**
 * Bessel functions to many digits.
 */
import { InvalidArgumentError } from "../core/errors.ts";
import {
  besselEnclosures,
  log2OfFactor,
  log2OfNextOrder,
  modifiedBesselEnclosure,
  slopeOf,
} from "./bessel-fixed.ts";
import { orderAsNumber } from "./bessel-series.ts";
import {
  type ExactInput,
  numberFromExact,
  type PreciseInput,
  type Rational,
  rationalFromExact,
  readExact,
} from "./decimal.ts";
import { add, type Enclosure } from "./enclosure.ts";
import { log2OfFixed } from "./fixed-point.ts";
import type { PreciseEstimate } from "./precise-estimate.ts";
import {
  digitsOf,
  encloseExact,
  exactly as exactValue,
  log2OfExact,
  type PreciseOptions,
  refine,
} from "./refine.ts";

const MOST_ORDER = 10_000;
const MOST_ARGUMENT = 1e9;
const MOST_MODIFIED_ARGUMENT = 10_000;
/** Smallest and largest results, as binary exponents: 10^±400,000. */
const MOST_EXPONENT = 400_000 * Math.log2(10);

/** Arguments of a Bessel function, checked; `lead` is log2 of (x/2)^ν / Γ(ν + 1). */
interface BesselArguments {
  readonly order: Rational;
  readonly nu: number;
  readonly x: ExactInput;
  readonly size: number;
  readonly lead: number;
}

function requireArguments(order: PreciseInput, x: PreciseInput, most: number): BesselArguments {
  const exactOrder = rationalFromExact(readExact("order", order));
  if (
    exactOrder.numerator <= -exactOrder.denominator ||
    exactOrder.numerator > BigInt(MOST_ORDER) * exactOrder.denominator
  ) {
    throw new InvalidArgumentError("order", `a number > −1 and ≤ ${MOST_ORDER}`, order);
  }
  const exact = readExact("x", x);
  const size = numberFromExact(exact);
  if (exact.numerator < 0n || size > most)
    throw new InvalidArgumentError("x", `a number from 0 to ${most}`, x);
  const nu = orderAsNumber(exactOrder);
  const isZero = exact.numerator === 0n;
  if (isZero && nu < 0) throw new InvalidArgumentError("x", "a number > 0 when the order is negative", x);
  const lead = isZero ? 0 : log2OfFactor(exactOrder, log2OfExact(exact));
  if (lead < -MOST_EXPONENT) {
    throw new InvalidArgumentError("x", "an argument at which the function is not below 1e-400000", x);
  }
  return { order: exactOrder, nu, x: exact, size, lead };
}

/**
 * J_ν(x) and J_ν′(x) with an absolute error of about 2^−bits.
 *
 * The rounding of x adds |x J_ν′| ≤ |ν| A + x B and |x J_ν″| ≤ (|ν| A + x B)/x + (x + ν²/x) A times its relative error,
 * where |J_ν| ≤ A, |J_{ν+1}| ≤ B: for orders ≥ 0 the functions are below 1 and below (x/2)^ν/Γ(ν + 1) (DLMF 10.14.1,
 * 10.14.4), for ν < 0 below twice the larger of the two (10.6.1). So many digits of x are taken that this is one unit.
 */
function besselWithSlope(all: BesselArguments, bits: bigint): [Enclosure, Enclosure] {
  const { order, nu, x, lead } = all;
  const log2OfX = log2OfExact(x);
  const first = nu >= 0 ? Math.min(0, lead) : Math.max(0, lead) + 1;
  const second = Math.min(0, lead + log2OfX - 1 - log2OfNextOrder(order));
  const slope = Math.max(Math.log2(Math.abs(nu) + 2 ** -60) + first, log2OfX + second) + 1;
  const curvature =
    Math.max(
      slope - log2OfX,
      Math.max(log2OfX, 2 * Math.log2(Math.abs(nu) + 2 ** -60) - log2OfX) + first + 1,
    ) + 1;
  const digits = bits + BigInt(Math.ceil(Math.max(slope, curvature)) + 8);
  const argument = encloseExact(x, digits < 64n ? 64n : digits);
  const [value, next] = besselEnclosures(order, argument.value, argument.bits, bits);
  const derivative = slopeOf(order, argument.value, argument.bits, value, next, bits);
  if (argument.units === 0n) return [value, derivative];
  const spread = { value: 0n, bits, units: 1n };
  return [add(value, spread), add(derivative, spread)];
}

/**
 * The Bessel function of the first kind J_ν(x).
 *
 * @param order - ν with −1 < ν ≤ 10^4: a double (its exact binary value), a bigint or a decimal string.
 * @param x - 0 ≤ x ≤ 10^9, likewise; x > 0 when ν < 0.
 * @param options - `digits` from 1 to 1000.
 * @returns The value with a relative error of at most 10^−digits, proved; near a zero as many digits more are spent as it
 * is close. Power series with guard digits for the cancellation (DLMF 10.2.2), Hankel's expansion where its remainder is
 * small enough (10.17.3, 10.17(iii)). Cost: one long product a term, about 1.4 x + digits/3 terms, fewer for large x.
 * @throws {@link InvalidArgumentError} for bad numbers, ν or x outside the ranges above, a result below 1e-400000, other
 * digits.
 * @category Arbitrary precision
 * @since 0.2.0
 */
export function preciseBesselJ(
  order: PreciseInput,
  x: PreciseInput,
  options: PreciseOptions,
): PreciseEstimate {
  const digits = digitsOf(options);
  const all = requireArguments(order, x, MOST_ARGUMENT);
  if (all.x.numerator === 0n) return exactValue(all.nu === 0 ? 1n : 0n, digits);
  return refine(digits, 8 - all.lead, (bits) => besselWithSlope(all, bits)[0]);
}

/**
 * The derivative J_ν′(x) of the Bessel function of the first kind.
 *
 * @param order - ν with −1 < ν ≤ 10^4: a double (its exact binary value), a bigint or a decimal string.
 * @param x - 0 ≤ x ≤ 10^9, likewise; x > 0 when ν < 1 is not 0.
 * @param options - `digits` from 1 to 1000.
 * @returns The value with a relative error of at most 10^−digits, proved: (ν/x) J_ν − J_{ν+1} (DLMF 10.6.2), both as for
 * {@link preciseBesselJ}.
 * @throws {@link InvalidArgumentError} for bad numbers, ν or x outside the ranges above, a result below 1e-400000, other
 * digits.
 * @category Arbitrary precision
 * @since 0.2.0
 */
export function preciseBesselJPrime(
  order: PreciseInput,
  x: PreciseInput,
  options: PreciseOptions,
): PreciseEstimate {
  const digits = digitsOf(options);
  const all = requireArguments(order, x, MOST_ARGUMENT);
  const { numerator, denominator } = all.order;
  if (all.x.numerator === 0n) {
    if (numerator > 0n && numerator < denominator) {
      throw new InvalidArgumentError("x", "a number > 0 when the order is between 0 and 1", x);
    }
    return numerator === denominator
      ? refine(digits, 0, () => ({ value: 1n, bits: 1n, units: 0n }))
      : exactValue(0n, digits);
  }
  // About |ν|/x times J_ν for small x; for ν = 0, x/2.
  const next = all.lead + log2OfExact(all.x) - 1 - log2OfNextOrder(all.order);
  const size =
    numerator === 0n
      ? next
      : all.lead + log2OfFixed(numerator, 0n) - log2OfFixed(denominator, 0n) - log2OfExact(all.x);
  return refine(digits, 8 - size, (bits) => besselWithSlope(all, bits)[1]);
}

/**
 * The modified Bessel function of the first kind I_ν(x).
 *
 * @param order - ν with −1 < ν ≤ 10^4: a double (its exact binary value), a bigint or a decimal string.
 * @param x - 0 ≤ x ≤ 10^4, likewise; x > 0 when ν < 0.
 * @param options - `digits` from 1 to 1000.
 * @returns The value with a relative error of at most 10^−digits, proved. Power series, all terms positive (DLMF 10.25.2);
 * one long product a term, about 1.4 x + digits/3 terms.
 * @throws {@link InvalidArgumentError} for bad numbers, ν or x outside the ranges above, a result below 1e-400000, other
 * digits.
 * @category Arbitrary precision
 * @since 0.2.0
 */
export function preciseBesselI(
  order: PreciseInput,
  x: PreciseInput,
  options: PreciseOptions,
): PreciseEstimate {
  const digits = digitsOf(options);
  const all = requireArguments(order, x, MOST_MODIFIED_ARGUMENT);
  if (all.x.numerator === 0n) return exactValue(all.nu === 0 ? 1n : 0n, digits);
  // x I_ν′/I_ν = ν + x I_{ν+1}/I_ν ≤ |ν| + x²/(2(ν + 1)) and, for ν ≥ −1/2, ≤ |ν| + x.
  const square = 2 * log2OfExact(all.x) - 1 - log2OfNextOrder(all.order);
  const ratio = Math.max(0, Math.log2(Math.abs(all.nu) + all.size + 1), all.nu >= -0.5 ? 0 : square);
  const own = BigInt(Math.ceil(ratio) + 5);
  return refine(digits, 8, (bits) => {
    const argument = encloseExact(all.x, bits + own);
    const found = modifiedBesselEnclosure(all.order, argument.value, argument.bits, bits);
    if (argument.units === 0n) return found;
    return { ...found, units: found.units + (found.value >> bits) + 1n };
  });
}
