/**
 * What the arbitrary-precision room returns, and how many digits it can be asked for.
 */
import { InvalidArgumentError } from "../core/errors.ts";
import { decimalFromFixed, formatDecimal, formatErrorBound } from "./decimal.ts";
import { log2OfFixed } from "./fixed-point.ts";

/** Most digits served. */
export const MOST_DIGITS = 1000;

/**
 * A number with many digits and its error.
 *
 * `value` and `mantissa · 10^−scale` are the same decimal number; |value − true| ≤ error.
 *
 * @category Arbitrary precision
 * @since 0.2.0
 */
export interface PreciseEstimate {
  /** Decimal string: two significant digits more than asked for, so that rounding it hardly adds to the error. */
  readonly value: string;
  /** All digits as an integer: the value is mantissa · 10^−scale. */
  readonly mantissa: bigint;
  /** Number of decimal places of the mantissa; negative for large numbers. */
  readonly scale: number;
  /** Absolute error as a decimal string, rounded up to two digits (`"0"` when exact). May be far below 1e-308. */
  readonly error: string;
  /** `"bound"` when proved, `"estimate"` when heuristic. */
  readonly errorKind: "bound" | "estimate";
  /** Whether the relative error is at most 10^−digits. */
  readonly converged: boolean;
  /** Number of quadrature points; for a function of one argument, the binary digits it was worked out with. */
  readonly order: number;
}

/** Integer from 1 to {@link MOST_DIGITS}, or throw. */
export function requireDigits(argument: string, digits: unknown): number {
  if (typeof digits !== "number" || !Number.isInteger(digits) || digits < 1 || digits > MOST_DIGITS) {
    throw new InvalidArgumentError(argument, `an integer from 1 to ${MOST_DIGITS}`, digits);
  }
  return digits;
}

/** Binary digits that hold `digits` decimal ones. */
export function bitsFor(digits: number): number {
  return Math.ceil(digits * Math.log2(10)) + 1;
}

/**
 * Packs a · 2^−bits, known within 2^`errorLog2`, to `digits` significant digits; the rounding to decimal is added to
 * the error.
 */
export function preciseEstimate(
  a: bigint,
  bits: bigint,
  errorLog2: number,
  digits: number,
  order: number,
  errorKind: "bound" | "estimate" = "bound",
): PreciseEstimate {
  // Two digits more than asked for: rounding the string must not be what the error consists of.
  const decimal = decimalFromFixed(a, bits, digits + 2);
  const rounding = decimal.exact ? Number.NEGATIVE_INFINITY : -decimal.scale * Math.log2(10) - 1;
  const most = Math.max(errorLog2, rounding);
  const total =
    most === Number.NEGATIVE_INFINITY
      ? most
      : most + Math.log2(2 ** (errorLog2 - most) + 2 ** (rounding - most));
  return {
    value: formatDecimal(decimal),
    mantissa: decimal.mantissa,
    scale: decimal.scale,
    error: formatErrorBound(total),
    errorKind,
    converged: total <= log2OfFixed(a, bits) - digits * Math.log2(10) || total === Number.NEGATIVE_INFINITY,
    order,
  };
}
