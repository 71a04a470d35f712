import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { formatPValue } from "../../src/assessment/format-p-value.ts";
import { largestRootTest, rootConstants } from "../../src/assessment/largest-root.ts";
import { type NumericTable, readNumericTable } from "../../src/assessment/numeric-table.ts";
import { covarianceSpectrum } from "../../src/assessment/sample-covariance.ts";
import { InvalidArgumentError, InvalidDataError } from "../../src/core/errors.ts";
import { tracyWidom } from "../../src/laws/tracy-widom.ts";
import fixture from "../fixtures/assessment-tails.json" with { type: "json" };

function table(rows: number, columns: number, real: ArrayLike<number>): NumericTable {
  return { rows, columns, header: undefined, real: Float64Array.from(real), imaginary: undefined };
}

describe("a first row that is no header", () => {
  it.each([
    ["NaN alone", "NaN\n1\n2\n", "NaN"],
    ["NaN throughout", "nan,NAN\n1,2\n", "nan"],
    ["infinities", "inf,-Infinity\n1,2\n", "inf"],
    ["numbers beyond the range of doubles", "1e999,2e999\n1,2\n", "1e999"],
    ["nothing but empty cells", ",\n1,2\n", ""],
    ["marks of missing values", "NA,n/a\n1,2\n", "NA"],
  ])("is refused: %s", (_, text, cell) => {
    try {
      readNumericTable(text);
      expect.unreachable();
    } catch (error) {
      expect(error).toBeInstanceOf(InvalidDataError);
      expect(error).toMatchObject({ row: 1, column: 1, received: cell });
    }
  });

  it("still leaves names that look odd as names", () => {
    expect(readNumericTable("1st,i,e5\n1,2,3\n").header).toEqual(["1st", "i", "e5"]);
    expect(readNumericTable("left,NA\n1,2\n").header).toEqual(["left", "NA"]);
  });

  it.each(["", ".", "1", "-", "e", '"', "\n", "\r", ";;"])("refuses the delimiter %j", (delimiter) => {
    expect(() => readNumericTable("1,2\n3,4\n", { delimiter })).toThrow(/options\.delimiter/);
  });

  it("refuses options that are none", () => {
    expect(() => readNumericTable("1", null as unknown as object)).toThrow(InvalidArgumentError);
  });
});

describe("tables built by hand", () => {
  const good = [1, 2, 3, -4, 5, 7, 9, 1];
  it.each<[string, unknown, RegExp]>([
    ["null", null, /table: expected a table/],
    ["too few numbers", table(4, 2, [1, 2, 3]), /table\.real: expected a Float64Array of 4 × 2/],
    ["an ordinary array", { ...table(4, 2, good), real: good }, /table\.real/],
    ["too few imaginary parts", { ...table(4, 2, good), imaginary: new Float64Array(1) }, /table\.imaginary/],
    ["half a row", { ...table(4, 2, good), rows: 3.5 }, /table\.rows/],
    ["NaN", table(4, 2, [1, 2, 3, Number.NaN, 5, 7, 9, 1]), /finite numbers, received NaN/],
  ])("are refused: %s", (_, bad, message) => {
    expect(() => covarianceSpectrum(bad as NumericTable)).toThrow(InvalidArgumentError);
    expect(() => covarianceSpectrum(bad as NumericTable)).toThrow(message);
  });

  it("say where a number is not finite", () => {
    try {
      covarianceSpectrum(table(4, 2, [1, 2, 3, 4, 5, Number.POSITIVE_INFINITY, 7, 8]));
      expect.unreachable();
    } catch (error) {
      expect(error).toMatchObject({ row: 3, column: 2 });
    }
  });
});

describe("the unit of the data", () => {
  const entries = [0.3, 2, 3, -4, 5.5, 7, 9, 1, 0.7, -2];

  it("does not matter: a power of two comes out squared, to the bit", () => {
    const reference = covarianceSpectrum(table(5, 2, entries)).eigenvalues;
    fc.assert(
      fc.property(fc.integer({ min: -450, max: 450 }), (k) => {
        const scaled = covarianceSpectrum(
          table(
            5,
            2,
            entries.map((x) => x * 2 ** k),
          ),
        ).eigenvalues;
        expect(scaled).toEqual(reference.map((value) => value * 2 ** k * 2 ** k));
      }),
      { seed: 20261201, numRuns: 60 },
    );
  });

  it("does not matter at all for columns of unit variance, each with a unit of its own", () => {
    const reference = covarianceSpectrum(table(5, 2, entries), { scaling: "unit-variance" }).eigenvalues;
    const mixed = entries.map((x, i) => x * (i % 2 === 0 ? 1e-120 : 1e120));
    const found = covarianceSpectrum(table(5, 2, mixed), { scaling: "unit-variance" }).eigenvalues;
    found.forEach((value, i) => {
      expect(value).toBeCloseTo(reference[i], 13);
    });
    const tiny = entries.map((x) => x * 1e-200);
    covarianceSpectrum(table(5, 2, tiny), { scaling: "unit-variance" }).eigenvalues.forEach((value, i) => {
      expect(value).toBeCloseTo(reference[i], 13);
    });
  });

  it.each([1e200, 1e-200])("is refused where variances leave the range of doubles: %d", (unit) => {
    expect(() =>
      covarianceSpectrum(
        table(
          5,
          2,
          entries.map((x) => x * unit),
        ),
      ),
    ).toThrow(/within the range of double precision/);
  });

  it("leaves no trace of a large common offset", () => {
    // Integers, so that adding 2^40 is exact; covariance of (0,1,2,3,4) and (1,0,2,1,1): n − 1 = 4 below.
    const plain = [0, 1, 1, 0, 2, 2, 3, 1, 4, 1];
    const reference = covarianceSpectrum(table(5, 2, plain)).eigenvalues;
    const far = covarianceSpectrum(
      table(
        5,
        2,
        plain.map((x) => x + 2 ** 40),
      ),
    ).eigenvalues;
    far.forEach((value, i) => {
      expect(value).toBeCloseTo(reference[i], 12);
    });
  });
});

describe("largestRootTest", () => {
  const csv = "1+2i,2-1i\n3,4i\n5-2i,7\n9+1i,1\n";

  it("takes the field from the spectrum: complex data are never tested as real ones", () => {
    const spectrum = covarianceSpectrum(readNumericTable(csv));
    expect(largestRootTest(spectrum).lawSymbol).toBe("F2");
    expect(largestRootTest(spectrum, { complex: true }).lawSymbol).toBe("F2");
    expect(() => largestRootTest(spectrum, { complex: false })).toThrow(
      /options\.complex: expected true, as the data are/,
    );
    expect(largestRootTest({ eigenvalues: [2, 1], n: 10, p: 2 }).lawSymbol).toBe("F1");
  });

  it("cautions about correlation matrices where it must and where it can't know", () => {
    const data = readNumericTable("1,2\n3,-4\n5,7\n9,1\n");
    const text = (result: { assumptions: readonly string[] }): string => result.assumptions.join(" ");
    expect(text(largestRootTest(covarianceSpectrum(data, { scaling: "unit-variance" })))).toMatch(
      /scaled to unit variance/,
    );
    expect(text(largestRootTest(covarianceSpectrum(data)))).not.toMatch(/correlation/);
    const bare = largestRootTest({ eigenvalues: [2, 1], n: 10, p: 2 });
    expect(text(bare)).toMatch(/for a correlation matrix the law holds only nearly/);
    expect(bare.lawProvenance).toEqual(tracyWidom(1).provenance);
  });

  const some = { eigenvalues: [2, 1], n: 10, p: 2 };
  const holed = new Array<number>(3);
  [holed[0], holed[2]] = [3, 1];
  it.each<[string, () => unknown, RegExp]>([
    ["null", () => largestRootTest(null as never), /input: expected/],
    ["null options", () => largestRootTest(some, null as never), /options: expected/],
    [
      "a field that is no truth value",
      () => largestRootTest(some, { complex: "no" as never }),
      /options\.complex/,
    ],
    [
      "eigenvalues with a hole",
      () => largestRootTest({ ...some, p: 3, eigenvalues: holed }),
      /eigenvalues\[1\]: expected a finite number ≥ 0, received undefined/,
    ],
    [
      "a statistic that overflows",
      () => largestRootTest({ eigenvalues: [1e306, 1], n: 1000, p: 2 }, { noiseVariance: 1e-10 }),
      /eigenvalues\[0\]: expected a statistic/,
    ],
    ["constants of no name", () => rootConstants(10, 10, false, "x" as never), /choice: expected/],
    ["a field of no kind", () => rootConstants(10, 10, 2 as never, "classical"), /complex: expected/],
  ])("refuses %s", (_, call, message) => {
    expect(call).toThrow(InvalidArgumentError);
    expect(call).toThrow(message);
  });

  // Exact P(λ_max ≤ s) of complex Wishart matrices, p = n, 2n, 4n (C. G. Khatri, 1964): second-order constants make
  // the largest error over seven points fall like n^(−2/3), first-order ones would make it fall like n^(−1/3).
  it("has complex constants whose error falls like n^(−2/3)", () => {
    const worst = new Map<string, number>();
    for (const [n, p, s, exact] of fixture.wishartComplex as [number, number, number, string][]) {
      const { centre, scale } = rootConstants(n, p, true, "second-order");
      const error = Math.abs(tracyWidom(2).cdf((s - centre) / scale) - Number(exact));
      const key = `${p / n}:${n}`;
      worst.set(key, Math.max(worst.get(key) ?? 0, error));
    }
    const at = (ratio: number, n: number): number => worst.get(`${ratio}:${n}`) ?? Number.NaN;
    for (const ratio of [1, 2, 4]) {
      for (const n of [8, 16]) {
        const rate = Math.log2(at(ratio, n) / at(ratio, 2 * n));
        expect(rate, `p = ${ratio} n, n = ${n}`).toBeGreaterThan(0.64);
        expect(rate, `p = ${ratio} n, n = ${n}`).toBeLessThan(0.85);
      }
      expect(at(ratio, 32) * 32 ** (2 / 3)).toBeLessThan(0.26);
    }
  });
});

describe("formatPValue", () => {
  it("bounds what it can't give digits of, and refuses what is no logarithm of a probability", () => {
    expect(formatPValue(-1e17)).toMatch(/^< 1e-434294481903\d{5}$/);
    expect(formatPValue(Number.NEGATIVE_INFINITY)).toBe("< 1e-308");
    expect(formatPValue(-1e9, 3)).toMatch(/^\d\.\d\de-434294482$/);
    for (const bad of [Number.NaN, 2, "0" as unknown as number]) {
      expect(() => formatPValue(bad)).toThrow(InvalidArgumentError);
    }
    expect(() => formatPValue(-3, 0)).toThrow(/digits: expected an integer from 1 to 15/);
  });
});
