/**
 * From exact inputs to a relative accuracy: more binary digits until the bound is small enough.
 */
import { type ExactInput, fixedFromExact } from "./decimal.ts";
import type { Enclosure } from "./enclosure.ts";
import { bitLength, log2OfFixed } from "./fixed-point.ts";
import { bitsFor, type PreciseEstimate, preciseEstimate, requireDigits } from "./precise-estimate.ts";

/**
 * How many digits a precise function is asked for.
 *
 * @category Arbitrary precision
 * @since 0.2.0
 */
export interface PreciseOptions {
  /** Significant decimal digits, an integer from 1 to 1000: the relative error is at most 10^−digits. */
  readonly digits: number;
}

/** Binary digits worked with beyond those of the input's own size and of the result, when a zero is close. */
const MOST_EXTRA_BITS = 300_000;

/** The number of digits in the options, checked. */
export function digitsOf(options: PreciseOptions | undefined): number {
  return requireDigits("options.digits", options?.digits);
}

/**
 * A function value to `digits` significant digits.
 *
 * The bound of `evaluate` is taken at its word. When the value has fewer digits than wanted (a zero is near) the
 * precision is raised by what is missing, at least by half (A. Ziv, Fast evaluation of elementary mathematical
 * functions with correctly rounded last bit, ACM TOMS 17 (1991)); a value that 300,000 further bits cannot tell from 0
 * comes back with `converged: false`.
 *
 * @param extra - Binary digits needed beyond `digits`, as far as known.
 * @param evaluate - The function with about `bits` binary digits.
 */
export function refine(
  digits: number,
  extra: number,
  evaluate: (bits: bigint) => Enclosure,
): PreciseEstimate {
  // 5 bits more than two decimal digits more: the bound is then small beside the rounding to decimal.
  const wanted = bitsFor(digits + 2) + 5;
  const first = wanted + Math.max(0, Math.ceil(extra)) + 8;
  for (let bits = first; ; ) {
    const found = evaluate(BigInt(bits));
    const known = bitLength(found.value) - bitLength(found.units);
    if (found.units === 0n || known >= wanted || bits > first + MOST_EXTRA_BITS) {
      const error = log2OfFixed(found.units, found.bits);
      return preciseEstimate(found.value, found.bits, error, digits, bits);
    }
    bits += known > 1 ? wanted - known + 8 : Math.max(wanted, bits >> 1);
  }
}

/** A number known exactly, for the arguments at which a function is one. */
export function exactly(value: bigint, digits: number): PreciseEstimate {
  return preciseEstimate(value, 0n, Number.NEGATIVE_INFINITY, digits, 0);
}

/** log2 |x| as a double; −∞ for 0. */
export function log2OfExact(x: ExactInput): number {
  return log2OfFixed(x.numerator, 0n) - x.twos - x.tens * Math.log2(10);
}

/** The input with `digits` binary digits of its own, whatever its size. */
export function encloseExact(x: ExactInput, digits: bigint): Enclosure {
  if (x.tens === 0) return { value: x.numerator, bits: BigInt(x.twos), units: 0n };
  const bits = digits - BigInt(Math.floor(log2OfExact(x)));
  return { value: fixedFromExact(x, bits), bits, units: 1n };
}
