/**
 * Special functions that the kernels need.
 *
 * @packageDocumentation
 */
export { InvalidArgumentError } from "../core/errors.ts";
export type { Arithmetic } from "../core/web-assembly.ts";
export * from "./airy.ts";
