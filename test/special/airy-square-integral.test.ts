import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { InvalidArgumentError } from "../../src/core/errors.ts";
import {
  airyAi,
  airyAiPrime,
  airyAiScaled,
  airyExponent,
  airyPairInto,
  airySquareIntegral,
  airySquareIntegralFrom,
  airySquareIntegralScaled,
} from "../../src/special/airy.ts";
import { airyReference, worstError } from "./airy-reference.ts";
import { integrate } from "./gauss-rule.ts";
import { uniform } from "./uniform.ts";

const rows = airyReference();
const normal = rows.filter((r) => r.square !== undefined && Number(r.square) >= 2.3e-308);

describe("∫_x^∞ Ai²", () => {
  it("−1e10 ≤ x ≤ 65, as far as it is normal: relative error ≤ 1.5e-15", () => {
    const { worst, at, count } = worstError(normal, "square", airySquareIntegral);
    expect(count).toBeGreaterThan(350);
    expect(worst, `at ${at}`).toBeLessThanOrEqual(1.5e-15);
  });

  it("scaled, 0 ≤ x ≤ 1e12: relative error ≤ 1.5e-15", () => {
    const { worst, at, count } = worstError(rows, "squareScaled", airySquareIntegralScaled);
    expect(count).toBeGreaterThan(150);
    expect(worst, `at ${at}`).toBeLessThanOrEqual(1.5e-15);
  });

  it("the formula Ai'² − x Ai² cancels where this does not", () => {
    const direct = (x: number): number => airyAiPrime(x) ** 2 - x * airyAi(x) ** 2;
    const right = normal.filter((r) => r.x > 15);
    expect(right.length).toBeGreaterThan(20);
    expect(worstError(right, "square", direct).worst).toBeGreaterThan(1e-14);
    // Two routes in their overlap: the loss of the direct one is 1 + 4 x^{3/2}.
    for (let x = 0; x <= 2; x += 1 / 64) {
      const loss = 1 + 4 * x * Math.sqrt(x);
      expect(Math.abs(direct(x) / airySquareIntegral(x) - 1)).toBeLessThanOrEqual(1.5e-15 * loss);
    }
  });

  it("from Ai and Ai' at hand: the same bits", () => {
    const x = Float64Array.from(rows.filter((r) => r.ai !== undefined).map((r) => r.x));
    const ai = new Float64Array(x.length);
    const aiPrime = new Float64Array(x.length);
    airyPairInto(x, ai, aiPrime, x.length);
    for (let i = 0; i < x.length; i++) {
      expect(airySquareIntegralFrom(x[i], ai[i], aiPrime[i])).toBe(airySquareIntegral(x[i]));
    }
    expect(airySquareIntegralFrom(30, airyAiScaled(30), 0)).toBe(airySquareIntegralScaled(30));
    expect(airySquareIntegralScaled(-3)).toBe(airySquareIntegral(-3));
  });

  it("its differences are integrals of Ai² by Gauss–Legendre, across every switch", () => {
    fc.assert(
      fc.property(uniform(-50, 60), uniform(0.01, 0.2), (x, width) => {
        const integral = integrate((t) => airyAi(t) ** 2, x, x + width);
        const error = Math.abs(airySquareIntegral(x) - airySquareIntegral(x + width) - integral);
        const moved = airyAi(x) ** 2 * 2 ** -52 * Math.abs(x);
        expect(error).toBeLessThanOrEqual(3e-15 * airySquareIntegral(x) + moved);
      }),
      { seed: 20261201, numRuns: 2000 },
    );
  });

  it("decreases everywhere, and 2√x D(x) < Ai(x)² for x > 0", () => {
    fc.assert(
      fc.property(uniform(-100, 64), uniform(0, 1), (x, step) => {
        const value = airySquareIntegral(x);
        expect(value).toBeGreaterThan(0);
        expect(airySquareIntegral(x + step)).toBeLessThanOrEqual(value * (1 + 2e-15));
        // −Ai'/Ai − √t > 0 decreases, so Ai² = −∫ 2 Ai Ai' > 2 ∫ √t Ai² > 2 √x D.
        if (x > 0) expect(2 * Math.sqrt(x) * value).toBeLessThan(airyAi(x) ** 2 * (1 + 2e-15));
      }),
      { seed: 20261201, numRuns: 2000 },
    );
  });

  it("scaled = plain · e^{2ζ}", () => {
    fc.assert(
      fc.property(uniform(0, 64), (x) => {
        const [head, tail] = airyExponent(x);
        const factor = Math.exp(-head) * (1 - tail);
        expect(
          Math.abs((airySquareIntegralScaled(x) * factor * factor) / airySquareIntegral(x) - 1),
        ).toBeLessThan(3e-15);
      }),
      { seed: 20261201, numRuns: 2000 },
    );
  });

  it("ends of the line", () => {
    expect(airySquareIntegral(Number.NaN)).toBeNaN();
    expect(airySquareIntegralScaled(Number.NaN)).toBeNaN();
    expect(airySquareIntegral(Number.POSITIVE_INFINITY)).toBe(0);
    expect(airySquareIntegralScaled(Number.POSITIVE_INFINITY)).toBe(0);
    expect(airySquareIntegral(Number.NEGATIVE_INFINITY)).toBe(Number.POSITIVE_INFINITY);
    expect(airySquareIntegral(70)).toBe(0);
    expect(airySquareIntegral(66)).toBeGreaterThan(0);
    // Leading term 1/(8πx) of the scaled integral.
    for (const x of [1e20, 1e100, 1e300]) {
      expect(Math.abs(airySquareIntegralScaled(x) * 8 * Math.PI * x - 1)).toBeLessThan(2e-15);
    }
    // Mean density √(−x)/π; the relative correction is of order |x|^{-3/2}.
    for (const x of [-1e6, -1e9, -1e10]) {
      expect(Math.abs((airySquareIntegral(x) * Math.PI) / Math.sqrt(-x) - 1)).toBeLessThan(
        (-x) ** -1.5 + 2e-15,
      );
    }
    expect(() => airySquareIntegral(-2e10)).toThrow(InvalidArgumentError);
    expect(() => airySquareIntegralScaled(-2e10)).toThrow(/^x: /);
  });
});
