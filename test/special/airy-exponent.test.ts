import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { airyExponent } from "../../src/special/airy.ts";
import { exactParts } from "./airy-reference.ts";
import { uniform } from "./uniform.ts";

/** 9 (head + tail)² / (4 x³) − 1 by integer arithmetic: twice the relative error of the exponent. */
function squaredError(x: number): number {
  const [head, tail] = airyExponent(x).map(exactParts);
  const place = Math.min(head.exponent, tail.exponent);
  const sum =
    (head.mantissa << BigInt(head.exponent - place)) + (tail.mantissa << BigInt(tail.exponent - place));
  const { mantissa, exponent } = exactParts(x);
  const square = 9n * sum * sum;
  const cube = 4n * mantissa ** 3n;
  const shift = 2 * place - 3 * exponent; // square · 2^{2 place} against cube · 2^{3 exponent}
  const a = shift > 0 ? square << BigInt(shift) : square;
  const b = shift < 0 ? cube << BigInt(-shift) : cube;
  return Number(((a - b) << 200n) / b) / 2 ** 200;
}

describe("airyExponent", () => {
  it("is (2/3) x^{3/2} to 2^-100, by exact arithmetic", () => {
    fc.assert(
      fc.property(uniform(-20, 20), (power) => {
        const x = 2 ** power;
        expect(Math.abs(squaredError(x))).toBeLessThanOrEqual(2 ** -99);
        const [head, tail] = airyExponent(x);
        expect(Math.abs(tail)).toBeLessThanOrEqual(2 ** -51 * head);
      }),
      { seed: 20261201, numRuns: 3000 },
    );
    for (const x of [20, 50, 100, 103, 1e10, 1e15])
      expect(Math.abs(squaredError(x))).toBeLessThanOrEqual(2 ** -99);
  });

  it("makes exp(−ζ) good to the last place at ζ = 667 where the head alone is not", () => {
    // e^{−2000/3} = 2.95355728026610045e-290 (mpmath 1.3, 40 digits).
    const expected = Number("2.95355728026610045e-290");
    const [head, tail] = airyExponent(100);
    expect(Math.abs((Math.exp(-head) * (1 - tail)) / expected - 1)).toBeLessThan(4e-16);
    expect(Math.abs(Math.exp(-head) / expected - 1)).toBeGreaterThan(1e-15);
  });

  it("is exact, 0, infinite or NaN where it should be", () => {
    expect(airyExponent(9)).toEqual([18, 0]);
    expect(airyExponent(0)).toEqual([0, 0]);
    expect(airyExponent(-3)).toEqual([0, 0]);
    expect(airyExponent(Number.NEGATIVE_INFINITY)).toEqual([0, 0]);
    expect(airyExponent(Number.POSITIVE_INFINITY)).toEqual([Number.POSITIVE_INFINITY, 0]);
    expect(airyExponent(1e300)).toEqual([Number.POSITIVE_INFINITY, 0]);
    expect(airyExponent(Number.NaN)).toEqual([Number.NaN, Number.NaN]);
    expect(airyExponent(1e-300).every(Number.isFinite)).toBe(true);
  });
});
