/**
 * Numbers for people: rounded so that no digit is shown that the error does not support.
 *
 * The rule, which the tests check: one unit of the last digit printed is never smaller than the error. So a
 * printed number is off by at most its error plus half a unit of its last digit, that is by less than 1.5
 * units. Errors are rounded up to two digits, never down. A probability never prints as 0: below the range of
 * double precision it is written from its logarithm, and where the error swamps it, as an upper bound.
 *
 * Exponents are read off the shortest decimal form that JavaScript prints, not off `Math.log10`, which may be
 * one ulp on the wrong side of an integer; `toFixed` and `toExponential` round the exact binary value.
 */
import { InvalidArgumentError } from "../core/errors.ts";

/** A number with what is known about its error; every `Estimate` of the library is one. */
export interface Measured {
  /** The value. */
  readonly value: number;
  /** Absolute error of the value. Left out: exact, or not stated. */
  readonly error?: number | undefined;
  /** Proved bound or heuristic estimate. */
  readonly errorKind?: "bound" | "estimate" | undefined;
  /** False when the tolerance asked for was missed. */
  readonly converged?: boolean | undefined;
  /** Natural logarithm of the value, for probabilities too small for a double. */
  readonly logValue?: number | undefined;
  /** Absolute error of {@link logValue}. */
  readonly logError?: number | undefined;
}

/** Significant digits shown unless asked otherwise. */
export const DEFAULT_DIGITS = 10;

/** Below this a double is close to losing digits to underflow, so the logarithm is preferred. */
const SMALLEST_TRUSTED = 1e-300;
const ULP = 2 ** -52;

/** Decimal exponent e of v ≠ 0: 10^e ≤ |v| < 10^(e+1). */
function decimalExponent(v: number): number {
  const text = v.toExponential();
  return Number(text.slice(text.indexOf("e") + 1));
}

/** Smallest k with 10^k ≥ error > 0. */
function supportedPlace(error: number): number {
  const e = decimalExponent(error);
  return error <= Number(`1e${e}`) ? e : e + 1;
}

function tidyExponent(text: string): string {
  return text.replace("e+", "e");
}

function requireDigits(digits: number): number {
  if (!Number.isInteger(digits) || digits < 1 || digits > 17) {
    throw new InvalidArgumentError("digits", "an integer from 1 to 17", digits);
  }
  return digits;
}

/**
 * The value to at most `digits` significant digits, fewer where the error does not support them.
 *
 * @param value - The number.
 * @param error - Its absolute error; 0 or left out when exact.
 * @param digits - Most significant digits, 1 to 17.
 * @returns Decimal text. `"0"` when the whole value is below its error, `"no digit known"` when the error is
 *   not finite, and words for values that are not finite.
 * @throws InvalidArgumentError for digits outside 1 … 17.
 */
export function formatValue(value: number, error = 0, digits: number = DEFAULT_DIGITS): string {
  requireDigits(digits);
  if (Number.isNaN(value)) return "not a number";
  if (!Number.isFinite(value)) return value > 0 ? "infinite" : "minus infinite";
  if (!Number.isFinite(error)) return "no digit known";
  const size = Math.abs(error);
  if (value === 0) return "0";
  const exponent = decimalExponent(value);
  const byDigits = exponent - digits + 1;
  const place = size === 0 ? byDigits : Math.max(byDigits, supportedPlace(size));
  if (place <= 0 && exponent >= -5 && exponent < 12 && place >= -100) {
    const text = value.toFixed(-place);
    return Number(text) === 0 ? "0" : text;
  }
  if (place > exponent) {
    // Not one digit of the value itself: it rounds to 0 or to a single unit of the supported place.
    const unit = Number(`1e${place}`);
    if (Math.abs(value) < unit / 2) return "0";
    return `${value < 0 ? "-" : ""}1e${place}`;
  }
  return tidyExponent(value.toExponential(exponent - place));
}

/** Smallest decimal of two significant digits that is ≥ x > 0. */
function roundUp(x: number): string {
  const text = x.toExponential(1);
  const split = text.indexOf("e");
  let tenths = Math.round(Number(text.slice(0, split)) * 10);
  let exponent = Number(text.slice(split + 1));
  if (Number(text) < x) tenths++;
  if (tenths >= 100) {
    tenths = 10;
    exponent++;
  }
  const up = `${tenths / 10}e${exponent}`;
  if (exponent >= -3 && exponent <= 2) return String(Number(up));
  return up;
}

/**
 * An error for people: two significant digits, rounded up.
 *
 * @param error - Absolute error, ≥ 0. Undefined: not stated.
 * @returns Decimal text, never smaller than the error.
 */
export function formatError(error: number | undefined): string {
  if (error === undefined) return "";
  if (Number.isNaN(error)) return "unknown";
  if (error === Number.POSITIVE_INFINITY) return "unbounded";
  return error === 0 ? "0" : roundUp(Math.abs(error));
}

/**
 * e^logValue as decimal text, for numbers that a double can't hold.
 *
 * @param logValue - Natural logarithm, finite.
 * @param logError - Its absolute error, which is the relative error of the number.
 * @param digits - Most significant digits.
 * @returns For instance `"1.234e-412"`.
 */
export function formatFromLog(logValue: number, logError = 0, digits: number = DEFAULT_DIGITS): string {
  requireDigits(digits);
  const log10 = logValue / Math.LN10;
  let exponent = Math.floor(log10);
  const mantissa = 10 ** (log10 - exponent);
  // Rounding of the logarithm itself and of the division: a few ulps of log10, times ln 10.
  const relative = Math.abs(logError) + 4 * ULP * (Math.abs(logValue) + 1);
  const place = Math.max(1 - digits, supportedPlace(mantissa * relative));
  if (!(place <= 0)) return `1e${exponent + 1}`;
  let text = mantissa.toFixed(-place);
  if (Number(text) >= 10) {
    exponent++;
    text = (Number(text) / 10).toFixed(-place);
  }
  return `${text}e${exponent}`;
}

/** Whether a probability is so small that it is printed from its logarithm. */
export function printsFromLog(p: Measured): boolean {
  return p.logValue !== undefined && Number.isFinite(p.logValue) && p.value < SMALLEST_TRUSTED;
}

/**
 * The absolute error e^logValue · logError of a number known by its logarithm, to two digits, rounded up; empty
 * when the error is not stated.
 */
export function formatErrorFromLog(logValue: number, logError: number | undefined): string {
  if (logError === undefined) return "";
  if (logError === 0) return "0";
  if (!Number.isFinite(logError)) return "unbounded";
  const log10 = (logValue + Math.log(logError)) / Math.LN10;
  const exponent = Math.floor(log10);
  // One part in a thousand covers the rounding of the logarithms, so that the error is never understated.
  const tenths = Math.ceil(10 ** (log10 - exponent) * 10 * 1.001);
  return tenths >= 100 ? `1e${exponent + 1}` : `${tenths / 10}e${exponent}`;
}

/**
 * A probability for people, never 0.
 *
 * @param p - The probability with its error and, where it may underflow, its logarithm.
 * @param digits - Most significant digits.
 * @returns Decimal text; `"< 1.2e-16"` where the error is as large as the value.
 */
export function formatProbability(p: Measured, digits: number = DEFAULT_DIGITS): string {
  const { value, error = 0, logValue, logError } = p;
  if (logValue !== undefined && printsFromLog(p)) {
    if (logError === undefined || logError < 1) return formatFromLog(logValue, logError, digits);
    // Not even the power of ten is known for certain: the bound is what can be said.
    if (Number.isFinite(logError))
      return `< 1e${Math.min(0, Math.ceil((logValue + logError) / Math.LN10 + 1e-9))}`;
  }
  if (Number.isNaN(value) || !Number.isFinite(error)) return formatValue(value, error, digits);
  const text = formatValue(value, error, digits);
  if (text !== "0" && error < value) return text;
  const bound = Math.abs(value) + error;
  return `< ${bound > 0 ? roundUp(bound) : "5e-324"}`;
}

/**
 * A number with every digit it has: the shortest decimal that reads back as the same double (at most 17
 * significant digits), or the words `Infinity`, `-Infinity`, `NaN`.
 */
export function fullDigits(value: number): string {
  return Object.is(value, -0) ? "0" : String(value);
}
