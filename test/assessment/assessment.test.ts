import { describe, expect, it } from "vitest";
import { andersonDarlingLimitSurvival } from "../../src/assessment/anderson-darling.ts";
import { formatPValue } from "../../src/assessment/format-p-value.ts";
import { kolmogorovSurvival } from "../../src/assessment/kolmogorov-smirnov.ts";
import { largestRootTest, rootConstants } from "../../src/assessment/largest-root.ts";
import { readNumericTable } from "../../src/assessment/numeric-table.ts";
import { covarianceSpectrum } from "../../src/assessment/sample-covariance.ts";
import { sampleTest } from "../../src/assessment/sample-test.ts";
import { InvalidArgumentError, InvalidDataError } from "../../src/core/errors.ts";
import { seededGenerator } from "../../src/core/random.ts";
import { tracyWidom } from "../../src/laws/tracy-widom.ts";
import fixture from "../fixtures/assessment.json" with { type: "json" };
import wishart from "../fixtures/wishart-largest.json" with { type: "json" };
import { differenceFrom, relativeDifference } from "../precise.ts";

/** Standard normal numbers from a uniform generator (Box–Muller). */
function normals(count: number, seed: number): Float64Array {
  const uniform = seededGenerator(seed);
  return Float64Array.from(
    { length: count },
    () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform()),
  );
}

describe("readNumericTable", () => {
  it("reads numbers, a header, blank lines, a byte-order mark, quoted cells and complex cells", () => {
    const plain = readNumericTable("1,2\n3,-4e-2\n\n");
    expect([plain.rows, plain.columns, plain.header, plain.imaginary]).toEqual([2, 2, undefined, undefined]);
    expect(Array.from(plain.real)).toEqual([1, 2, 3, -0.04]);
    const named = readNumericTable('\ufeffleft,"right, far"\n 1 ,"2"\n.5,+6.\n');
    expect(named.header).toEqual(["left", "right, far"]);
    expect(Array.from(named.real)).toEqual([1, 2, 0.5, 6]);
    const complex = readNumericTable("1+2i;3\n-1.5e1-2.5e-1i;4i\n", { delimiter: ";" });
    expect(Array.from(complex.real)).toEqual([1, 3, -15, 0]);
    expect(Array.from(complex.imaginary ?? [])).toEqual([2, 0, -0.25, 4]);
  });

  it.each<[string, string, RegExp, number | undefined, number | undefined]>([
    ["empty text", "", /at least one row/, undefined, undefined],
    ["blank lines", "\n\n", /at least one row/, undefined, undefined],
    ["only a header", "a,b\n", /at least one row/, undefined, undefined],
    ["ragged rows", "1,2\n3\n", /2 cells in every row, received "1 cells"/, 2, undefined],
    ["ragged below a header", "a,b\n1,2\n3,4,5\n", /2 cells/, 3, undefined],
    ["a word", "1,2\n3,four\n", /finite number in every cell, received "four"/, 2, 2],
    ["an empty cell", "1,2\n3,\n", /received ""/, 2, 2],
    ["NaN", "1,NaN\n2,3\n", /received "NaN"/, 1, 2],
    ["infinity", "1,2\n1e999,3\n", /received "1e999"/, 2, 1],
    ["a half header", "1,b\n2,3\n", /received "b"/, 1, 2],
    ["an open quote", '1,"2\n3,4\n', /CSV text/, undefined, undefined],
  ])("refuses %s, saying where", (_, text, message, row, column) => {
    try {
      readNumericTable(text);
      expect.unreachable();
    } catch (error) {
      expect(error).toBeInstanceOf(InvalidDataError);
      expect((error as Error).message).toMatch(message);
      expect(error).toMatchObject({ row, column });
    }
  });

  it("refuses a bad delimiter and a non-string", () => {
    expect(() => readNumericTable("1", { delimiter: "" })).toThrow(/options\.delimiter/);
    expect(() => readNumericTable(3 as unknown as string)).toThrow(InvalidArgumentError);
  });
});

describe("covarianceSpectrum", () => {
  it("gives numpy's eigenvalues for real and complex, tall and wide tables", () => {
    for (const t of fixture.tables) {
      const table = readNumericTable(t.csv);
      expect([table.rows, table.columns, table.imaginary !== undefined]).toEqual([
        t.rows,
        t.columns,
        t.complex,
      ]);
      const variants = [
        [covarianceSpectrum(table), t.centred, t.rows - 1],
        [covarianceSpectrum(table, { centre: false }), t.raw, t.rows],
        [covarianceSpectrum(table, { scaling: "unit-variance" }), t.scaled, t.rows - 1],
      ] as const;
      for (const [spectrum, expected, n] of variants) {
        expect(spectrum.n).toBe(n);
        expect(spectrum.p).toBe(t.columns);
        expect(spectrum.complex).toBe(t.complex);
        expect(spectrum.eigenvalues.length).toBe(expected.length);
        spectrum.eigenvalues.forEach((value, i) => {
          expect(Math.abs(value - expected[i])).toBeLessThan(2e-14 * expected[0]);
        });
      }
    }
  });

  it.each<[string, string, RegExp]>([
    ["a single row", "1,2\n", /at least 3 rows/],
    ["two rows, centred", "1,2\n3,4\n", /at least 3 rows/],
    ["a single column", "1\n2\n3\n4\n", /at least 2 columns/],
    ["a constant column", "a,b\n1,5\n2,5\n3,5\n", /columns that vary, received "constant column b"/],
    ["a constant column without a name", "1,5\n2,5\n3,5\n", /columns that vary/],
  ])("refuses %s", (_, text, message) => {
    expect(() => covarianceSpectrum(readNumericTable(text))).toThrow(InvalidDataError);
    expect(() => covarianceSpectrum(readNumericTable(text))).toThrow(message);
  });

  it("refuses bad options", () => {
    const table = readNumericTable("1,2\n3,4\n5,7\n");
    expect(() => covarianceSpectrum(table, { centre: 1 as unknown as boolean })).toThrow(/options\.centre/);
    expect(() => covarianceSpectrum(table, { scaling: "x" as "none" })).toThrow(/options\.scaling/);
  });
});

describe("largestRootTest", () => {
  const ten = [4.25, 2, 1.5, 1, 0.5, 0.3, 0.2, 0.1, 0.1, 0.05];

  // I. M. Johnstone, Proc. ICM Madrid 2006: n = p = 10, largest sample eigenvalue 4.25, "approximate p-value 0.06".
  it("reproduces the published worked example, p about 0.06", () => {
    const classical = largestRootTest(
      { eigenvalues: ten, n: 10, p: 10 },
      { constants: "classical", noiseVariance: 1 },
    );
    expect(classical.steps[0].centre).toBeCloseTo(37.973665961, 9);
    expect(classical.steps[0].scale).toBeCloseTo(5.336804153, 9);
    expect(classical.steps[0].statistic).toBeCloseTo(0.8481356837, 9);
    expect(classical.steps[0].pValue).toBeCloseTo(0.0598537204, 9);
    const shifted = largestRootTest({ eigenvalues: ten, n: 10, p: 10 }, { noiseVariance: 1 });
    expect(shifted.steps[0].centre).toBeCloseTo(38, 12);
    expect(shifted.steps[0].scale).toBeCloseTo(5.3368032974, 9);
    expect(shifted.steps[0].pValue).toBeCloseTo(0.0602539283, 9);
    expect(shifted.significantCount).toBe(0);
  });

  // Exact P(λ_max ≤ s) of real and complex Wishart matrices (test/fixtures/wishart-largest.json): the limit law with
  // these constants must be off by no more than the first correction, of order min(n, p)^(−2/3).
  it("has constants that fit exact finite-size probabilities", () => {
    let worst = 0;
    const compare = (n: number, p: number, complex: boolean, s: number, cdf: number): void => {
      const { centre, scale } = rootConstants(n, p, complex, "second-order");
      const limit = tracyWidom(complex ? 2 : 1).cdf((s - centre) / scale);
      worst = Math.max(worst, Math.abs(limit - cdf) * Math.min(n, p) ** (2 / 3));
    };
    for (const row of wishart.complex) {
      if (!Number.isInteger(Number(row.a))) continue; // no matrix
      compare(row.n, row.n + Number(row.a), true, Number(row.s), Number(row.cdf));
    }
    for (const row of wishart.real) compare(row.n, row.m, false, Number(row.s), Number(row.cdf));
    expect(wishart.complex.length + wishart.real.length).toBeGreaterThan(20);
    expect(worst).toBeGreaterThan(0);
    expect(worst).toBeLessThan(0.3);
  });

  it("finds the planted number of sources and no more", () => {
    const [rows, p] = [200, 20];
    const noise = normals(rows * p, 3);
    const sources = normals(rows * 2, 4);
    for (let i = 0; i < rows; i++) {
      for (let j = 0; j < p; j++) {
        noise[i * p + j] += 0.6 * sources[2 * i] + 0.5 * (j % 2 === 0 ? 1 : -1) * sources[2 * i + 1];
      }
    }
    const table = { rows, columns: p, header: undefined, real: noise, imaginary: undefined };
    const spectrum = covarianceSpectrum(table);
    const result = largestRootTest(spectrum, { level: 0.01 });
    expect(result.significantCount).toBe(2);
    expect(result.exhausted).toBe(false);
    expect(result.steps[0].logPValue).toBeLessThan(-100);
    expect(result.steps.map((step) => step.significant).slice(0, 4)).toEqual([true, true, false, false]);
    expect(result.assumptions.join(" ")).toMatch(/independent Gaussian.*licensed professional/s);
  });

  it("has p-values that are nearly uniform under white noise", () => {
    const [rows, p, repeats] = [40, 12, 150];
    let below = 0;
    for (let r = 0; r < repeats; r++) {
      const table = {
        rows,
        columns: p,
        header: undefined,
        real: normals(rows * p, 1000 + r),
        imaginary: undefined,
      };
      const { steps } = largestRootTest(covarianceSpectrum(table), { components: 1, noiseVariance: 1 });
      if (steps[0].pValue < 0.2) below++;
    }
    // Binomial(150, 0.2): mean 30, standard deviation 4.9; four of them on either side, and the seeds are fixed.
    expect(below).toBeGreaterThan(10);
    expect(below).toBeLessThan(50);
  });

  it("never loses a p-value to underflow", () => {
    const { steps } = largestRootTest({ eigenvalues: [5000, 1], n: 50, p: 2 }, { noiseVariance: 1 });
    expect(steps[0].pValue).toBe(0);
    expect(Number.isFinite(steps[0].logPValue)).toBe(true);
    expect(formatPValue(steps[0].logPValue)).toMatch(/^\d\.\d\de-\d+$/);
  });

  const some = { eigenvalues: [2, 1], n: 10, p: 2 };
  it.each<[string, () => unknown, RegExp]>([
    [
      "negative eigenvalues",
      () => largestRootTest({ ...some, eigenvalues: [2, -1] }),
      /eigenvalues\[1\]: expected a finite number ≥ 0, received -1/,
    ],
    ["NaN", () => largestRootTest({ ...some, eigenvalues: [Number.NaN, 1] }), /eigenvalues\[0\]/],
    [
      "unsorted eigenvalues",
      () => largestRootTest({ ...some, eigenvalues: [1, 2] }),
      /eigenvalues\[1\]: expected a number ≤ the one before it, 1/,
    ],
    ["no eigenvalues", () => largestRootTest({ ...some, eigenvalues: [] }), /non-empty/],
    ["all zero", () => largestRootTest({ ...some, eigenvalues: [0, 0] }), /eigenvalues\[0\]/],
    ["too many", () => largestRootTest({ ...some, eigenvalues: [3, 2, 1] }), /at most min\(n, p\) = 2/],
    [
      "too few to estimate the noise",
      () => largestRootTest({ ...some, eigenvalues: [3] }),
      /all min\(n, p\) = 2/,
    ],
    ["n = 1", () => largestRootTest({ ...some, n: 1 }), /n: expected an integer from 2/],
    ["p = 1.5", () => largestRootTest({ ...some, p: 1.5 }), /p: expected an integer/],
    ["level 0", () => largestRootTest(some, { level: 0 }), /options\.level/],
    ["noise variance 0", () => largestRootTest(some, { noiseVariance: 0 }), /options\.noiseVariance/],
    ["components 0", () => largestRootTest(some, { components: 0 }), /options\.components/],
    ["other constants", () => largestRootTest(some, { constants: "x" as "classical" }), /options\.constants/],
  ])("refuses %s", (_, call, message) => {
    expect(call).toThrow(InvalidArgumentError);
    expect(call).toThrow(message);
  });
});

describe("distances", () => {
  it("has the exact Kolmogorov law: relative 1e-11 in the far tail, 1e-12 absolute elsewhere", () => {
    for (const [n, d, value] of fixture.kolmogorov as [number, number, string][]) {
      const found = kolmogorovSurvival(n, d);
      const error = Math.abs(differenceFrom(found.value, value));
      expect(error, `n = ${n}, d = ${d}`).toBeLessThanOrEqual(found.error);
      if (n * d * d >= 6) expect(Math.abs(relativeDifference(found.value, value))).toBeLessThan(1e-11);
      expect(found.error).toBeLessThan(1e-11);
    }
  });

  it("is as good as it says for large samples, against scipy.stats.kstwo", () => {
    for (const [n, d, value] of fixture.kolmogorovLarge) {
      const found = kolmogorovSurvival(n, d);
      expect(Math.abs(found.value - value), `n = ${n}`).toBeLessThanOrEqual(found.error);
    }
  });

  it("has the Anderson–Darling limit law: relative 1e-12 down to 1e-14", () => {
    for (const [x, value] of fixture.andersonDarling as [number, string][]) {
      const found = andersonDarlingLimitSurvival(x);
      expect(Math.abs(differenceFrom(found.value, value)), `x = ${x}`).toBeLessThanOrEqual(found.error);
      expect(Math.abs(relativeDifference(found.value, value)), `x = ${x}`).toBeLessThan(1e-12);
    }
    // T. W. Anderson, D. A. Darling, J. Amer. Statist. Assoc. 49 (1954) 765: 5 % point 2.492, 1 % point 3.857 (from memory).
    expect(andersonDarlingLimitSurvival(2.492).value).toBeCloseTo(0.05, 4);
    expect(andersonDarlingLimitSurvival(3.857).value).toBeCloseTo(0.01, 3);
  });

  it("refuses bad arguments", () => {
    expect(() => kolmogorovSurvival(0, 0.5)).toThrow(/n: expected/);
    expect(() => kolmogorovSurvival(10, 1)).toThrow(/d: expected/);
    expect(() => andersonDarlingLimitSurvival(-1)).toThrow(/x: expected/);
  });
});

describe("sampleTest", () => {
  it("accepts a sample of the law itself and rejects a shifted one", () => {
    const law = tracyWidom(2);
    const draws = law.sample(500, seededGenerator(11));
    const own = sampleTest(draws, law);
    expect(own.count).toBe(500);
    for (const row of own.moments) expect(Math.abs(row.z), row.name).toBeLessThan(4);
    for (const test of own.distances) expect(test.pValue, test.name).toBeGreaterThan(1e-3);
    const shifted = sampleTest(
      draws.map((x) => x + 0.4),
      law,
    );
    for (const test of shifted.distances) expect(test.pValue, test.name).toBeLessThan(1e-10);
    expect(shifted.moments[0].z).toBeGreaterThan(8);
  });

  it("states standard errors that samples of the law scatter by", () => {
    const law = tracyWidom(1);
    const z = { mean: 0, variance: 0, skewness: 0, "excess kurtosis": 0 };
    const repeats = 120;
    for (let r = 0; r < repeats; r++) {
      for (const row of sampleTest(law.sample(400, seededGenerator(100 + r)), law).moments)
        z[row.name] += row.z ** 2 / repeats;
    }
    for (const [name, square] of Object.entries(z)) {
      expect(square, name).toBeGreaterThan(0.5);
      expect(square, name).toBeLessThan(1.7);
    }
  });

  it("is uniform in its p-values: a tenth of samples falls below 0.1", () => {
    const law = tracyWidom(2);
    let [ks, ad] = [0, 0];
    for (let r = 0; r < 300; r++) {
      const [first, second] = sampleTest(law.sample(30, seededGenerator(5000 + r)), law).distances;
      if (first.pValue < 0.1) ks++;
      if (second.pValue < 0.1) ad++;
    }
    // Binomial(300, 0.1): mean 30, standard deviation 5.2.
    for (const count of [ks, ad]) {
      expect(count).toBeGreaterThan(10);
      expect(count).toBeLessThan(50);
    }
  });

  it.each<[string, unknown, RegExp]>([
    ["a short sample", [1, 2], /at least 5 numbers/],
    ["NaN", [1, 2, 3, 4, Number.NaN], /finite numbers/],
    ["no array", 7, /sample: expected an array/],
  ])("refuses %s", (_, sample, message) => {
    expect(() => sampleTest(sample as number[], tracyWidom(1))).toThrow(message);
  });
});

describe("formatPValue", () => {
  it.each([
    [Math.log(0.0598537204), "0.0599"],
    [Math.log(9.9999e-7), "1.00e-6"],
    [-1000, "5.08e-435"],
    [0, "1.00"],
  ])("prints exp(%s) as %s, never 0", (log, text) => {
    expect(formatPValue(log)).toBe(text);
  });
});
