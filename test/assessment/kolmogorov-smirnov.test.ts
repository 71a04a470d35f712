import { describe, expect, it } from "vitest";
import { kolmogorovFarSurvival, kolmogorovSurvival } from "../../src/assessment/kolmogorov-smirnov.ts";
import { doubledSmirnovSurvival } from "../../src/assessment/kolmogorov-tail.ts";
import fixture from "../fixtures/assessment-tails.json" with { type: "json" };
import { differenceFrom, relativeDifference } from "../precise.ts";

describe("kolmogorovSurvival", () => {
  const body = fixture.kolmogorovBody as [number, number, string][];
  const tail = fixture.kolmogorovTail as [number, number, string][];
  const large = fixture.kolmogorovLarge as [number, number, number][];

  it("is off by no more than it says, and by 5e-11 relative, for n ≤ 200", () => {
    expect(body.length).toBeGreaterThan(50);
    for (const [n, d, value] of body) {
      const found = kolmogorovSurvival(n, d);
      const name = `n = ${n}, d = ${d}`;
      expect(Math.abs(differenceFrom(found.value, value)), name).toBeLessThanOrEqual(found.error);
      expect(Math.abs(relativeDifference(found.value, value)), name).toBeLessThan(5e-11);
    }
  });

  it("keeps its logarithm in the tail, within and beyond the range of doubles, d ≥ ½ included", () => {
    expect(tail.length).toBeGreaterThan(50);
    let least = 0;
    for (const [n, d, log] of tail) {
      const found = kolmogorovSurvival(n, d);
      const name = `n = ${n}, d = ${d}`;
      least = Math.min(least, found.log);
      expect(Math.abs(differenceFrom(found.log, log)), name).toBeLessThanOrEqual(found.logError);
      expect(found.logError, name).toBeLessThan(1e-13 + 4e-15 * Math.abs(found.log));
      expect(found.error, name).toBeGreaterThan(0);
    }
    expect(least).toBeLessThan(-1800);
  });

  // The expansion for large n: an error of the next lower order, 1/n, would be 1e-6 and more here.
  it("is off by no more than it says, 0.1/n², for n > 2000", () => {
    for (const [n, d, value] of large) {
      const found = kolmogorovSurvival(n, d);
      expect(found.error, `n = ${n}`).toBeLessThan(0.11 / n ** 2);
      expect(Math.abs(found.value - value), `n = ${n}, d = ${d}`).toBeLessThanOrEqual(found.error);
    }
  });

  it("counts samples that deviate on both sides by no more than 3 exp(−8 n d²)", () => {
    let most = 0;
    for (const [n, d, value] of body) {
      const twice = doubledSmirnovSurvival(n, d, Math.log1p(-d)).value;
      if (twice >= 1 || n * d * d > 3.6) continue; // clipped; or too small beside the rounding of `twice`
      most = Math.max(most, differenceFrom(twice, value) / Math.exp(-8 * n * d * d));
    }
    expect(most).toBeGreaterThan(1);
    expect(most).toBeLessThan(2);
  });

  it("joins its routes: the two sides of every switch agree within their errors", () => {
    for (const n of [50, 500, 2000, 2001, 30_000, 1e6, 1e9]) {
      let before = kolmogorovSurvival(n, 1.4 / Math.sqrt(n));
      for (let x = 1.41; x < 2.6 && x < 0.49 * Math.sqrt(n); x += 0.01) {
        const here = kolmogorovSurvival(n, x / Math.sqrt(n));
        // log P falls by about 4x · 0.01 and its slope changes slowly: no jump beyond the errors.
        const step = here.log - before.log;
        expect(step, `n = ${n}, x = ${x}`).toBeLessThan(-0.03);
        expect(step, `n = ${n}, x = ${x}`).toBeGreaterThan(-0.16);
        before = here;
      }
    }
    // A limit known in closed form: n → ∞ at fixed x, 2 Σ (−1)^{k−1} exp(−2k²x²); its distance is of order 1/√n.
    const limit = (x: number): number =>
      2 * [1, 2, 3, 4, 5].reduce((sum, k) => sum - (-1) ** k * Math.exp(-2 * k * k * x * x), 0);
    for (const x of [0.8, 1.2, 1.9, 2.2, 3]) {
      expect(kolmogorovSurvival(1e9, x / Math.sqrt(1e9)).value / limit(x)).toBeCloseTo(1, 3);
    }
  });

  it("has closed forms at n = 1: P(D ≥ d) = 2 (1 − d), also for distances next to 1", () => {
    expect(kolmogorovSurvival(1, 0.75).value).toBeCloseTo(0.5, 14);
    const far = kolmogorovFarSurvival(1, -900);
    expect(far.log).toBeCloseTo(Math.LN2 - 900, 10);
    expect(far.value).toBe(0);
    expect(far.error).toBeGreaterThan(0);
    expect(kolmogorovFarSurvival(7, -900).log).toBeCloseTo(Math.LN2 - 6300, 9);
  });

  it("refuses bad arguments", () => {
    expect(() => kolmogorovSurvival(1.5, 0.5)).toThrow(/n: expected an integer/);
    expect(() => kolmogorovSurvival(10, Number.NaN)).toThrow(/d: expected/);
    expect(() => kolmogorovFarSurvival(10, -0.1)).toThrow(/logComplement: expected/);
  });
});
