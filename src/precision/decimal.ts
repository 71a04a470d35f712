/**
 * Decimal strings and fixed-point numbers.
 */
import { InvalidArgumentError } from "../core/errors.ts";
import { absolute, bitLength, numberFromFixed, splitNumber } from "./fixed-point.ts";

/**
 * A real number given exactly: a double (its exact binary value), an integer, or a decimal string such as
 * `"-2.5"`, `"1e-40"`.
 */
export type PreciseInput = number | bigint | string;

/** numerator / (2^twos · 10^tens), exactly. */
export interface ExactInput {
  readonly numerator: bigint;
  readonly twos: number;
  readonly tens: number;
}

/** Numbers other than 0 are read from 10^−MOST_EXPONENT to 10^MOST_EXPONENT, strings up to MOST_CHARACTERS long. */
export const MOST_EXPONENT = 10000;
const MOST_CHARACTERS = 2 * MOST_EXPONENT;

const DECIMAL = /^([+-]?)(\d+)(?:\.(\d*))?(?:[eE]([+-]?\d{1,6}))?$/;
const LEADING_POINT = /^([+-]?)\.(\d+)(?:[eE]([+-]?\d{1,6}))?$/;

/**
 * Reads an exact number.
 *
 * @throws {@link InvalidArgumentError} naming `argument` when it is not a finite number, or one of an absurd size.
 */
export function readExact(argument: string, input: unknown): ExactInput {
  if (typeof input === "bigint") {
    if (bitLength(input) > MOST_EXPONENT * Math.log2(10)) throw unreasonable(argument, "a bigint");
    return { numerator: input, twos: 0, tens: 0 };
  }
  if (typeof input === "number" && Number.isFinite(input)) {
    const [mantissa, exponent] = splitNumber(input);
    return exponent >= 0
      ? { numerator: mantissa << BigInt(exponent), twos: 0, tens: 0 }
      : { numerator: mantissa, twos: -exponent, tens: 0 };
  }
  if (typeof input === "string") {
    if (input.length > MOST_CHARACTERS) throw unreasonable(argument, input);
    const text = input.trim();
    const match = DECIMAL.exec(text);
    const point = match ? null : LEADING_POINT.exec(text);
    if (match || point) {
      const [sign, whole, fraction, power] = match
        ? [match[1], match[2], match[3] ?? "", match[4] ?? "0"]
        : [point![1], "0", point![2], point![3] ?? "0"];
      const digits = BigInt(whole + fraction) * (sign === "-" ? -1n : 1n);
      const tens = fraction.length - Number(power);
      if (digits === 0n) return { numerator: 0n, twos: 0, tens: 0 };
      const lead = bitLength(digits) / Math.log2(10) - tens;
      if (Math.abs(lead) > MOST_EXPONENT) throw unreasonable(argument, input);
      return tens >= 0
        ? { numerator: digits, twos: 0, tens }
        : { numerator: digits * 10n ** BigInt(-tens), twos: 0, tens: 0 };
    }
  }
  throw new InvalidArgumentError(argument, "a finite number, a bigint or a decimal string", input);
}

function unreasonable(argument: string, received: unknown): InvalidArgumentError {
  const expected = `0 or a number of size 1e-${MOST_EXPONENT} to 1e${MOST_EXPONENT}, written with at most ${MOST_CHARACTERS} characters`;
  return new InvalidArgumentError(argument, expected, received);
}

/** The number at `bits`, rounded down: exact or at most one unit too low. */
export function fixedFromExact(x: ExactInput, bits: bigint): bigint {
  const shift = bits - BigInt(x.twos);
  const scaled = shift >= 0n ? x.numerator << shift : x.numerator;
  const divisor = (10n ** BigInt(x.tens)) << (shift < 0n ? -shift : 0n);
  return floorDivide(scaled, divisor);
}

/** ⌊a / b⌋ for b > 0. */
export function floorDivide(a: bigint, b: bigint): bigint {
  const q = a / b;
  return a < 0n && q * b !== a ? q - 1n : q;
}

/** The nearest double or a neighbour of it, for a first look; 0 or ±∞ outside the range. */
export function numberFromExact(x: ExactInput): number {
  const size = bitLength(x.numerator) - x.twos - x.tens * Math.log2(10);
  const bits = BigInt(80 - Math.round(size));
  return numberFromFixed(fixedFromExact(x, bits), bits);
}

/** numerator / denominator in lowest terms, denominator > 0. */
export interface Rational {
  readonly numerator: bigint;
  readonly denominator: bigint;
}

/** The same number as a fraction in lowest terms. */
export function rationalFromExact(x: ExactInput): Rational {
  const denominator = (10n ** BigInt(x.tens)) << BigInt(x.twos);
  let [a, b] = [absolute(x.numerator), denominator];
  while (b !== 0n) [a, b] = [b, a % b];
  return { numerator: x.numerator / a, denominator: denominator / a };
}

/** A decimal number: mantissa · 10^−scale, exactly. `exact`: whether it is the number it came from. */
export interface Decimal {
  readonly mantissa: bigint;
  readonly scale: number;
  readonly exact: boolean;
}

/** a · 2^−bits rounded to `digits` significant decimal digits (to nearest). */
export function decimalFromFixed(a: bigint, bits: bigint, digits: number): Decimal {
  if (a === 0n) return { mantissa: 0n, scale: 0, exact: true };
  const magnitude = absolute(a);
  // Decimal exponent of the leading digit, at first within one.
  let lead = Math.floor((bitLength(magnitude) - 1 - Number(bits)) * Math.LOG10E * Math.LN2);
  for (;;) {
    const scale = digits - 1 - lead;
    const up = scale >= 0 ? magnitude * 10n ** BigInt(scale) : magnitude;
    const down = scale < 0 ? 10n ** BigInt(-scale) : 1n;
    const numerator = bits >= 0n ? 2n * up : (2n * up) << -bits;
    const denominator = bits >= 0n ? down << bits : down;
    const doubled = numerator / denominator;
    const mantissa = (doubled + 1n) >> 1n;
    if (mantissa >= 10n ** BigInt(digits)) {
      lead++;
      continue;
    }
    const exact = (doubled & 1n) === 0n && doubled * denominator === numerator;
    return { mantissa: a < 0n ? -mantissa : mantissa, scale, exact };
  }
}

/** Plain notation where it is short, else scientific. */
export function formatDecimal({ mantissa, scale }: Pick<Decimal, "mantissa" | "scale">): string {
  if (mantissa === 0n) return "0";
  const sign = mantissa < 0n ? "-" : "";
  const text = absolute(mantissa).toString();
  const lead = text.length - 1 - scale; // exponent of the first digit
  if (lead >= -5 && lead < text.length) {
    if (lead < 0) return `${sign}0.${"0".repeat(-lead - 1)}${text}`;
    const whole = text.slice(0, lead + 1);
    const fraction = text.slice(lead + 1);
    return sign + (fraction === "" ? whole : `${whole}.${fraction}`);
  }
  const fraction = text.slice(1);
  return `${sign}${text[0]}${fraction === "" ? "" : `.${fraction}`}e${lead < 0 ? "-" : "+"}${Math.abs(lead)}`;
}

/** A positive number 2^log2 as a short decimal string, rounded up: for errors. */
export function formatErrorBound(log2: number): string {
  if (log2 === Number.NEGATIVE_INFINITY) return "0";
  // The roundings of a large logarithm are covered too.
  const decade = (log2 + Math.abs(log2) * 2 ** -50) * Math.LOG10E * Math.LN2;
  let exponent = Math.floor(decade);
  let lead = Math.ceil(10 * 10 ** (decade - exponent) * (1 + 1e-12) + 1e-9);
  if (lead > 99) {
    lead = 10;
    exponent++;
  }
  return `${(lead / 10).toFixed(1)}e${exponent < 0 ? "-" : "+"}${Math.abs(exponent)}`;
}
