/**
 * Accuracy against tabulated values: worst errors of each law over the whole reference grid, quantiles and moments,
 * fast route and exact route, beside what is stated.
 */
import { readFileSync } from "node:fs";
import type { Law } from "../src/laws/law.ts";
import { tracyWidom } from "../src/laws/tracy-widom.ts";
import { differenceFrom } from "../test/precise.ts";

type Strings = Readonly<Record<string, string>>;

interface Reference {
  readonly grid: readonly Readonly<Record<string, Strings | string>>[];
  readonly moments: Readonly<Record<string, Strings & { readonly cumulants_1_to_6: readonly string[] }>>;
  readonly quantiles: Readonly<
    Record<string, { readonly lower_tail: Strings; readonly upper_tail: Strings }>
  >;
}

/** Rows law, what, worst measured, stated. */
export function accuracyRows(): string[][] {
  const reference = JSON.parse(readFileSync("test/fixtures/tracy-widom.json", "utf8")) as Reference;
  const laws: readonly (readonly [Law, string])[] = [
    [tracyWidom(1), "beta1"],
    [tracyWidom(2), "beta2"],
    [tracyWidom(4, { scaling: "unscaled" }), "beta4_G"],
  ];
  return laws.flatMap(([law, key]) => {
    const worst = new Map<string, number>();
    const note = (what: string, error: number): void => {
      worst.set(what, Math.max(worst.get(what) ?? 0, Math.abs(error)));
    };
    for (const row of reference.grid) {
      const s = Number(row.s);
      const { cdf, survival, pdf, log_cdf } = row[key] as Strings;
      note("cdf, absolute", differenceFrom(law.cdf(s), cdf));
      note("density, absolute", differenceFrom(law.pdf(s), pdf));
      if (Number(cdf) > 1e-300)
        note("cdf, relative, to 1e-300", differenceFrom(law.cdf(s), cdf) / Number(cdf));
      if (Number(survival) > 1e-300) {
        note("survival, relative, to 1e-300", differenceFrom(law.survival(s), survival) / Number(survival));
      }
      note(
        "log cdf, relative to max(1, |log|)",
        differenceFrom(law.logCdf(s), log_cdf) / Math.max(1, Math.abs(Number(log_cdf))),
      );
      note("exact cdf, absolute", differenceFrom(law.estimate("cdf", s).value, cdf));
    }
    const { lower_tail, upper_tail } = reference.quantiles[key];
    for (const [p, x] of Object.entries(lower_tail))
      note("quantiles, 1e-100 to 0.5", differenceFrom(law.quantile(Number(p)), x));
    for (const [q, x] of Object.entries(upper_tail)) {
      note("upper quantiles, 1e-100 to 0.25", differenceFrom(law.upperQuantile(Number(q)), x));
    }
    const m = reference.moments[key];
    note("mean to kurtosis", differenceFrom(law.mean, m.mean));
    note("mean to kurtosis", differenceFrom(law.variance, m.variance));
    note("mean to kurtosis", differenceFrom(law.skewness, m.skewness));
    note("mean to kurtosis", differenceFrom(law.excessKurtosis, m.excess_kurtosis));
    m.cumulants_1_to_6.forEach((c, i) => {
      note("cumulants 1 to 6", differenceFrom(law.cumulant(i + 1), c));
    });
    const { accuracy } = law;
    const stated: Readonly<Record<string, number>> = {
      "cdf, absolute": accuracy.cdfAbsolute,
      "density, absolute": accuracy.pdfAbsolute,
      "cdf, relative, to 1e-300": accuracy.cdfRelative,
      "survival, relative, to 1e-300": accuracy.survivalRelative,
      "quantiles, 1e-100 to 0.5": accuracy.quantileAbsolute,
      "upper quantiles, 1e-100 to 0.25": accuracy.quantileAbsolute,
      "mean to kurtosis": accuracy.momentAbsolute,
      "cumulants 1 to 6": accuracy.momentAbsolute,
    };
    return [...worst].map(([what, error]) => [
      law.symbol,
      what,
      error.toExponential(1),
      stated[what] === undefined ? "" : stated[what].toExponential(0),
    ]);
  });
}
