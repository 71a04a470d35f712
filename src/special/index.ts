/**
 * Special functions that the kernels need.
 *
 * @packageDocumentation
 */
export { InvalidArgumentError } from "../core/errors.ts";
export { airyExponent } from "./airy-exponent.ts";
export { airyAiIntegral, airyAiIntegralScaled } from "./airy-integral.ts";
export {
  airyAi,
  airyAiPrime,
  airyAiPrimeScaled,
  airyAiScaled,
  airyPair,
  airyPairInto,
  airyPairScaled,
  airyPairScaledInto,
} from "./airy-pair.ts";
export {
  airySquareIntegral,
  airySquareIntegralFrom,
  airySquareIntegralScaled,
} from "./airy-square-integral.ts";
