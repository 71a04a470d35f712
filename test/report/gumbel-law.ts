/**
 * The Gumbel law, closed form throughout, as a stand-in law for tests of reports: what a report prints can then
 * be checked against elementary formulas, with no determinant in between.
 */
import type { Estimate } from "../../src/core/estimate.ts";
import type { Law, LawQuantity } from "../../src/laws/law.ts";

const cdf = (x: number): number => Math.exp(-Math.exp(-x));
const survival = (x: number): number => -Math.expm1(-Math.exp(-x));
const logSurvival = (x: number): number => (x > 30 ? -x - Math.exp(-x) / 2 : Math.log(survival(x)));
const logPdf = (x: number): number => -x - Math.exp(-x);
const quantile = (p: number): number => -Math.log(-Math.log(p));
const upperQuantile = (q: number): number => -Math.log(-Math.log1p(-q));

function each(f: (x: number) => number): (x: Float64Array, out: Float64Array) => void {
  return (x, out) =>
    x.forEach((value, i) => {
      out[i] = f(value);
    });
}

export interface GumbelOptions {
  /** Relative error that `estimate` states. */
  readonly relativeError?: number;
  readonly converged?: boolean;
  readonly symbol?: string;
  readonly name?: string;
}

/** A law with known formulas and a stated error. */
export function gumbelLaw(options: GumbelOptions = {}): Law {
  const { relativeError = 1e-14, converged = true, symbol = "Gumbel", name = "Gumbel, maxima" } = options;
  const functions: Record<LawQuantity, (x: number) => number> = {
    pdf: (x) => Math.exp(logPdf(x)),
    cdf,
    survival,
    logPdf,
    logCdf: (x) => -Math.exp(-x),
    logSurvival,
    quantile,
    upperQuantile,
  };
  return {
    name,
    symbol,
    support: [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY],
    accuracy: {
      cdfAbsolute: 2e-16,
      cdfRelative: 1e-14,
      survivalRelative: 1e-14,
      pdfAbsolute: 1e-15,
      quantileAbsolute: 1e-14,
      momentAbsolute: 1e-12,
    },
    provenance: {
      formula: "F(x) = exp(−exp(−x))",
      source: "E. J. Gumbel, Statistics of Extremes (1958)",
      convention: "location 0, scale 1",
    },
    ...functions,
    quantileFromLog: (l: number) => -Math.log(-l),
    upperQuantileFromLog: (l: number) => upperQuantile(Math.exp(l)),
    mean: 0.5772156649015329,
    variance: Math.PI ** 2 / 6,
    skewness: 1.1395470994046486,
    excessKurtosis: 2.4,
    cumulant: (k) => (k === 1 ? 0.5772156649015329 : Math.PI ** 2 / 6),
    pdfInto: each(functions.pdf),
    cdfInto: each(cdf),
    survivalInto: each(survival),
    logPdfInto: each(logPdf),
    logCdfInto: each(functions.logCdf),
    logSurvivalInto: each(logSurvival),
    quantileInto: each(quantile),
    upperQuantileInto: each(upperQuantile),
    sample: (count, generator) => Float64Array.from({ length: count }, () => quantile(generator())),
    estimate(what, x): Estimate {
      const value = functions[what](x);
      return { value, error: Math.abs(value) * relativeError, errorKind: "estimate", converged, order: 1 };
    },
  };
}
