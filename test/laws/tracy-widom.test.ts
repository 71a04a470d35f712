import { describe, expect, it } from "vitest";
import { InvalidArgumentError } from "../../src/core/errors.ts";
import { type QuaternionScaling, tracyWidom } from "../../src/laws/tracy-widom.ts";
import { scaledRightTail } from "../../src/laws/tracy-widom-far.ts";
import { driveLaw, type LawReference } from "../drivers/law-driver.ts";
import fixture from "../fixtures/tracy-widom.json" with { type: "json" };
import offGrid from "../fixtures/tracy-widom-off-grid.json" with { type: "json" };
import { differenceFrom } from "../precise.ts";

type Key = "beta1" | "beta2" | "beta4_G";
type Tabulated = Key | "beta4_TW" | "beta4_SAO";

function moments(key: Tabulated): LawReference["moments"] {
  const m = fixture.moments[key];
  return {
    mean: m.mean,
    variance: m.variance,
    skewness: m.skewness,
    excessKurtosis: m.excess_kurtosis,
    cumulants: m.cumulants_1_to_6,
  };
}

function reference(key: Key): LawReference {
  return {
    grid: fixture.grid.map((row) => ({
      x: row.s,
      cdf: row[key].cdf,
      survival: row[key].survival,
      pdf: row[key].pdf,
      logCdf: row[key].log_cdf,
    })),
    moments: moments(key),
    lowerQuantiles: fixture.quantiles[key].lower_tail,
    upperQuantiles: fixture.quantiles[key].upper_tail,
  };
}

driveLaw(tracyWidom(1), reference("beta1"));
driveLaw(tracyWidom(2), reference("beta2"));
driveLaw(tracyWidom(4, { scaling: "unscaled" }), reference("beta4_G"));

describe("tracyWidom: the figures the reports rest on", () => {
  const laws = [
    [tracyWidom(1), "beta1"],
    [tracyWidom(2), "beta2"],
    [tracyWidom(4, { scaling: "unscaled" }), "beta4_G"],
  ] as const;

  it.each(laws)(
    "%#: cdf ≤ 5e-16 absolute for s ≥ −8, density ≤ 5e-15, survival ≤ 2e-14 relative on [0, 30]",
    (law, key) => {
      let checked = 0;
      for (const row of fixture.grid) {
        const s = Number(row.s);
        if (s < -8) continue;
        checked++;
        expect(Math.abs(differenceFrom(law.cdf(s), row[key].cdf)), `cdf(${s})`).toBeLessThanOrEqual(5e-16);
        expect(Math.abs(differenceFrom(law.pdf(s), row[key].pdf)), `pdf(${s})`).toBeLessThanOrEqual(5e-15);
        const exact = law.estimate("cdf", s).value;
        expect(Math.abs(differenceFrom(exact, row[key].cdf)), `exact cdf(${s})`).toBeLessThanOrEqual(5e-16);
        if (s < 0 || s > 30) continue;
        const relative =
          Math.abs(differenceFrom(law.survival(s), row[key].survival)) / Number(row[key].survival);
        expect(relative, `survival(${s})`).toBeLessThanOrEqual(2e-14);
      }
      expect(checked).toBeGreaterThan(30);
    },
  );

  it.each(laws)("%#: keeps these figures between the grid points, its exact route honest", (law, key) => {
    const density = key === "beta1" ? "pdf1" : key === "beta2" ? "pdf2" : "pdf4_G";
    expect(offGrid.rows.length).toBeGreaterThan(100);
    for (const row of offGrid.rows) {
      const [hi, lo] = row[key];
      expect(Math.abs(law.cdf(row.s) - hi - lo), `cdf(${row.s})`).toBeLessThanOrEqual(5e-16);
      expect(Math.abs(law.pdf(row.s) - row[density]), `pdf(${row.s})`).toBeLessThanOrEqual(1e-15);
      // 1 − hi is exact for hi ≥ ½.
      const tail = 1 - hi - lo;
      const survival = law.estimate("survival", row.s);
      if (hi >= 0.5) {
        expect(Math.abs(law.survival(row.s) - tail) / tail, `survival(${row.s})`).toBeLessThanOrEqual(2e-14);
        expect(Math.abs(survival.value - tail), `exact survival(${row.s})`).toBeLessThanOrEqual(
          survival.error,
        );
      }
      const exact = law.estimate("cdf", row.s);
      expect(Math.abs(exact.value - hi - lo), `exact cdf(${row.s})`).toBeLessThanOrEqual(exact.error);
      const pdf = law.estimate("pdf", row.s);
      expect(Math.abs(pdf.value - row[density]), `exact pdf(${row.s})`).toBeLessThanOrEqual(pdf.error);
      for (const found of [exact, survival, pdf]) expect(found.converged).toBe(true);
    }
  });

  it("has the moments and quantiles of all three β = 4 scalings", () => {
    for (const [scaling, key] of [
      ["standard", "beta4_TW"],
      ["unscaled", "beta4_G"],
      ["stochastic-airy", "beta4_SAO"],
    ] as const) {
      const law = tracyWidom(4, { scaling });
      const m = moments(key);
      expect(Math.abs(differenceFrom(law.mean, m.mean))).toBeLessThan(1e-12);
      expect(Math.abs(differenceFrom(law.variance, m.variance))).toBeLessThan(1e-12);
      expect(Math.abs(differenceFrom(law.skewness, m.skewness))).toBeLessThan(1e-12);
      expect(Math.abs(differenceFrom(law.excessKurtosis, m.excessKurtosis))).toBeLessThan(1e-12);
      for (const [p, x] of Object.entries(fixture.quantiles[key].lower_tail)) {
        expect(Math.abs(differenceFrom(law.quantile(Number(p)), x)), `${scaling} ${p}`).toBeLessThan(1e-13);
      }
      for (const [q, x] of Object.entries(fixture.quantiles[key].upper_tail)) {
        expect(Math.abs(differenceFrom(law.upperQuantile(Number(q)), x)), `${scaling} ${q}`).toBeLessThan(
          1e-13,
        );
      }
      expect(law.provenance.convention).toContain("β = 4");
    }
    expect(tracyWidom(4).mean).toBeCloseTo(-2.306884893241, 11); // F. Bornemann, Markov Process. Relat. Fields 16 (2010) 803
  });

  it("keeps the relative accuracy of rescaled tails, down to 1e-300", () => {
    const unscaled = tracyWidom(4, { scaling: "unscaled" });
    const standard = tracyWidom(4);
    const operator = tracyWidom(4, { scaling: "stochastic-airy" });
    for (const q of [1e-10, 1e-100, 1e-200, 1e-300]) {
      const x = unscaled.upperQuantile(q);
      // The argument x/√2 is a double: what it misses moves log S by its slope, 2√x.
      const slack = 2 ** -52 * x * 2 * Math.sqrt(x) + 1e-13;
      expect(Math.abs(standard.survival(x / Math.SQRT2) / q - 1)).toBeLessThan(slack);
      expect(Math.abs(operator.survival(x / 2 ** (2 / 3)) / q - 1)).toBeLessThan(2 * slack);
    }
  });

  it("has an exact route for the rescaled laws that knows the rounding of the argument", () => {
    // 30/√2 and its like are no doubles: the reference at 30 is reached by one Taylor step from the double next to it.
    const row = fixture.grid.find((item) => item.s === "30");
    if (row === undefined) throw new Error("the grid has no point 30");
    const hazard = Number(row.beta4_G.pdf) / Number(row.beta4_G.survival);
    for (const [scaling, factor, tail] of [
      ["standard", Math.SQRT2, -9.667293313452913e-17],
      ["stochastic-airy", 1.5874010519681996, -1.0869008194197823e-16],
    ] as const) {
      const law = tracyWidom(4, { scaling });
      const x = 30 / factor;
      // factor · x − 30, exactly: x and the factor as ratios of big integers.
      const bits = 2 ** 52;
      const product = BigInt(factor * bits) * BigInt(x * bits) - 30n * BigInt(bits) ** 2n;
      const off = Number(product) / bits / bits + tail * x;
      const expected = Number(row.beta4_G.survival) * (1 - hazard * off);
      const found = law.estimate("survival", x);
      expect(Math.abs(found.value - expected)).toBeLessThanOrEqual(found.error + 1e-16 * expected);
      expect(Math.abs(law.survival(x) / expected - 1)).toBeLessThan(2e-14);
      expect(found.error).toBeLessThan(1e-14 * expected);
      for (const what of ["pdf", "logPdf", "logSurvival", "cdf", "logCdf"] as const) {
        const exact = law.estimate(what, x);
        expect(Math.abs(exact.value - law[what](x)), what).toBeLessThanOrEqual(
          exact.error + 2e-14 * Math.abs(exact.value),
        );
      }
    }
  });

  // I. M. Johnstone, Ann. Statist. 29 (2001) 295, Table 1: percentage points of F1, printed to two decimals.
  it.each([
    [-3.9, 0.01],
    [-3.18, 0.05],
    [-2.78, 0.1],
    [-1.91, 0.3],
    [-1.27, 0.5],
    [-0.59, 0.7],
    [0.45, 0.9],
    [0.98, 0.95],
    [2.02, 0.99],
  ])("F1(%s) is Johnstone's %s", (point, printed) => {
    expect(Math.abs(tracyWidom(1).cdf(point) - printed)).toBeLessThan(1e-3);
    expect(Math.abs(tracyWidom(1).quantile(printed) - point)).toBeLessThan(7e-3);
  });

  // F. Bornemann, Markov Process. Relat. Fields 16 (2010) 803, moment tables; C. Tracy, H. Widom, Proc. ICM 2002.
  it.each([
    [1, -1.206533574582, 1.607781034581, 0.29346452408, 0.1652429384],
    [2, -1.771086807411, 0.8131947928329, 0.22408420361, 0.0934480876],
    [4, -2.306884893241, 0.5177237207726, 0.16550949435, 0.0491951565],
  ] as const)("β = %s: the published moments", (beta, mean, variance, skewness, kurtosis) => {
    const law = tracyWidom(beta);
    expect(Math.abs(law.mean - mean)).toBeLessThan(1.1e-12);
    expect(Math.abs(law.variance - variance)).toBeLessThan(1.1e-12);
    expect(Math.abs(law.skewness - skewness)).toBeLessThan(1.1e-11);
    expect(Math.abs(law.excessKurtosis - kurtosis)).toBeLessThan(1.1e-10);
  });

  it("has the right tails of Dumaz and Virág, Baik and others: the series of the first term", () => {
    // 1 − F2 ≈ e^{−(4/3) s^{3/2}} / (16π s^{3/2}) (1 − 35/24 z + 3745/1152 z² − 805805/82944 z³ + …), z = s^{−3/2};
    // 1 − F1 ≈ e^{−(2/3) s^{3/2}} / (4√π s^{3/4}) (1 − 41/48 z + 9241/4608 z² − 5075225/663552 z³ + …).
    for (const s of [100, 400, 2500, 1e4]) {
      const z = s ** -1.5;
      const two = (z / (16 * Math.PI)) * (1 + z * (-35 / 24 + z * (3745 / 1152 - (805805 / 82944) * z)));
      const one =
        (Math.sqrt(z) / (4 * Math.sqrt(Math.PI))) *
        (1 + z * (-41 / 48 + z * (9241 / 4608 - (5075225 / 663552) * z)));
      const next = 50 * z ** 4 + 4e-15;
      expect(Math.abs(scaledRightTail(2, s).survival / two - 1)).toBeLessThan(next);
      expect(Math.abs(scaledRightTail(1, s).survival / one - 1)).toBeLessThan(next);
      const log = Math.log(two) - (4 / 3) * s ** 1.5;
      expect(Math.abs(tracyWidom(2).logSurvival(s) - log)).toBeLessThan(next + 4e-16 * Math.abs(log));
    }
  });

  it("never returns NaN and never throws for a number, whatever its size", () => {
    const laws = [
      tracyWidom(1),
      tracyWidom(2),
      ...(["standard", "unscaled", "stochastic-airy"] as const).map((scaling) => tracyWidom(4, { scaling })),
    ];
    const sizes = [5e-324, 1e-300, 1, 4, 6, 120, 1e3, 1e6, 1e10, 1e50, 1e99, 1e101, 1e150, 1e200, 1e308];
    for (const law of laws) {
      for (const x of [0, ...sizes, ...sizes.map((size) => -size)]) {
        for (const what of ["pdf", "cdf", "survival", "logPdf", "logCdf", "logSurvival"] as const) {
          expect(Number.isNaN(law[what](x)), `${law.symbol} ${what}(${x})`).toBe(false);
        }
      }
      for (const p of [5e-324, 1e-300, 1 - 2 ** -53]) {
        expect(Number.isFinite(law.quantile(p)) && Number.isFinite(law.upperQuantile(p))).toBe(true);
      }
    }
  });

  it("returns one object a law and refuses what is none", () => {
    expect(tracyWidom(2)).toBe(tracyWidom(2));
    expect(tracyWidom(4)).toBe(tracyWidom(4, { scaling: "standard" }));
    for (const beta of [3, 0, 1.5, "2", Number.NaN]) {
      expect(() => tracyWidom(beta as 1)).toThrow(InvalidArgumentError);
      expect(() => tracyWidom(beta as 1)).toThrow(/beta: expected 1, 2 or 4/);
    }
    expect(() => tracyWidom(4, { scaling: "other" as QuaternionScaling })).toThrow(/options\.scaling/);
    expect(() => tracyWidom(1, { scaling: "unscaled" })).toThrow(/options\.scaling/);
  });
});
