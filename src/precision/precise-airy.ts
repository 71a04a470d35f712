/**
 * Airy functions to many digits.
 */
import { InvalidArgumentError } from "../core/errors.ts";
import type { EnclosedAiry } from "./airy-asymptotic.ts";
import { airyEnclosure, airyShrink } from "./airy-fixed.ts";
import { numberFromExact, type PreciseInput, readExact } from "./decimal.ts";
import type { PreciseEstimate } from "./precise-estimate.ts";
import { digitsOf, encloseExact, log2OfExact, type PreciseOptions, refine } from "./refine.ts";

const MOST_ARGUMENT = 10_000;

function airy(x: PreciseInput, options: PreciseOptions, which: keyof EnclosedAiry): PreciseEstimate {
  const digits = digitsOf(options);
  const exact = readExact("x", x);
  const size = numberFromExact(exact);
  if (Math.abs(size) > MOST_ARGUMENT) {
    throw new InvalidArgumentError("x", `a number with |x| ≤ ${MOST_ARGUMENT}`, x);
  }
  const shrink = airyShrink(size);
  // Ai is smaller than e^−ζ by 2√π x^{1/4}, the integral by 2√π x^{3/4}: 12 digits at x = 10^4. The digits of x itself:
  // absolute ones, on the right relative to Ai, and as many more as the slopes √x, x Ai and the size of x cost.
  const own = Math.max(0, exact.numerator === 0n ? 0 : Math.ceil(log2OfExact(exact))) + 32 - shrink;
  return refine(
    digits,
    shrink + 16,
    (bits) => airyEnclosure(encloseExact(exact, bits + BigInt(own)), bits, which === "integral")[which],
  );
}

/**
 * The Airy function Ai(x).
 *
 * @param x - Real, |x| ≤ 10^4: a double (its exact binary value), a bigint or a decimal string.
 * @param options - `digits` from 1 to 1000.
 * @returns The value with a relative error of at most 10^−digits, proved; near a zero as many digits more are spent as it is close. Maclaurin
 * series with guard digits for the cancellation, asymptotic series where its remainder is small enough (DLMF 9.4.1, 9.7.5, 9.7.9).
 * Cost: one long product a term, about 3ζ + digits/3 terms, ζ = ⅔|x|^{3/2}, fewer for large |x|.
 * @throws {@link InvalidArgumentError} for a bad number, |x| > 10^4, other digits.
 * @category Arbitrary precision
 * @since 0.2.0
 */
export function preciseAiryAi(x: PreciseInput, options: PreciseOptions): PreciseEstimate {
  return airy(x, options, "value");
}

/**
 * The derivative Ai′(x) of the Airy function.
 *
 * @param x - Real, |x| ≤ 10^4: a double (its exact binary value), a bigint or a decimal string.
 * @param options - `digits` from 1 to 1000.
 * @returns The value with a relative error of at most 10^−digits, proved; near a zero as many digits more are spent as it is close. Maclaurin
 * series with guard digits for the cancellation, asymptotic series where its remainder is small enough (DLMF 9.4.2, 9.7.6, 9.7.10).
 * Cost: one long product a term, about 3ζ + digits/3 terms, ζ = ⅔|x|^{3/2}, fewer for large |x|.
 * @throws {@link InvalidArgumentError} for a bad number, |x| > 10^4, other digits.
 * @category Arbitrary precision
 * @since 0.2.0
 */
export function preciseAiryAiPrime(x: PreciseInput, options: PreciseOptions): PreciseEstimate {
  return airy(x, options, "slope");
}

/**
 * ∫_x^∞ Ai(t) dt.
 *
 * @param x - Real, |x| ≤ 10^4: a double (its exact binary value), a bigint or a decimal string.
 * @param options - `digits` from 1 to 1000.
 * @returns The value with a relative error of at most 10^−digits, proved. Maclaurin
 * series with guard digits for the cancellation, asymptotic series where its remainder is small enough (DLMF 9.10.1 integrated term by term, and the expansion of ∫K_{1/3} with its own remainder).
 * Cost: one long product a term, about 3ζ + digits/3 terms, ζ = ⅔|x|^{3/2}, fewer for large |x|.
 * @throws {@link InvalidArgumentError} for a bad number, |x| > 10^4, other digits.
 * @category Arbitrary precision
 * @since 0.2.0
 */
export function preciseAiryAiIntegral(x: PreciseInput, options: PreciseOptions): PreciseEstimate {
  return airy(x, options, "integral");
}
