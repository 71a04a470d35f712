/**
 * The one interface that every continuous law answers, and the words it uses about itself.
 */
import type { Estimate } from "../core/estimate.ts";
import type { UniformGenerator } from "../core/random.ts";

/** What {@link Law.estimate} can be asked for. For the quantiles the argument is a probability. */
export type LawQuantity =
  | "pdf"
  | "cdf"
  | "survival"
  | "logPdf"
  | "logCdf"
  | "logSurvival"
  | "quantile"
  | "upperQuantile";

/**
 * Stated worst errors of the fast route, each with the range in which it holds. They are tested as stated.
 */
export interface LawAccuracy {
  /** Worst absolute error of `cdf`, anywhere. */
  readonly cdfAbsolute: number;
  /** Worst relative error of `cdf` in the left tail, down to 1e-300. */
  readonly cdfRelative: number;
  /** Worst relative error of `survival`, down to 1e-300. */
  readonly survivalRelative: number;
  /** Worst absolute error of `pdf`, anywhere. */
  readonly pdfAbsolute: number;
  /** Worst absolute error of `quantile` and `upperQuantile` for probabilities from 1e-3 to 1 − 1e-3. */
  readonly quantileAbsolute: number;
  /** Worst absolute error of the mean, variance, skewness, excess kurtosis and cumulants. */
  readonly momentAbsolute: number;
}

/** Where a number comes from, for reports. */
export interface LawProvenance {
  /** The formula used, in words and symbols. */
  readonly formula: string;
  /** Published source of the formula. */
  readonly source: string;
  /** The convention (scaling) in which the variable is measured. */
  readonly convention: string;
}

/** A continuous probability law. Pointwise methods return NaN for NaN and never throw on a number. */
export interface Law {
  /** Name for people: `"Tracy–Widom, β = 2"`. */
  readonly name: string;
  /** Short symbol: `"F2"`. */
  readonly symbol: string;
  /** End points of the support. */
  readonly support: readonly [number, number];
  /** Stated worst errors of the fast route. */
  readonly accuracy: LawAccuracy;
  /** Formula, source and convention. */
  readonly provenance: LawProvenance;

  /** Probability density at x. */
  pdf(x: number): number;
  /** P(X ≤ x). */
  cdf(x: number): number;
  /** P(X > x), to full relative accuracy. */
  survival(x: number): number;
  /** log of {@link pdf}. */
  logPdf(x: number): number;
  /** log of {@link cdf}. */
  logCdf(x: number): number;
  /** log of {@link survival}. */
  logSurvival(x: number): number;

  /**
   * x with cdf(x) = p.
   * @param p - Probability strictly inside (0, 1).
   * @throws {@link InvalidArgumentError} outside (0, 1).
   */
  quantile(p: number): number;
  /**
   * x with survival(x) = q.
   * @param q - Upper tail probability strictly inside (0, 1), down to 1e-300.
   * @throws {@link InvalidArgumentError} outside (0, 1).
   */
  upperQuantile(q: number): number;
  /**
   * x with log cdf(x) = `logProbability`: for probabilities below the smallest double, or given as logarithms.
   * @param logProbability - Natural logarithm, −1e15 ≤ `logProbability` < 0.
   * @throws {@link InvalidArgumentError} outside that range.
   */
  quantileFromLog(logProbability: number): number;
  /**
   * x with log survival(x) = `logProbability`.
   * @param logProbability - Natural logarithm, −1e15 ≤ `logProbability` < 0.
   * @throws {@link InvalidArgumentError} outside that range.
   */
  upperQuantileFromLog(logProbability: number): number;

  /** Mean. */
  readonly mean: number;
  /** Variance. */
  readonly variance: number;
  /** Skewness. */
  readonly skewness: number;
  /** Excess kurtosis (0 for a normal law). */
  readonly excessKurtosis: number;
  /**
   * Cumulant of order k.
   * @param k - 1 to 6.
   * @throws {@link InvalidArgumentError} for any other k.
   */
  cumulant(k: number): number;

  /** {@link pdf} of every x into `out` (same length; may be the same array). */
  pdfInto(x: Float64Array, out: Float64Array): void;
  /** {@link cdf} of every x into `out`. */
  cdfInto(x: Float64Array, out: Float64Array): void;
  /** {@link survival} of every x into `out`. */
  survivalInto(x: Float64Array, out: Float64Array): void;
  /** {@link logPdf} of every x into `out`. */
  logPdfInto(x: Float64Array, out: Float64Array): void;
  /** {@link logCdf} of every x into `out`. */
  logCdfInto(x: Float64Array, out: Float64Array): void;
  /** {@link logSurvival} of every x into `out`. */
  logSurvivalInto(x: Float64Array, out: Float64Array): void;
  /** {@link quantile} of every p into `out`. */
  quantileInto(p: Float64Array, out: Float64Array): void;
  /** {@link upperQuantile} of every q into `out`. */
  upperQuantileInto(q: Float64Array, out: Float64Array): void;

  /**
   * Independent draws by inversion.
   * @param count - How many, an integer ≥ 0.
   * @param generator - Uniform generator on (0, 1), for instance from `seededGenerator`.
   */
  sample(count: number, generator: UniformGenerator): Float64Array;

  /**
   * The exact route (no table), with its error.
   * @param what - The quantity.
   * @param x - The point; for the quantiles, the probability.
   * @param options - Tolerances that `converged` is judged by; default 1e-12, absolute or relative.
   */
  estimate(
    what: LawQuantity,
    x: number,
    options?: { readonly absTol?: number; readonly relTol?: number },
  ): Estimate;
}

/** The six cumulants, mean, variance, skewness and excess kurtosis of a law. */
export interface LawMoments {
  readonly mean: number;
  readonly variance: number;
  readonly skewness: number;
  readonly excessKurtosis: number;
  /** κ₁ … κ₆. */
  readonly cumulants: readonly number[];
}
