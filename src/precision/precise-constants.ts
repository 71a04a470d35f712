/**
 * Constants to many digits.
 */
import { logTenFixed, logTwoFixed, piFixed } from "./constants.ts";
import { eulerGammaFixed } from "./euler-gamma.ts";
import type { PreciseEstimate } from "./precise-estimate.ts";
import { digitsOf, type PreciseOptions, refine } from "./refine.ts";
import { zetaPrimeFixed } from "./zeta-derivative.ts";

function constant(options: PreciseOptions, fixed: (bits: bigint) => bigint): PreciseEstimate {
  return refine(digitsOf(options), 0, (bits) => ({ value: fixed(bits), bits, units: 1n }));
}

/**
 * π.
 *
 * @param options - `digits` from 1 to 1000.
 * @returns The value with a relative error of at most 10^−digits, proved. Source: D. and G. Chudnovsky's series for 1/π (1988).
 * Remembered per precision.
 * @throws {@link InvalidArgumentError} for other digits.
 * @category Arbitrary precision
 * @since 0.2.0
 */
export function precisePi(options: PreciseOptions): PreciseEstimate {
  return constant(options, piFixed);
}

/**
 * log 2.
 *
 * @param options - `digits` from 1 to 1000.
 * @returns The value with a relative error of at most 10^−digits, proved. Source: inverse hyperbolic tangents of 1/31, 1/49, 1/161.
 * Remembered per precision.
 * @throws {@link InvalidArgumentError} for other digits.
 * @category Arbitrary precision
 * @since 0.2.0
 */
export function preciseLogTwo(options: PreciseOptions): PreciseEstimate {
  return constant(options, logTwoFixed);
}

/**
 * log 10.
 *
 * @param options - `digits` from 1 to 1000.
 * @returns The value with a relative error of at most 10^−digits, proved. Source: inverse hyperbolic tangents of 1/31, 1/49, 1/161.
 * Remembered per precision.
 * @throws {@link InvalidArgumentError} for other digits.
 * @category Arbitrary precision
 * @since 0.2.0
 */
export function preciseLogTen(options: PreciseOptions): PreciseEstimate {
  return constant(options, logTenFixed);
}

/**
 * Euler's constant γ = 0.5772….
 *
 * @param options - `digits` from 1 to 1000.
 * @returns The value with a relative error of at most 10^−digits, proved. Source: Brent and McMillan, Math. Comp. 34 (1980).
 * Remembered per precision.
 * @throws {@link InvalidArgumentError} for other digits.
 * @category Arbitrary precision
 * @since 0.2.0
 */
export function preciseEulerGamma(options: PreciseOptions): PreciseEstimate {
  return constant(options, eulerGammaFixed);
}

/**
 * ζ′(−1) = −0.1654…, the derivative of Riemann's zeta function at −1.
 *
 * @param options - `digits` from 1 to 1000.
 * @returns The value with a relative error of at most 10^−digits, proved. Source: DLMF 25.4.2 with Cohen, Rodriguez Villegas and Zagier's summation of η′(2) (2000).
 * Remembered per precision.
 * @throws {@link InvalidArgumentError} for other digits.
 * @category Arbitrary precision
 * @since 0.2.0
 */
export function preciseZetaPrime(options: PreciseOptions): PreciseEstimate {
  return constant(options, zetaPrimeFixed);
}
