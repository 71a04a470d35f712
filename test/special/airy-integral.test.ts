import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { InvalidArgumentError } from "../../src/core/errors.ts";
import {
  airyAi,
  airyAiIntegral,
  airyAiIntegralScaled,
  airyAiPrime,
  airyExponent,
} from "../../src/special/airy.ts";
import { airyReference, worstError } from "./airy-reference.ts";
import { integrate } from "./gauss-rule.ts";
import { uniform } from "./uniform.ts";

const rows = airyReference();

describe("∫_x^∞ Ai", () => {
  it("x ≥ 0, to where it is subnormal: relative error ≤ 6e-16", () => {
    const { worst, at, count } = worstError(
      rows.filter((r) => r.x >= 0),
      "integral",
      airyAiIntegral,
    );
    expect(count).toBeGreaterThan(150);
    expect(worst, `at ${at}`).toBeLessThanOrEqual(6e-16);
  });

  it("−1e10 ≤ x < 0: absolute error ≤ 3e-16", () => {
    const left = rows.filter((r) => r.x < 0);
    const { worst, at, count } = worstError(left, "integral", airyAiIntegral, () => 1);
    expect(count).toBeGreaterThan(200);
    expect(worst, `at ${at}`).toBeLessThanOrEqual(3e-16);
  });

  it("−20 ≤ x ≤ 20, sums and products only: root-mean-square error ≤ 5.8e-17", () => {
    const inner = rows.filter((r) => r.x >= -20 && r.x <= 20);
    const { rms, count } = worstError(inner, "integral", airyAiIntegral, (row, size) =>
      row.x < 0 ? 1 : size,
    );
    expect(count).toBeGreaterThan(400);
    expect(rms).toBeLessThanOrEqual(5.8e-17);
  });

  it("scaled, 0 ≤ x ≤ 1e12: relative error ≤ 6e-16", () => {
    const { worst, at, count } = worstError(rows, "integralScaled", airyAiIntegralScaled);
    expect(count).toBeGreaterThan(150);
    expect(worst, `at ${at}`).toBeLessThanOrEqual(6e-16);
  });

  it("1/3 at 0, 1 in all (DLMF 9.10, from memory), and the other ends", () => {
    expect(airyAiIntegral(0)).toBe(1 / 3);
    expect(airyAiIntegral(Number.NEGATIVE_INFINITY)).toBe(1);
    expect(airyAiIntegral(Number.POSITIVE_INFINITY)).toBe(0);
    expect(airyAiIntegralScaled(Number.POSITIVE_INFINITY)).toBe(0);
    expect(airyAiIntegralScaled(Number.NEGATIVE_INFINITY)).toBe(1);
    expect(airyAiIntegral(1e9)).toBe(0);
  });

  it("passes NaN through and throws where the phase is lost", () => {
    expect(airyAiIntegral(Number.NaN)).toBeNaN();
    expect(airyAiIntegralScaled(Number.NaN)).toBeNaN();
    expect(() => airyAiIntegral(-2e10)).toThrow(InvalidArgumentError);
    expect(() => airyAiIntegralScaled(-2e10)).toThrow(/^x: expected a number ≥ -10000000000/);
  });

  it("its differences are integrals of Ai by Gauss–Legendre, across every switch", () => {
    fc.assert(
      fc.property(uniform(-50, 100), uniform(0.01, 0.3), (x, width) => {
        const integral = integrate(airyAi, x, x + width);
        const size = x > 0 ? airyAiIntegral(x) : 1;
        const error = Math.abs(airyAiIntegral(x) - airyAiIntegral(x + width) - integral);
        // The rounding of x + width moves the integral by Ai(x) half a unit in the last place of x.
        const moved = Math.abs(airyAi(x)) * 2 ** -52 * Math.abs(x) + 1e-300;
        expect(error).toBeLessThanOrEqual(2e-15 * size + moved);
      }),
      { seed: 20261201, numRuns: 2000 },
    );
  });

  it("scaled = plain · e^ζ", () => {
    fc.assert(
      fc.property(uniform(0, 100), (x) => {
        const [head, tail] = airyExponent(x);
        const plain = airyAiIntegralScaled(x) * Math.exp(-head) * (1 - tail);
        expect(Math.abs(plain / airyAiIntegral(x) - 1)).toBeLessThanOrEqual(1.5e-15);
      }),
      { seed: 20261201, numRuns: 2000 },
    );
  });

  it("decreases for x above the first zero of Ai, with bounds 0 < ∫ < −Ai'(x)/x for x > 0", () => {
    fc.assert(
      fc.property(uniform(-2.3, 100), uniform(1e-12, 1), (x, step) => {
        expect(airyAiIntegral(x + step)).toBeLessThan(airyAiIntegral(x) * (1 + 1e-15));
        // ∫_x^∞ Ai = ∫ Ai″/t dt < (1/x) ∫ Ai″ = −Ai'(x)/x.
        if (x > 1e-9) expect(airyAiIntegral(x)).toBeLessThan((-airyAiPrime(x) / x) * (1 + 1e-15));
        expect(airyAiIntegral(x)).toBeGreaterThan(0);
      }),
      { seed: 20261201, numRuns: 2000 },
    );
  });
});
