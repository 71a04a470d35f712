/**
 * Fredholm determinants with their errors.
 *
 * @packageDocumentation
 */
export { InvalidArgumentError } from "../core/errors.ts";
export type { Estimate } from "../core/estimate.ts";
export type { Arithmetic } from "../core/web-assembly.ts";
export {
  type ComplexDeterminantEstimate,
  type ComplexDeterminantOptions,
  type ComplexNumber,
  complexDeterminant,
} from "./complex-determinant.ts";
export {
  type DeterminantEstimate,
  type DeterminantOptions,
  type DeterminantWithResolvent,
  determinantWithResolvent,
  fredholmDeterminant,
} from "./fredholm-determinant.ts";
export type { Decay, IntegrableKernel, Kernel, KernelTraits, SmoothKernel } from "./kernel.ts";
