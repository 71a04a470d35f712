/**
 * Any number of digits up to 1000: special functions and constants, Gauss rules, Fredholm determinants with their
 * derivatives, and the Tracy–Widom laws, each with its error.
 *
 * @packageDocumentation
 */
export { InvalidArgumentError } from "../core/errors.ts";
export * from "./airy-kernels.ts";
export { preciseBesselKernel } from "./bessel-kernel.ts";
export type { ExactInput, PreciseInput } from "./decimal.ts";
export { type PreciseQuadratureRule, preciseGaussLegendre } from "./gauss-rules.ts";
export * from "./precise-airy.ts";
export type { PreciseArithmetic } from "./precise-arithmetic.ts";
export * from "./precise-bessel.ts";
export * from "./precise-constants.ts";
export {
  type PreciseDeterminant,
  type PreciseDeterminantOptions,
  preciseDeterminant,
} from "./precise-determinant.ts";
export * from "./precise-elementary.ts";
export type { PreciseEstimate } from "./precise-estimate.ts";
export * from "./precise-gamma.ts";
export * from "./precise-kernel.ts";
export {
  type PreciseLawValues,
  type PreciseTracyWidomOptions,
  preciseTracyWidom,
} from "./precise-tracy-widom.ts";
export type { PreciseOptions } from "./refine.ts";
export { preciseSineKernel } from "./sine-kernel.ts";
