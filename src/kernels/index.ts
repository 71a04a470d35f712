/**
 * Kernels: built in, by generators, by formula.
 *
 * @packageDocumentation
 */
export type { Decay, IntegrableKernel, Kernel, KernelTraits, SmoothKernel } from "../determinant/kernel.ts";
export { airyKernel } from "./airy-kernel.ts";
export { airySumKernel } from "./airy-sum-kernel.ts";
export { type IntegrableKernelParts, integrableKernel, type RealFunction } from "./integrable-kernel.ts";
export { type SmoothKernelOptions, smoothKernel } from "./smooth-kernel.ts";
