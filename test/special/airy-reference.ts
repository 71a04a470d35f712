/** Reads test/fixtures/airy-reference.json and compares doubles with its 34-digit strings without rounding them. */
import { readFileSync } from "node:fs";

/** One point of the reference; the values there are decimal strings. */
export interface AiryReferenceRow {
  readonly x: number;
  readonly ai?: string;
  readonly aiPrime?: string;
  readonly integral?: string;
  readonly square?: string;
  readonly aiScaled?: string;
  readonly aiPrimeScaled?: string;
  readonly integralScaled?: string;
  readonly squareScaled?: string;
  readonly modulus?: number;
  readonly modulusPrime?: number;
}

/** Names of the tabulated functions. */
export type AiryColumn = Exclude<keyof AiryReferenceRow, "x" | "modulus" | "modulusPrime">;

export function airyReference(): readonly AiryReferenceRow[] {
  const text = readFileSync(new URL("../fixtures/airy-reference.json", import.meta.url), "utf8");
  return (JSON.parse(text) as { rows: AiryReferenceRow[] }).rows;
}

/** value = mantissa · 2^exponent. */
export function exactParts(value: number): { mantissa: bigint; exponent: number } {
  let mantissa = value;
  let exponent = 0;
  while (!Number.isInteger(mantissa)) {
    // Doubling is exact; a subnormal takes 1074 steps.
    mantissa *= 2;
    exponent -= 1;
  }
  return { mantissa: BigInt(mantissa), exponent };
}

/** (value − reference) / |reference| by integer arithmetic, the reference a decimal string other than 0. */
export function relativeError(value: number, reference: string): number {
  if (!Number.isFinite(value)) return Number.NaN;
  const [digits, power = "0"] = reference.split("e");
  const [whole, fraction = ""] = digits.split(".");
  let expected = BigInt(whole + fraction);
  const ten = Number(power) - fraction.length;
  const { mantissa, exponent } = exactParts(value);
  let received = mantissa;
  if (ten >= 0) expected *= 10n ** BigInt(ten);
  else received *= 10n ** BigInt(-ten);
  expected *= 2n ** BigInt(-exponent);
  const size = expected < 0n ? -expected : expected;
  return Number(((received - expected) << 160n) / size) / 2 ** 160;
}

/** The largest and the root-mean-square |error| of `compute` over the rows that have the column, relative to `scale`, and where. */
export function worstError(
  rows: readonly AiryReferenceRow[],
  column: AiryColumn,
  compute: (x: number) => number,
  scale: (row: AiryReferenceRow, reference: number) => number = (_row, reference) => Math.abs(reference),
): { worst: number; at: number; rms: number; count: number } {
  let worst = 0;
  let squares = 0;
  let at = Number.NaN;
  let count = 0;
  for (const row of rows) {
    const reference = row[column];
    if (reference === undefined) continue;
    count += 1;
    const size = Math.abs(Number(reference));
    const error = Math.abs(relativeError(compute(row.x), reference)) * (size / scale(row, size));
    squares += error * error;
    if (!(error <= worst)) {
      worst = error;
      at = row.x;
    }
  }
  return { worst, at, rms: Math.sqrt(squares / count), count };
}
