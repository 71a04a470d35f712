/**
 * Printing p-values: never 0.
 */

/**
 * A p-value as text from its natural logarithm, so that it never prints as 0.
 *
 * @param logPValue - Natural logarithm of the p-value, ≤ 0.
 * @param digits - Significant digits, default 3.
 * @returns For example `0.0599`, `3.2e-412`.
 */
export function formatPValue(logPValue: number, digits = 3): string {
  if (logPValue > Math.log(1e-4)) return Math.min(1, Math.exp(logPValue)).toPrecision(digits);
  const decimal = logPValue / Math.LN10;
  let exponent = Math.floor(decimal);
  let mantissa = (10 ** (decimal - exponent)).toFixed(digits - 1);
  if (mantissa.startsWith("10")) {
    exponent += 1;
    mantissa = (1).toFixed(digits - 1);
  }
  return `${mantissa}e${exponent}`;
}
