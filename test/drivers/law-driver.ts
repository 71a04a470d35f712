/**
 * What every law must pass, whatever it is. A law's own test file adds its reference values.
 */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { InvalidArgumentError } from "../../src/core/errors.ts";
import { seededGenerator } from "../../src/core/random.ts";
import type { Law, LawQuantity } from "../../src/laws/law.ts";
import { differenceFrom, relativeDifference } from "../precise.ts";

/** Reference values of a law, decimal strings. */
export interface LawReference {
  readonly grid: readonly {
    readonly x: string;
    readonly cdf: string;
    readonly survival: string;
    readonly pdf: string;
    readonly logCdf: string;
  }[];
  readonly moments: {
    readonly mean: string;
    readonly variance: string;
    readonly skewness: string;
    readonly excessKurtosis: string;
    readonly cumulants: readonly string[];
  };
  readonly lowerQuantiles: Readonly<Record<string, string>>;
  readonly upperQuantiles: Readonly<Record<string, string>>;
}

const POINTWISE = ["pdf", "cdf", "survival", "logPdf", "logCdf", "logSurvival"] as const;
const settings = { seed: 20261201, numRuns: 300 };

/** Runs the whole driver on a law. */
export function driveLaw(law: Law, reference: LawReference): void {
  describe(`${law.name}: the law driver`, () => {
    const [start, end] = [law.quantile(1e-12), law.upperQuantile(1e-12)];
    const bulk = fc.double({ min: start, max: end, noNaN: true });
    const wide = fc.double({ min: start - 4 * (end - start), max: end + 4 * (end - start), noNaN: true });

    it("describes itself", () => {
      for (const text of [law.name, law.symbol, ...Object.values(law.provenance)])
        expect(text.length).toBeGreaterThan(1);
      for (const figure of Object.values(law.accuracy)) expect(figure).toBeLessThanOrEqual(1e-12);
    });

    it("keeps its stated accuracy at every reference point, in both tails", () => {
      const { accuracy } = law;
      expect(reference.grid.length).toBeGreaterThan(20);
      for (const row of reference.grid) {
        const x = Number(row.x);
        const where = `${law.symbol} at ${row.x}`;
        expect(Math.abs(differenceFrom(law.cdf(x), row.cdf)), `cdf ${where}`).toBeLessThanOrEqual(
          accuracy.cdfAbsolute,
        );
        expect(Math.abs(differenceFrom(law.pdf(x), row.pdf)), `pdf ${where}`).toBeLessThanOrEqual(
          accuracy.pdfAbsolute,
        );
        if (Number(row.survival) > 1e-300) {
          const error = Math.abs(relativeDifference(law.survival(x), row.survival));
          expect(error, `survival ${where}`).toBeLessThanOrEqual(accuracy.survivalRelative);
          const log = Math.log(Number(row.survival));
          const logError = Math.abs(law.logSurvival(x) - log) / Math.max(1, Math.abs(log));
          if (Number(row.survival) < 0.5) expect(logError, `logSurvival ${where}`).toBeLessThanOrEqual(4e-15);
        }
        if (Number(row.cdf) > 1e-300) {
          const error = Math.abs(relativeDifference(law.cdf(x), row.cdf));
          expect(error, `cdf relative ${where}`).toBeLessThanOrEqual(accuracy.cdfRelative);
          const density = Math.abs(relativeDifference(law.pdf(x), row.pdf));
          expect(density, `pdf relative ${where}`).toBeLessThanOrEqual(2 * accuracy.cdfRelative);
        }
        const logCdf = Number(row.logCdf);
        if (logCdf < -0.5) {
          const error = Math.abs(differenceFrom(law.logCdf(x), row.logCdf)) / Math.max(1, Math.abs(logCdf));
          expect(error, `logCdf ${where}`).toBeLessThanOrEqual(2e-14);
        }
      }
    });

    it("states honest errors by the exact route at every reference point", () => {
      for (const row of reference.grid) {
        const x = Number(row.x);
        for (const what of ["cdf", "survival", "pdf"] as const) {
          if (Number(row[what]) < 1e-300) continue;
          const found = law.estimate(what, x);
          const error = Math.abs(differenceFrom(found.value, row[what]));
          expect(error, `${what} at ${row.x}: ${found.value} ± ${found.error}`).toBeLessThanOrEqual(
            found.error,
          );
          expect(found.error, `${what} at ${row.x}`).toBeLessThanOrEqual(1e-12 * Math.max(found.value, 1e-3));
        }
        const log = law.estimate("logCdf", x);
        expect(Math.abs(differenceFrom(log.value, row.logCdf)), `logCdf at ${row.x}`).toBeLessThanOrEqual(
          log.error,
        );
      }
    });

    it("has the reference moments, to 1e-12", () => {
      const { moments } = reference;
      expect(Math.abs(differenceFrom(law.mean, moments.mean))).toBeLessThan(1e-12);
      expect(Math.abs(differenceFrom(law.variance, moments.variance))).toBeLessThan(1e-12);
      expect(Math.abs(differenceFrom(law.skewness, moments.skewness))).toBeLessThan(1e-12);
      expect(Math.abs(differenceFrom(law.excessKurtosis, moments.excessKurtosis))).toBeLessThan(1e-12);
      moments.cumulants.forEach((cumulant, i) => {
        expect(Math.abs(differenceFrom(law.cumulant(i + 1), cumulant)), `cumulant ${i + 1}`).toBeLessThan(
          1e-12,
        );
      });
    });

    it("has the same mean and variance from its survival function (a second route)", () => {
      // E X = ∫_0^∞ S − ∫_{−∞}^0 F, E X² = 2 ∫_0^∞ x S − 2 ∫_{−∞}^0 x F, by the trapezoidal rule.
      const h = law.variance ** 0.5 / 32;
      let [first, second] = [0, 0];
      for (let k = -3000; k <= 3000; k++) {
        if (k === 0) continue;
        const x = k * h;
        const p = x > 0 ? law.survival(x) : -law.cdf(x);
        first += h * p;
        second += 2 * h * x * p;
      }
      // End corrections at 0 of both half-line rules (Euler–Maclaurin): h/2 (S(0) − F(0)), and h²/6 for the slope.
      first += (h / 2) * (law.survival(0) - law.cdf(0));
      expect(Math.abs(first - law.mean)).toBeLessThan(1e-5);
      expect(Math.abs(second + (h * h) / 6 - (law.variance + law.mean ** 2))).toBeLessThan(1e-5);
    });

    it("has the reference quantiles, to 1e-13", () => {
      const lower = Object.entries(reference.lowerQuantiles);
      const upper = Object.entries(reference.upperQuantiles);
      expect(lower.length + upper.length).toBeGreaterThan(20);
      for (const [p, x] of lower) {
        expect(Math.abs(differenceFrom(law.quantile(Number(p)), x)), `quantile(${p})`).toBeLessThan(1e-13);
        const exact = law.estimate("quantile", Number(p));
        expect(Math.abs(differenceFrom(exact.value, x)), `estimate quantile(${p})`).toBeLessThanOrEqual(
          exact.error,
        );
      }
      for (const [q, x] of upper) {
        expect(Math.abs(differenceFrom(law.upperQuantile(Number(q)), x)), `upperQuantile(${q})`).toBeLessThan(
          1e-13,
        );
        const exact = law.estimate("upperQuantile", Number(q));
        expect(Math.abs(differenceFrom(exact.value, x)), `estimate upperQuantile(${q})`).toBeLessThanOrEqual(
          exact.error,
        );
      }
    });

    it("comes back from quantiles, down to 1e-300 in both tails", () => {
      fc.assert(
        fc.property(fc.double({ min: -300, max: -0.31, noNaN: true }), (exponent) => {
          const p = 10 ** exponent;
          // A rounding of x moves log F by |x| f/F roundings.
          const allowed = (x: number, slope: number): number => 1e-13 + 2 ** -52 * Math.abs(x) * slope;
          const low = law.quantile(p);
          const lowSlope = Math.exp(law.logPdf(low) - law.logCdf(low));
          expect(Math.abs(law.cdf(low) / p - 1)).toBeLessThan(allowed(low, lowSlope));
          const high = law.upperQuantile(p);
          const highSlope = Math.exp(law.logPdf(high) - law.logSurvival(high));
          expect(Math.abs(law.survival(high) / p - 1)).toBeLessThan(allowed(high, highSlope));
        }),
        settings,
      );
    });

    it("comes back from quantiles of logarithms, far beyond the smallest double", () => {
      fc.assert(
        fc.property(fc.double({ min: -18, max: 15, noNaN: true }), (exponent) => {
          const log = -(10 ** exponent);
          // A rounding of x moves the logarithm by its slope; close to 0 the logarithm is minus the other tail.
          const low = law.quantileFromLog(log);
          const lowSlope = Math.exp(law.logPdf(low) - law.logCdf(low));
          const lowAllowed = 1e-13 * Math.abs(log) + 2 ** -51 * Math.abs(low) * lowSlope;
          expect(Math.abs(law.logCdf(low) - log)).toBeLessThan(lowAllowed);
          const high = law.upperQuantileFromLog(log);
          const highSlope = Math.exp(law.logPdf(high) - law.logSurvival(high));
          const highAllowed = 1e-13 * Math.abs(log) + 2 ** -51 * Math.abs(high) * highSlope;
          expect(Math.abs(law.logSurvival(high) - log)).toBeLessThan(highAllowed);
        }),
        settings,
      );
      expect(law.quantileFromLog(Number.NaN)).toBeNaN();
      expect(law.upperQuantileFromLog(Math.log(1e-200))).toBeCloseTo(law.upperQuantile(1e-200), 10);
    });

    it("is a distribution: cdf + survival = 1, cdf increases, logarithms fit, everywhere", () => {
      fc.assert(
        fc.property(wide, fc.double({ min: 1e-6, max: 1, noNaN: true }), (x, step) => {
          expect(Math.abs(law.cdf(x) + law.survival(x) - 1)).toBeLessThan(1.2e-15);
          expect(law.cdf(x + step)).toBeGreaterThanOrEqual(law.cdf(x));
          expect(law.survival(x + step)).toBeLessThanOrEqual(law.survival(x));
          expect(law.pdf(x)).toBeGreaterThanOrEqual(0);
          for (const [log, plain] of [
            ["logCdf", "cdf"],
            ["logSurvival", "survival"],
            ["logPdf", "pdf"],
          ] as const) {
            const value = law[plain](x);
            if (value > 1e-290) expect(Math.abs(Math.exp(law[log](x)) / value - 1)).toBeLessThan(3e-13);
            expect(Number.isNaN(law[log](x))).toBe(false);
          }
        }),
        settings,
      );
    });

    it("has its density as the derivative of its cdf, and of its survival function", () => {
      fc.assert(
        fc.property(bulk, (x) => {
          const h = (end - start) * 2e-4;
          const slope = (f: (x: number) => number): number =>
            (45 * (f(x + h) - f(x - h)) - 9 * (f(x + 2 * h) - f(x - 2 * h)) + (f(x + 3 * h) - f(x - 3 * h))) /
            (60 * h);
          const byCdf = slope((t) => law.logCdf(t)) * law.cdf(x);
          expect(Math.abs(byCdf - law.pdf(x))).toBeLessThan(1e-11);
          const bySurvival = -slope((t) => law.logSurvival(t)) * law.survival(x);
          expect(Math.abs(bySurvival / law.pdf(x) - 1)).toBeLessThan(1e-9);
        }),
        { ...settings, numRuns: 100 },
      );
    });

    it("agrees with its exact route", () => {
      fc.assert(
        fc.property(bulk, fc.constantFrom<LawQuantity>(...POINTWISE), (x, what) => {
          const exact = law.estimate(what, x);
          const fast = (law[what as keyof Law] as (x: number) => number)(x);
          expect(Math.abs(fast - exact.value)).toBeLessThan(
            exact.error + 2e-13 * Math.max(1e-3, Math.abs(exact.value)),
          );
        }),
        { ...settings, numRuns: 120 },
      );
    });

    it("gives no NaN for any finite number, limits at infinity, NaN for NaN", () => {
      fc.assert(
        fc.property(fc.double({ min: -1e5, max: 1e5, noNaN: true }), (x) => {
          for (const what of POINTWISE) expect(Number.isNaN(law[what](x)), `${what}(${x})`).toBe(false);
        }),
        settings,
      );
      for (const what of POINTWISE) expect(law[what](Number.NaN)).toBeNaN();
      expect([law.cdf(Number.POSITIVE_INFINITY), law.survival(Number.POSITIVE_INFINITY)]).toEqual([1, 0]);
      expect([law.cdf(Number.NEGATIVE_INFINITY), law.survival(Number.NEGATIVE_INFINITY)]).toEqual([0, 1]);
      expect(law.logCdf(Number.NEGATIVE_INFINITY)).toBe(Number.NEGATIVE_INFINITY);
      expect(law.logSurvival(Number.POSITIVE_INFINITY)).toBe(Number.NEGATIVE_INFINITY);
      expect([law.pdf(Number.NEGATIVE_INFINITY), law.pdf(Number.POSITIVE_INFINITY)]).toEqual([0, 0]);
      expect(law.quantile(Number.NaN)).toBeNaN();
    });

    it("fills arrays with the same numbers, in place too", () => {
      const x = Float64Array.from({ length: 50 }, (_, i) => start + ((end - start) * i) / 49);
      const p = Float64Array.from({ length: 50 }, (_, i) => (i + 0.5) / 50);
      for (const what of [...POINTWISE, "quantile", "upperQuantile"] as const) {
        const arguments_ = what === "quantile" || what === "upperQuantile" ? p : x;
        const out = arguments_.slice();
        law[`${what}Into`](out, out);
        expect(Array.from(out)).toEqual(Array.from(arguments_, (t) => law[what](t)));
      }
    });

    it("samples itself: binned counts and moments, same seed same draws", () => {
      const count = 20_000;
      const draws = law.sample(count, seededGenerator(5));
      expect(Array.from(law.sample(10, seededGenerator(5)))).toEqual(Array.from(draws.subarray(0, 10)));
      const bins = new Array<number>(20).fill(0);
      let mean = 0;
      for (const x of draws) {
        bins[Math.min(19, Math.floor(20 * law.cdf(x)))]++;
        mean += x / count;
      }
      let chiSquare = 0;
      for (const found of bins) chiSquare += (found - count / 20) ** 2 / (count / 20);
      // 19 degrees of freedom: 43.8 is the 0.999 point (common tables); the seed is fixed.
      expect(chiSquare).toBeLessThan(43.8);
      expect(Math.abs(mean - law.mean)).toBeLessThan(4 * Math.sqrt(law.variance / count));
    });

    it("refuses bad arguments", () => {
      for (const p of [0, 1, -0.1, 1.1, Number.POSITIVE_INFINITY]) {
        expect(() => law.quantile(p)).toThrow(/p: expected a probability strictly between 0 and 1/);
        expect(() => law.upperQuantile(p)).toThrow(/q: expected a probability/);
        expect(() => law.estimate("quantile", p)).toThrow(InvalidArgumentError);
      }
      for (const log of [0, 1, -1e16, Number.NEGATIVE_INFINITY, "a" as unknown as number]) {
        expect(() => law.quantileFromLog(log)).toThrow(/logProbability: expected a logarithm/);
        expect(() => law.upperQuantileFromLog(log)).toThrow(/logProbability: expected a logarithm/);
      }
      for (const k of [0, 7, 1.5, Number.NaN])
        expect(() => law.cumulant(k)).toThrow(/k: expected an integer from 1 to 6/);
      expect(() => law.sample(-1, seededGenerator(1))).toThrow(/count/);
      expect(() => law.sample(1, 7 as unknown as () => number)).toThrow(/generator/);
      expect(() => law.sample(1, () => 1)).toThrow(/generator\(\)/);
      expect(() => law.estimate("mode" as LawQuantity, 0)).toThrow(/what/);
      expect(() => law.estimate("cdf", Number.NaN)).toThrow(/x: expected/);
      expect(() => law.cdfInto(new Float64Array(3), new Float64Array(2))).toThrow(/out/);
      expect(() => law.cdfInto([1] as unknown as Float64Array, new Float64Array(1))).toThrow(/x/);
    });

    it("says when a tolerance is missed", () => {
      const x = law.mean;
      expect(law.estimate("cdf", x, { relTol: 1e-10 }).converged).toBe(true);
      expect(law.estimate("cdf", x, { relTol: 1e-17 }).converged).toBe(false);
      expect(law.estimate("quantile", 0.3, { absTol: 1e-17 }).converged).toBe(false);
    });
  });
}
