/**
 * Probability laws of extreme eigenvalues.
 *
 * @packageDocumentation
 */
export type { Estimate } from "../core/estimate.ts";
export { seededGenerator, type UniformGenerator } from "../core/random.ts";
export type { Law, LawAccuracy, LawProvenance, LawQuantity } from "./law.ts";
export { type QuaternionScaling, type TracyWidomOptions, tracyWidom } from "./tracy-widom.ts";
export type { Beta } from "./tracy-widom-exact.ts";
