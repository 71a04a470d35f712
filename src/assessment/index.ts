/**
 * Data in, verdict out: largest-root tests and samples against a law.
 *
 * @packageDocumentation
 */
export { InvalidArgumentError, InvalidDataError } from "../core/errors.ts";
export { andersonDarlingLimitSurvival } from "./anderson-darling.ts";
export { formatPValue } from "./format-p-value.ts";
export { kolmogorovSurvival } from "./kolmogorov-smirnov.ts";
export {
  type ConstantsChoice,
  largestRootTest,
  type RootConstants,
  type RootTestInput,
  type RootTestOptions,
  type RootTestResult,
  type RootTestStep,
  rootConstants,
} from "./largest-root.ts";
export { type NumericTable, type NumericTableOptions, readNumericTable } from "./numeric-table.ts";
export { type CovarianceOptions, type CovarianceSpectrum, covarianceSpectrum } from "./sample-covariance.ts";
export {
  type DistanceTest,
  type MomentComparison,
  type SampleTestResult,
  sampleTest,
} from "./sample-test.ts";
export type { Probability, TailProbability } from "./tail-probability.ts";
