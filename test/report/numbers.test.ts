/** Display rounding: never more digits than the error supports, errors never understated, probabilities never 0. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { InvalidArgumentError } from "../../src/core/errors.ts";
import {
  formatError,
  formatErrorFromLog,
  formatFromLog,
  formatProbability,
  formatValue,
  fullDigits,
} from "../../src/report/numbers.ts";

const SEED = { seed: 20261201, numRuns: 4000 };

/** Size of one unit of the last printed digit, from the text alone. */
function lastUnit(text: string): number {
  const match = /^-?(\d+)(?:\.(\d+))?(?:e(-?\d+))?$/.exec(text);
  if (match === null) throw new Error(`not a decimal: ${text}`);
  return Number(`1e${Number(match[3] ?? 0) - (match[2] ?? "").length}`);
}

/** Numbers and errors over the whole range of doubles, errors mostly in sight of the number. */
const valueAndError = fc
  .tuple(
    fc.double({ min: 1, max: 10, maxExcluded: true, noNaN: true }),
    fc.integer({ min: -280, max: 280 }),
    fc.boolean(),
    fc.double({ min: 1, max: 10, noNaN: true }),
    fc.integer({ min: -20, max: 3 }),
  )
  .map(([m, e, negative, em, shift]) => ({
    value: Number(`${m}e${e}`) * (negative ? -1 : 1),
    error: em * 10 ** shift * Number(`1e${e}`),
  }));

describe("formatValue", () => {
  it.each([
    [0.9793160535, 1e-14, 10, "0.9793160535"],
    [0.9793160535, 3e-6, 10, "0.97932"],
    [0.9793160535, 1e-6, 10, "0.979316"],
    [-3.8954326731, 1e-13, 4, "-3.895"],
    [12345, 20, 10, "1.23e4"],
    [1.2e-20, 1e-16, 10, "0"],
    [0.7, 1, 10, "1"],
    [0.007, 0.01, 10, "0.01"],
    [-0.002, 0.01, 10, "0"],
    [2.5e-9, 1e-12, 10, "2.500e-9"],
    [9.9996, 1e-3, 10, "10.000"],
    [0, 1e-3, 10, "0"],
    [1 / 3, 0, 17, "0.33333333333333331"],
    [123456789.125, 0, 10, "123456789.1"],
    [Number.NaN, 0, 10, "not a number"],
    [Number.NEGATIVE_INFINITY, 0, 10, "minus infinite"],
    [1, Number.POSITIVE_INFINITY, 10, "no digit known"],
    [1, Number.NaN, 10, "no digit known"],
  ])("%s ± %s at %s digits is %s", (value, error, digits, text) => {
    expect(formatValue(value, error, digits)).toBe(text);
  });

  it("never prints a digit below the error, and rounds to nearest", () => {
    fc.assert(
      fc.property(valueAndError, fc.integer({ min: 1, max: 17 }), ({ value, error }, digits) => {
        const text = formatValue(value, error, digits);
        if (text === "0") {
          // Nothing of the value can be shown: it is below half a unit of the place that the error supports.
          expect(Math.abs(value)).toBeLessThanOrEqual(5 * error);
          return;
        }
        const unit = lastUnit(text);
        expect(unit).toBeGreaterThanOrEqual(error);
        expect(Math.abs(Number(text) - value)).toBeLessThanOrEqual(
          unit * (0.5 + 1e-9) + 4e-16 * Math.abs(value),
        );
        expect(Math.abs(value) / unit).toBeLessThan(10 ** digits * (1 + 1e-12));
      }),
      SEED,
    );
  });

  it("keeps all the digits that the error does support", () => {
    fc.assert(
      fc.property(valueAndError, ({ value, error }) => {
        const text = formatValue(value, error, 17);
        if (text === "0") return;
        // One unit more would still be ≥ the error only if the 17 digits were the limit, or one rounding carried.
        const byDigits = Math.abs(value) * 1e-15;
        expect(lastUnit(text)).toBeLessThanOrEqual(Math.max(error * 100, byDigits * 10));
      }),
      SEED,
    );
  });

  it.each([0, 18, 2.5, Number.NaN])("refuses %s digits", (digits) => {
    expect(() => formatValue(1, 0, digits)).toThrow(InvalidArgumentError);
  });
});

describe("formatError", () => {
  it.each([
    [1e-15, "1e-15"],
    [1.01e-15, "1.1e-15"],
    [9.91e-15, "1e-14"],
    [0.0123, "0.013"],
    [0, "0"],
    [undefined, ""],
    [Number.POSITIVE_INFINITY, "unbounded"],
    [Number.NaN, "unknown"],
  ])("%s is %s", (error, text) => {
    expect(formatError(error)).toBe(text);
  });

  it("is never smaller than the error, nor 20 % larger", () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-300, max: 1e300, noNaN: true }), (error) => {
        const shown = Number(formatError(error));
        expect(shown).toBeGreaterThanOrEqual(error);
        expect(shown).toBeLessThanOrEqual(error * 1.2);
      }),
      SEED,
    );
  });
});

describe("probabilities", () => {
  it("is never printed as 0", () => {
    const probability = fc.record({
      value: fc.oneof(fc.double({ min: 0, max: 1, noNaN: true }), fc.constant(0), fc.constant(5e-324)),
      error: fc.double({ min: 0, max: 1, noNaN: true }),
      logValue: fc.option(fc.double({ min: -1e6, max: 0, noNaN: true }), { nil: undefined }),
      logError: fc.option(fc.double({ min: 0, max: 2, noNaN: true }), { nil: undefined }),
    });
    fc.assert(
      fc.property(probability, fc.integer({ min: 1, max: 17 }), (p, digits) => {
        const text = formatProbability(p, digits);
        expect(text).toMatch(/[1-9]/);
        expect(/^[-+]?0*\.?0*(e[-+]?\d+)?$/.test(text.replace("< ", ""))).toBe(false);
      }),
      SEED,
    );
  });

  it("is an upper bound where the error is as large as the value", () => {
    expect(formatProbability({ value: 1e-17, error: 2e-16 })).toBe("< 2.1e-16");
    expect(formatProbability({ value: 0, error: 0 })).toBe("< 5e-324");
  });

  it("comes from its logarithm below the range of doubles", () => {
    // exp(−900) = 1.36447721236568…e−391, from mpmath with 30 digits.
    const p = { value: 0, error: 0, logValue: -900, logError: 1e-9 };
    expect(formatProbability(p)).toBe("1.36447721e-391");
    expect(formatErrorFromLog(-900, 1e-9)).toBe("1.4e-400");
    expect(formatErrorFromLog(-900, 0)).toBe("0");
    expect(formatErrorFromLog(-900, undefined)).toBe("");
    expect(formatErrorFromLog(-900, Number.POSITIVE_INFINITY)).toBe("unbounded");
  });

  it("is a bound where the logarithm is known to no better than 1", () => {
    expect(
      formatProbability({ value: 0, error: 5e-324, logValue: -1e6 * Math.LN10, logError: 4 * Math.LN10 }),
    ).toBe("< 1e-999995");
    expect(
      formatProbability({ value: 0, error: 0, logValue: -800, logError: Number.POSITIVE_INFINITY }),
    ).toMatch(/^< /);
  });

  it("agrees with the direct route where both exist", () => {
    fc.assert(
      fc.property(fc.double({ min: -600, max: -1e-3, noNaN: true }), (logValue) => {
        const text = formatFromLog(logValue, 1e-12, 8);
        const value = Math.exp(logValue);
        expect(Math.abs(Number(text) - value) / value).toBeLessThan(6e-8);
      }),
      SEED,
    );
  });

  it("keeps no digit that the error of the logarithm does not support", () => {
    expect(formatFromLog(-900, 0.01)).toMatch(/^1\.\de-391$/);
    expect(formatFromLog(-2.3 * 1000, 1e-4).length).toBeLessThan(12);
  });
});

it("fullDigits reads back as the same double", () => {
  fc.assert(
    fc.property(fc.double(), (x) => {
      expect(Number(fullDigits(x))).toBe(Object.is(x, -0) ? 0 : x);
    }),
    SEED,
  );
});
