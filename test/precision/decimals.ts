/** Decimal strings as exact numbers, the reference table, and comparison without rounding. */
import { readFileSync } from "node:fs";

/** mantissa · 10^−scale. */
export interface ExactDecimal {
  readonly mantissa: bigint;
  readonly scale: number;
}

export function parse(text: string): ExactDecimal {
  const match = /^([+-]?)(\d+)(?:\.(\d*))?(?:e([+-]?\d+))?$/.exec(text);
  if (!match) throw new Error(`not a decimal number: ${text}`);
  const [, sign, whole, fraction = "", power = "0"] = match;
  return { mantissa: BigInt(`${sign}${whole}${fraction}`), scale: fraction.length - Number(power) };
}

/** |a − b| as a decimal number. */
export function distance(a: ExactDecimal, b: ExactDecimal): ExactDecimal {
  const scale = Math.max(a.scale, b.scale);
  const at = (c: ExactDecimal): bigint => c.mantissa * 10n ** BigInt(scale - c.scale);
  const difference = at(a) - at(b);
  return { mantissa: difference < 0n ? -difference : difference, scale };
}

export function add(a: ExactDecimal, b: ExactDecimal): ExactDecimal {
  return distance(a, { mantissa: -b.mantissa, scale: b.scale });
}

/** |a| ≤ |b|. */
export function atMost(a: ExactDecimal, b: ExactDecimal): boolean {
  const scale = Math.max(a.scale, b.scale);
  const at = (c: ExactDecimal): bigint =>
    (c.mantissa < 0n ? -c.mantissa : c.mantissa) * 10n ** BigInt(scale - c.scale);
  return at(a) <= at(b);
}

/** |a| · 10^−power. */
export function shifted(a: ExactDecimal, power: number): ExactDecimal {
  return { mantissa: a.mantissa < 0n ? -a.mantissa : a.mantissa, scale: a.scale + power };
}

/** One row of test/fixtures/precise-functions.json. */
export interface PreciseRow {
  readonly f: string;
  readonly args: readonly (string | number)[];
  readonly digits: number;
  readonly value: string;
}

export function preciseReference(): readonly PreciseRow[] {
  const text = readFileSync(new URL("../fixtures/precise-functions.json", import.meta.url), "utf8");
  return (JSON.parse(text) as { rows: PreciseRow[] }).rows;
}

/** The reference value and half a unit of its last digit. */
export function referenceOf(row: PreciseRow): { value: ExactDecimal; unit: ExactDecimal } {
  const value = parse(row.value);
  return { value, unit: { mantissa: 1n, scale: value.scale } };
}
