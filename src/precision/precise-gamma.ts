/**
 * The gamma function and its logarithm to many digits.
 */
import { InvalidArgumentError } from "../core/errors.ts";
import { type PreciseInput, type Rational, rationalFromExact, readExact } from "./decimal.ts";
import { enclosedPi, logarithmOf, sineCosineOf } from "./enclosed-functions.ts";
import { add, type Enclosure, exactInteger, negate, over, times } from "./enclosure.ts";
import { absolute, bitLength } from "./fixed-point.ts";
import { argumentSpread, gammaOfRational, logGammaFixed } from "./gamma.ts";
import type { PreciseEstimate } from "./precise-estimate.ts";
import { digitsOf, exactly, type PreciseOptions, refine } from "./refine.ts";

const MOST_ARGUMENT = 100_000n;
const MOST_LOG_ARGUMENT = 10n ** 15n;

function requireArgument(x: PreciseInput, most: bigint): Rational {
  const exact = rationalFromExact(readExact("x", x));
  const { numerator, denominator } = exact;
  if (numerator <= 0n && denominator === 1n) {
    throw new InvalidArgumentError("x", "a number other than 0, −1, −2, … (the poles)", x);
  }
  if (absolute(numerator) > most * denominator) {
    throw new InvalidArgumentError("x", `a number with |x| ≤ ${most}`, x);
  }
  return exact;
}

/** Binary digits lost to the pole or whole number next to p/q. */
function lostNear({ numerator, denominator }: Rational, whole: bigint): number {
  const distance = bitLength(numerator - whole * denominator);
  return Math.max(0, bitLength(denominator) - distance + 1);
}

/** Nearest integer to p/q. */
function nearest({ numerator, denominator }: Rational): bigint {
  const doubled = 2n * numerator + denominator;
  const quotient = doubled / (2n * denominator);
  return doubled < 0n && quotient * 2n * denominator !== doubled ? quotient - 1n : quotient;
}

/** π / sin(πx) for x other than an integer, with a relative error of about 2^−bits. */
function reflection(x: Rational, bits: bigint): Enclosure {
  const whole = nearest(x);
  const work = bits + BigInt(lostNear(x, whole)) + 8n;
  const fraction = exactInteger(x.numerator - whole * x.denominator);
  const angle = over(times(enclosedPi(work), fraction, work), exactInteger(x.denominator), work);
  const [sine] = sineCosineOf(angle, work);
  const ratio = over(enclosedPi(work), sine, bits);
  return whole % 2n === 0n ? ratio : negate(ratio);
}

/** 1 − x. */
function complement({ numerator, denominator }: Rational): Rational {
  return { numerator: denominator - numerator, denominator };
}

/**
 * The gamma function Γ(x).
 *
 * @param x - Real, not 0, −1, −2, …, |x| ≤ 10^5: a double (its exact binary value), a bigint or a decimal string.
 * @param options - `digits` from 1 to 1000.
 * @returns The value with a relative error of at most 10^−digits, proved. Source: Stirling's series (DLMF 5.11.1, remainder
 * 5.11(ii)) after moving the argument to the right, reflection (5.5.3) on the left of 0. Cost: about 2 digits long
 * products and 0.3 digits terms; the Bernoulli numbers are remembered.
 * @throws {@link InvalidArgumentError} for a bad number, a pole, |x| > 10^5, other digits.
 * @category Arbitrary precision
 * @since 0.2.0
 */
export function preciseGamma(x: PreciseInput, options: PreciseOptions): PreciseEstimate {
  const digits = digitsOf(options);
  const exact = requireArgument(x, MOST_ARGUMENT);
  return refine(digits, 0, (bits) =>
    exact.numerator > 0n
      ? gammaOfRational(exact, bits)
      : over(reflection(exact, bits + 4n), gammaOfRational(complement(exact), bits + 4n), bits),
  );
}

/** log Γ(x) for x > 0 at `bits`. */
function logGammaOfRational(x: Rational, bits: bigint): Enclosure {
  // The slope is at most 1/x + log(x + 2) + 1.
  const work = bits + BigInt(lostNear(x, 0n)) + 8n;
  const fixed = (x.numerator << work) / x.denominator;
  const value = logGammaFixed(fixed, work, work);
  const exact = fixed * x.denominator === x.numerator << work;
  return { value, bits: work, units: 1n + (exact ? 0n : argumentSpread(1n << work, fixed, fixed, work)) };
}

/**
 * log |Γ(x)|.
 *
 * @param x - Real, not 0, −1, −2, …, |x| ≤ 10^15: a double (its exact binary value), a bigint or a decimal string.
 * @param options - `digits` from 1 to 1000.
 * @returns The value with a relative error of at most 10^−digits, proved; exactly 0 for x = 1 and x = 2. Near zeros as many
 * digits more are spent as the value is small. Source and cost as for {@link preciseGamma}.
 * @throws {@link InvalidArgumentError} for a bad number, a pole, |x| > 10^15, other digits.
 * @category Arbitrary precision
 * @since 0.2.0
 */
export function preciseLogGamma(x: PreciseInput, options: PreciseOptions): PreciseEstimate {
  const digits = digitsOf(options);
  const exact = requireArgument(x, MOST_LOG_ARGUMENT);
  if (exact.denominator === 1n && exact.numerator <= 2n) return exactly(0n, digits);
  if (exact.numerator > 0n) {
    const near = Math.max(lostNear(exact, 1n), lostNear(exact, 2n));
    return refine(digits, near, (bits) => logGammaOfRational(exact, bits));
  }
  return refine(digits, 0, (bits) => {
    const ratio = reflection(exact, bits + 4n);
    const size = ratio.value < 0n ? negate(ratio) : ratio;
    return add(logarithmOf(size, bits), negate(logGammaOfRational(complement(exact), bits)));
  });
}
