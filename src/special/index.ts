/**
 * Special functions that the kernels need.
 *
 * @packageDocumentation
 */
export { InvalidArgumentError } from "../core/errors.ts";
export * from "./airy.ts";
