/**
 * edgelaw: Fredholm determinants of integrable kernels and the laws they define. The common names; the subpaths hold
 * the rest.
 *
 * @packageDocumentation
 */
export { InvalidArgumentError, InvalidDataError } from "./core/errors.ts";
export type { Estimate } from "./core/estimate.ts";
export { seededGenerator, type UniformGenerator } from "./core/random.ts";
export type { Arithmetic } from "./core/web-assembly.ts";
export {
  type DeterminantEstimate,
  type DeterminantOptions,
  fredholmDeterminant,
} from "./determinant/fredholm-determinant.ts";
export type { Decay, IntegrableKernel, Kernel, KernelTraits, SmoothKernel } from "./determinant/kernel.ts";
export { airyKernel } from "./kernels/airy-kernel.ts";
export {
  type IntegrableKernelParts,
  integrableKernel,
  type RealFunction,
} from "./kernels/integrable-kernel.ts";
export { type SmoothKernelOptions, smoothKernel } from "./kernels/smooth-kernel.ts";
export type { Law, LawAccuracy, LawProvenance, LawQuantity } from "./laws/law.ts";
export { type QuaternionScaling, type TracyWidomOptions, tracyWidom } from "./laws/tracy-widom.ts";
export type { Beta } from "./laws/tracy-widom-exact.ts";
export {
  type Domain,
  type HalfLine,
  halfLine,
  type Interval,
  interval,
  type Union,
  union,
} from "./quadrature/domain.ts";
export { gaussLegendre, type QuadratureRule } from "./quadrature/gauss-legendre.ts";
