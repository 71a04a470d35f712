/**
 * The real Airy functions, one door: Ai and Ai' (airy-pair.ts), ∫_x^∞ Ai (airy-integral.ts), ∫_x^∞ Ai²
 * (airy-square-integral.ts) and the exponent of the scaled forms (airy-exponent.ts). Nothing is computed here.
 */
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
