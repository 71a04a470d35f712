import { describe, expect, it } from "vitest";
import { andersonDarlingLimitSurvival } from "../../src/assessment/anderson-darling.ts";
import { andersonDarlingDistance, kolmogorovSmirnovDistance } from "../../src/assessment/sample-distances.ts";
import { sampleTest } from "../../src/assessment/sample-test.ts";
import { InvalidDataError } from "../../src/core/errors.ts";
import { seededGenerator } from "../../src/core/random.ts";
import { tracyWidom } from "../../src/laws/tracy-widom.ts";
import fixture from "../fixtures/assessment-tails.json" with { type: "json" };
import { differenceFrom } from "../precise.ts";
import { gumbelLaw } from "../report/gumbel-law.ts";

const gumbel = gumbelLaw();

describe("andersonDarlingLimitSurvival", () => {
  it("keeps its logarithm to 2e-16 of itself, far beyond the range of doubles", () => {
    for (const [x, log] of fixture.andersonDarlingLog as [number, string][]) {
      const found = andersonDarlingLimitSurvival(x);
      const error = Math.abs(differenceFrom(found.log, log));
      expect(error, `x = ${x}`).toBeLessThanOrEqual(found.logError);
      expect(error, `x = ${x}`).toBeLessThan(1e-14 + 2e-16 * x);
      expect(found.error, `x = ${x}`).toBeGreaterThan(0);
    }
  });

  it("is a number for every x ≥ 0", () => {
    for (const x of [0, 5e-324, 1e-310, 1e-5, 0.0099, 0.01, 0.0101]) {
      expect(andersonDarlingLimitSurvival(x).value, `x = ${x}`).toBe(1);
    }
    // P(A² > x) → √(3/(πx)) e^{−x}: the first zero of the determinant alone.
    for (const x of [1e8, 1e100, 1e300]) {
      const expected = -x + 0.5 * Math.log(3 / Math.PI) - 0.5 * Math.log(x);
      expect(andersonDarlingLimitSurvival(x).log / expected, `x = ${x}`).toBeCloseTo(1, 14);
    }
    expect(() => andersonDarlingLimitSurvival(Number.POSITIVE_INFINITY)).toThrow(/x: expected/);
  });
});

describe("distances of a sample", () => {
  it("are those of hand calculation for two observations of a known law", () => {
    const sorted = Float64Array.of(gumbel.quantile(0.2), gumbel.quantile(0.9));
    expect(kolmogorovSmirnovDistance(sorted, gumbel).statistic).toBeCloseTo(0.4, 14);
    // −2 − ½ [log 0.2 + log 0.1 + 3 (log 0.9 + log 0.8)]
    const byHand = -2 - 0.5 * (Math.log(0.2) + Math.log(0.1) + 3 * (Math.log(0.9) + Math.log(0.8)));
    expect(andersonDarlingDistance(sorted, gumbel).statistic).toBeCloseTo(byHand, 13);
  });

  it("have p-values with finite logarithms for a sample wholly on one side of the law", () => {
    const far = Float64Array.of(800, 810, 820, 830, 840);
    const distance = kolmogorovSmirnovDistance(far, gumbel);
    // 1 − D = P(X > 800) = e^−800, and P(D ≥ d) = 2 (1 − d)⁵.
    expect(distance.logPValue).toBeCloseTo(Math.LN2 - 4000, 9);
    expect(distance.logPValueError).toBeLessThan(1e-9);
    for (const law of [tracyWidom(1), tracyWidom(2), tracyWidom(4)]) {
      for (const sample of [
        far,
        Float64Array.of(-900, -100, -50, -40, -30),
        Float64Array.of(-1e70, 1, 2, 3, 1e70),
      ]) {
        for (const test of sampleTest(sample, law).distances) {
          expect(Number.isFinite(test.logPValue), `${law.symbol}, ${test.name}`).toBe(true);
          expect(test.pValueError, `${law.symbol}, ${test.name}`).toBeGreaterThan(0);
        }
      }
    }
  });

  it("have an Anderson–Darling error that covers the finite sample", () => {
    const [n, repeats] = [5, 40_000];
    const generator = seededGenerator(77);
    const points = [0.3, 0.6, 1, 1.6, 2.5, 4];
    const above = points.map(() => 0);
    for (let r = 0; r < repeats; r++) {
      const { statistic } = andersonDarlingDistance(gumbel.sample(n, generator).sort(), gumbel);
      points.forEach((x, i) => {
        if (statistic > x) above[i]++;
      });
    }
    points.forEach((x, i) => {
      const limit = andersonDarlingLimitSurvival(x).value;
      const frequency = above[i] / repeats;
      const noise = 4 * Math.sqrt((limit * (1 - limit)) / repeats);
      const stated = x >= 2 ? Math.min(0.06 / n, (0.3 * x * limit) / n) : 0.06 / n;
      expect(Math.abs(frequency - limit), `x = ${x}`).toBeLessThan(stated + noise);
    });
    // And it is needed: at its worst the difference is beyond noise.
    const middle = points.indexOf(0.6);
    const limit = andersonDarlingLimitSurvival(0.6).value;
    expect(Math.abs(above[middle] / repeats - limit)).toBeGreaterThan(0.3 * (0.06 / n));
  });

  it("state that error", () => {
    const sorted = gumbel.sample(50, seededGenerator(3)).sort();
    const test = andersonDarlingDistance(sorted, gumbel);
    expect(test.statistic).toBeLessThan(2);
    expect(test.pValueError).toBeGreaterThan(0.0599 / 50);
    expect(test.formula).toMatch(/finite sample/);
  });

  it("are refused for numbers all equal or beyond all range", () => {
    expect(() => sampleTest([1, 1, 1, 1, 1], tracyWidom(1))).toThrow(InvalidDataError);
    expect(() => sampleTest([1, 1, 1, 1, 1], tracyWidom(1))).toThrow(/not all equal/);
    expect(() => sampleTest([1, 2, 3, -1e200, 5], tracyWidom(1))).toThrow(/size ≤ 1e\+75/);
  });

  it("leave no moment infinite, however wide the sample", () => {
    for (const row of sampleTest([-1e74, 1, 2, 3, 1e70], tracyWidom(1)).moments) {
      expect(Number.isFinite(row.sample), row.name).toBe(true);
      expect(Number.isFinite(row.z), row.name).toBe(true);
    }
  });
});
