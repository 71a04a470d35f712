/**
 * A sample against a fully specified law: standardized moments beside the law's with standard errors,
 * Kolmogorov–Smirnov and Anderson–Darling distances with p-values.
 */
import { InvalidArgumentError, InvalidDataError } from "../core/errors.ts";
import type { Law, LawProvenance } from "../laws/law.ts";
import { gaussLegendreShared } from "../quadrature/gauss-legendre.ts";
import { andersonDarlingDistance, type DistanceTest, kolmogorovSmirnovDistance } from "./sample-distances.ts";

export type { DistanceTest } from "./sample-distances.ts";

/** A sample moment beside the law's. */
export interface MomentComparison {
  readonly name: "mean" | "variance" | "skewness" | "excess kurtosis";
  readonly sample: number;
  readonly law: number;
  /** Standard deviation of the sample figure if the law is true (leading order in 1/n for the last two). */
  readonly standardError: number;
  /** (sample − law) / standardError. */
  readonly z: number;
}

/** Outcome of {@link sampleTest}. */
export interface SampleTestResult {
  readonly count: number;
  readonly lawName: string;
  readonly lawSymbol: string;
  readonly provenance: LawProvenance;
  readonly moments: readonly MomentComparison[];
  readonly distances: readonly DistanceTest[];
  /** The sample in increasing order. */
  readonly sorted: Float64Array;
  readonly assumptions: readonly string[];
}

const MOST_OBSERVATION = 1e75; // the logarithms of its tail probabilities are still numbers

/**
 * Compares a sample with a law.
 *
 * @param sample - At least 5 finite numbers, in the variable of the law.
 * @param law - A fully specified law: nothing in it was fitted to this sample.
 * @throws {@link InvalidDataError} for a short sample, a number that is not finite, or observations outside the support, or
 *   numbers that are all equal.
 *
 * Cost: sorting, and at most seven evaluations of the law for each observation.
 */
export function sampleTest(sample: ArrayLike<number>, law: Law): SampleTestResult {
  if (sample === null || typeof sample !== "object" || typeof sample.length !== "number") {
    throw new InvalidArgumentError("sample", "an array of numbers", sample);
  }
  const count = sample.length;
  if (count < 5) throw new InvalidDataError("sample", "at least 5 numbers", count);
  for (let i = 0; i < count; i++) {
    const x = sample[i];
    if (typeof x !== "number" || !Number.isFinite(x)) {
      throw new InvalidDataError("sample", "finite numbers", x, { row: i + 1 });
    }
    if (Math.abs(x) > MOST_OBSERVATION) {
      throw new InvalidDataError("sample", `numbers of size ≤ ${MOST_OBSERVATION}`, x, { row: i + 1 });
    }
    if (!(x > law.support[0] && x < law.support[1])) {
      throw new InvalidDataError("sample", `numbers inside the support of ${law.symbol}`, x, { row: i + 1 });
    }
  }
  const sorted = Float64Array.from(sample).sort();
  if (sorted[0] === sorted[count - 1]) {
    throw new InvalidDataError("sample", "numbers that are not all equal", sorted[0]);
  }
  return {
    count,
    lawName: law.name,
    lawSymbol: law.symbol,
    provenance: law.provenance,
    moments: compareMoments(sorted, law),
    distances: [kolmogorovSmirnovDistance(sorted, law), andersonDarlingDistance(sorted, law)],
    sorted,
    assumptions: [
      "The observations are independent and the law is fully specified: if its location or scale was fitted to this sample, these p-values are too large.",
      "Standard errors are those of a sample of this size from the law itself; for skewness and kurtosis to leading order in 1/n.",
      "The Anderson–Darling p-value is that of the limit for large samples; its distance from the finite-sample one is inside the stated error.",
    ],
  };
}

function compareMoments(sorted: Float64Array, law: Law): MomentComparison[] {
  const n = sorted.length;
  const m = standardizedMoments(law);
  let mean = 0;
  for (let i = 0; i < n; i++) mean += (sorted[i] - mean) / (i + 1);
  // In units of the widest deviation, so that no power overflows.
  const unit = Math.max(sorted[n - 1] - mean, mean - sorted[0]);
  const power = [0, 0, 0, 0, 0];
  for (const x of sorted) for (let k = 2; k <= 4; k++) power[k] += ((x - mean) / unit) ** k / n;
  const variance = ((power[2] * n) / (n - 1)) * unit * unit;
  const skewness = power[3] / power[2] ** 1.5;
  const kurtosis = power[4] / power[2] ** 2 - 3;
  const sigma2 = law.variance;
  const row = (
    name: MomentComparison["name"],
    sample: number,
    exact: number,
    error: number,
  ): MomentComparison => ({
    name,
    sample,
    law: exact,
    standardError: error,
    z: (sample - exact) / error,
  });
  // Delta method on central moments in units of the standard deviation (M. Kendall, A. Stuart, The Advanced Theory of
  // Statistics 1, ch. 10): variances of √n times the sample skewness and kurtosis.
  const skewVariance = m[6] - 6 * m[4] + 9 + (m[3] * m[3] * (35 + 9 * m[4])) / 4 - 3 * m[3] * m[5];
  const kurtVariance =
    m[8] -
    4 * m[4] * m[6] -
    8 * m[5] * m[3] +
    4 * m[4] ** 3 -
    m[4] ** 2 +
    16 * m[4] * m[3] ** 2 +
    16 * m[3] ** 2;
  return [
    row("mean", mean, law.mean, Math.sqrt(sigma2 / n)),
    row("variance", variance, sigma2, sigma2 * Math.sqrt((m[4] - 1) / n + 2 / (n * (n - 1)))),
    row("skewness", skewness, law.skewness, Math.sqrt(skewVariance / n)),
    row("excess kurtosis", kurtosis, law.excessKurtosis, Math.sqrt(kurtVariance / n)),
  ];
}

/** Central moments of the law up to order 8 in units of its standard deviation, by quadrature of its density. */
function standardizedMoments(law: Law): number[] {
  const { nodes, weights } = gaussLegendreShared(20);
  const lower = law.quantile(1e-30);
  const upper = law.upperQuantile(1e-30);
  const sigma = Math.sqrt(law.variance);
  const panels = Math.ceil((upper - lower) / sigma);
  const half = (upper - lower) / panels / 2;
  const moments = new Array<number>(9).fill(0);
  for (let p = 0; p < panels; p++) {
    for (let i = 0; i < nodes.length; i++) {
      const x = lower + half * (2 * p + 1 + nodes[i]);
      let term = half * weights[i] * law.pdf(x);
      for (let k = 0; k <= 8; k++) {
        moments[k] += term;
        term *= (x - law.mean) / sigma;
      }
    }
  }
  return moments;
}
