/**
 * Printing p-values: never 0.
 */
import { requireInteger } from "../core/check.ts";
import { InvalidArgumentError } from "../core/errors.ts";

/**
 * A p-value as text from its natural logarithm, so that it never prints as 0.
 *
 * @param logPValue - Natural logarithm of the p-value, ≤ 0.
 * @param digits - Significant digits, 1 to 15, default 3.
 * @returns For example `0.0599`, `3.2e-412`. Where the logarithm is so large that a double can't hold the digits of the
 *   p-value, an upper bound: `< 1e-43429448190325140`; for −∞ (a logarithm that itself overflowed) `< 1e-308`.
 * @throws {@link InvalidArgumentError} for NaN or a logarithm above 0 (rounding, 1e-9, forgiven), or bad digits.
 */
export function formatPValue(logPValue: number, digits = 3): string {
  requireInteger("digits", digits, 1, 15);
  if (typeof logPValue !== "number" || !(logPValue <= 1e-9)) {
    throw new InvalidArgumentError("logPValue", "the logarithm of a probability, a number ≤ 0", logPValue);
  }
  if (logPValue === Number.NEGATIVE_INFINITY) return "< 1e-308";
  if (logPValue > Math.log(1e-4)) return Math.min(1, Math.exp(logPValue)).toPrecision(digits);
  const decimal = logPValue / Math.LN10;
  // The rounding of the logarithm is the relative error of the p-value: no digit that it does not support.
  if (Math.abs(logPValue) * 2 ** -51 > 0.5 * 10 ** (1 - digits)) {
    return `< 1e${Math.ceil(decimal * (1 - 2 ** -50)) + 1}`;
  }
  let exponent = Math.floor(decimal);
  let mantissa = (10 ** (decimal - exponent)).toFixed(digits - 1);
  if (mantissa.startsWith("10")) {
    exponent += 1;
    mantissa = (1).toFixed(digits - 1);
  }
  return `${mantissa}e${exponent}`;
}
