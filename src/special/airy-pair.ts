/**
 * The Airy function Ai(x) and its derivative, real x, alone and together, plain and scaled.
 *
 *   |x| ≤ 20   Taylor series about the nearest of 161 centres (airy-taylor.ts)
 *   |x| > 20   asymptotic series with a two-part exponent or phase (airy-asymptotic.ts, airy-exponent.ts)
 *
 * The scaled forms are e^{ζ}Ai, e^{ζ}Ai', ζ = (2/3) x^{3/2}, for x ≥ 0 and plain Ai, Ai' for x < 0. Single, pair and
 * array forms run the same operations and so agree bit for bit.
 */
import { requireInteger } from "../core/check.ts";
import { InvalidArgumentError } from "../core/errors.ts";
import { type Arithmetic, requireArithmetic } from "../core/web-assembly.ts";
import {
  decayingAi,
  decayingAiPrime,
  decayingAiPrimeScaled,
  decayingAiScaled,
  oscillatingAi,
  oscillatingAiPrime,
  oscillatingPairInto,
  requirePhase,
} from "./airy-asymptotic.ts";
import { compiledTable, runPairs } from "./airy-compiled.ts";
import { scaleUp } from "./airy-exponent.ts";
import {
  centre,
  INTERLEAVED_LENGTH,
  interleaveTable,
  nearestCentre,
  TABLE_LIMIT,
  taylorAi,
  taylorAiPrime,
  taylorTable,
} from "./airy-taylor.ts";

/** From so many points on the compiled form pays. */
const COMPILED_FROM = 4;
const compiledPairs = /* @__PURE__ */ compiledTable(INTERLEAVED_LENGTH, interleaveTable);

/**
 * Airy function Ai(x), the solution of w″ = x w that decays as x → +∞.
 *
 * @param x - Real. NaN passes through; Ai(±∞) = 0.
 * @returns Ai(x); 0 where it underflows (x > 107.4), with fewer digits from 103.9 on, where it is subnormal.
 * @throws {@link InvalidArgumentError} for finite x < −1e10, where the phase has lost all digits.
 *
 * **Error.** Estimate: the largest found against mpmath at 60 000 points. Relative for x ≥ 0: 3.2e-16 on [0, 20],
 * 4.9e-16 on [20, 103.8]; relative to the modulus √(Ai² + Bi²) for x < 0: 1.7e-16 on [−20, 0], 4.7e-16 on [−50, −20].
 * Tests hold 6e-16 on [−1e10, 103.5].
 * **Cost.** About 14 ns for |x| ≤ 20, 35 ns beyond 20, 60–110 ns below −20. The first call builds a table (2 ms).
 * **Source.** DLMF 9.2, 9.7.
 *
 * @example
 * airyAi(0); // 0.3550280538878172
 *
 * @category Special functions
 * @since 0.1.0
 */
export function airyAi(x: number): number {
  if (isTabulated(x)) {
    const j = nearestCentre(x);
    return taylorAi(taylorTable(), j, x - centre(j));
  }
  if (x > 0) return decayingAi(x);
  if (x === Number.NEGATIVE_INFINITY) return 0;
  requirePhase(x);
  return oscillatingAi(x);
}

/**
 * Derivative Ai'(x) of the Airy function.
 *
 * @param x - Real. NaN passes through; Ai'(+∞) = 0.
 * @returns Ai'(x); 0 where it underflows (x > 107.7), subnormal from 104.1.
 * @throws {@link InvalidArgumentError} for x < −1e10, −∞ included: there is no limit.
 *
 * **Error.** As {@link airyAi}, to the modulus √(Ai'² + Bi'²) for x < 0: 4.5e-16 on [0, 20], 4.4e-16 on [20, 104],
 * 1.9e-16 on [−20, 0], 5.5e-16 on [−50, −20].
 * **Cost, source.** As {@link airyAi}.
 *
 * @example
 * airyAiPrime(0); // -0.2588194037928068
 *
 * @category Special functions
 * @since 0.1.0
 */
export function airyAiPrime(x: number): number {
  if (isTabulated(x)) {
    const j = nearestCentre(x);
    return taylorAiPrime(taylorTable(), j, x - centre(j));
  }
  if (x > 0) return decayingAiPrime(x);
  requirePhase(x);
  return oscillatingAiPrime(x);
}

/**
 * Ai(x) and Ai'(x) in one evaluation, without allocation.
 *
 * @param x - Real, as for {@link airyAiPrime}.
 * @param out - Length ≥ 2; Ai(x) goes to out[0], Ai'(x) to out[1].
 * @throws {@link InvalidArgumentError} for x < −1e10 or a short `out`.
 *
 * **Error.** As {@link airyAi}, {@link airyAiPrime}, the same bits.
 *
 * @category Special functions
 * @since 0.1.0
 */
export function airyPair(x: number, out: Float64Array): void {
  requireRoom("out", out, 2);
  writePair(x, out, 0, out, 1);
}

/**
 * Ai and Ai' on an array of points, without allocation.
 *
 * @param x - Points; entries 0 … count − 1 are read.
 * @param ai - Receives Ai(x[i]).
 * @param aiPrime - Receives Ai'(x[i]); must not be `ai`. Either may be `x` itself.
 * @param count - Number of points, at most the length of each array.
 * @param arithmetic - Compiled or plain loops; the bits are the same. Default `"automatic"`.
 * @throws {@link InvalidArgumentError} for a short array, at the first x[i] < −1e10, or for `"wasm"` where that cannot
 *   be had.
 *
 * **Error.** As {@link airyAi}, {@link airyAiPrime}, the same bits.
 * **Cost.** For |x| ≤ 20 about 10 ns a pair compiled, 20 ns plain.
 *
 * @category Special functions
 * @since 0.1.0
 */
export function airyPairInto(
  x: Float64Array,
  ai: Float64Array,
  aiPrime: Float64Array,
  count: number,
  arithmetic: Arithmetic = "automatic",
): void {
  requireArrays(x, ai, aiPrime, count);
  requireArithmetic("arithmetic", arithmetic);
  fillPairs(x, ai, aiPrime, count, arithmetic);
}

/** {@link airyPairInto} without checks, for kernels. */
export function fillPairs(
  x: Float64Array,
  ai: Float64Array,
  aiPrime: Float64Array,
  count: number,
  arithmetic: Arithmetic,
): void {
  const found = count < COMPILED_FROM && arithmetic !== "wasm" ? undefined : compiledPairs(arithmetic);
  let i = 0;
  while (found !== undefined && i < count) {
    i = runPairs(found, x, ai, aiPrime, i, count);
    // The compiled loop stops at a point outside the table.
    for (; i < count && !isTabulated(x[i]); i++) writePair(x[i], ai, i, aiPrime, i);
  }
  for (; i < count; i++) writePair(x[i], ai, i, aiPrime, i);
}

/**
 * Scaled Airy function e^{ζ}Ai(x), ζ = (2/3) x^{3/2}, for x ≥ 0; plain Ai(x) for x < 0.
 *
 * @param x - Real. NaN passes through; the limit at +∞ is 0.
 * @returns A number that neither underflows nor overflows at any large x.
 * @throws {@link InvalidArgumentError} for finite x < −1e10.
 *
 * **Error.** Estimate, relative, x ≥ 0: 5.2e-16 found on [0, 20], 3.7e-16 beyond. Below 0 as {@link airyAi}.
 *
 * @category Special functions
 * @since 0.1.0
 */
export function airyAiScaled(x: number): number {
  if (x > TABLE_LIMIT) return decayingAiScaled(x);
  return x > 0 ? scaleUp(x, airyAi(x)) : airyAi(x);
}

/**
 * Scaled derivative e^{ζ}Ai'(x), ζ = (2/3) x^{3/2}, for x ≥ 0; plain Ai'(x) for x < 0.
 *
 * @param x - Real. NaN passes through; the limit at +∞ is −∞ (it grows like −x^{1/4} / (2√π)).
 * @throws {@link InvalidArgumentError} for x < −1e10.
 *
 * **Error.** Estimate, relative, x ≥ 0: 5.5e-16 found on [0, 20], 3.6e-16 beyond. Below 0 as {@link airyAiPrime}.
 *
 * @category Special functions
 * @since 0.1.0
 */
export function airyAiPrimeScaled(x: number): number {
  if (x > TABLE_LIMIT) return decayingAiPrimeScaled(x);
  return x > 0 ? scaleUp(x, airyAiPrime(x)) : airyAiPrime(x);
}

/**
 * Scaled Ai and Ai' together: {@link airyAiScaled} to out[0], {@link airyAiPrimeScaled} to out[1], the same bits.
 *
 * @param x - Real, as for {@link airyAiPrimeScaled}.
 * @param out - Length ≥ 2.
 * @throws {@link InvalidArgumentError} for x < −1e10 or a short `out`.
 *
 * @category Special functions
 * @since 0.1.0
 */
export function airyPairScaled(x: number, out: Float64Array): void {
  requireRoom("out", out, 2);
  writeScaledPair(x, out, 0, out, 1);
}

/**
 * Scaled Ai and Ai' on an array of points; arguments as {@link airyPairInto}, values as {@link airyAiScaled} and
 * {@link airyAiPrimeScaled}, the same bits.
 *
 * @throws {@link InvalidArgumentError} for a short array, or at the first x[i] < −1e10.
 *
 * @category Special functions
 * @since 0.1.0
 */
export function airyPairScaledInto(
  x: Float64Array,
  ai: Float64Array,
  aiPrime: Float64Array,
  count: number,
): void {
  requireArrays(x, ai, aiPrime, count);
  for (let i = 0; i < count; i++) writeScaledPair(x[i], ai, i, aiPrime, i);
}

function isTabulated(x: number): boolean {
  return x >= -TABLE_LIMIT && x <= TABLE_LIMIT;
}

/** Ai(x) into ai[i], Ai'(x) into aiPrime[k]. */
function writePair(x: number, ai: Float64Array, i: number, aiPrime: Float64Array, k: number): void {
  if (isTabulated(x)) {
    const table = taylorTable();
    const j = nearestCentre(x);
    const t = x - centre(j);
    ai[i] = taylorAi(table, j, t);
    aiPrime[k] = taylorAiPrime(table, j, t);
  } else if (x < -TABLE_LIMIT) {
    requirePhase(x);
    oscillatingPairInto(x, ai, i, aiPrime, k);
  } else {
    ai[i] = decayingAi(x);
    aiPrime[k] = decayingAiPrime(x);
  }
}

/** The same, scaled. */
function writeScaledPair(x: number, ai: Float64Array, i: number, aiPrime: Float64Array, k: number): void {
  if (!(x > 0)) {
    writePair(x, ai, i, aiPrime, k);
    return;
  }
  const value = airyAiScaled(x);
  aiPrime[k] = airyAiPrimeScaled(x);
  ai[i] = value;
}

function requireRoom(argument: string, array: unknown, length: number): void {
  if (!(array instanceof Float64Array) || array.length < length) {
    throw new InvalidArgumentError(argument, `a Float64Array of length ≥ ${length}`, array);
  }
}

function requireArrays(x: Float64Array, ai: Float64Array, aiPrime: Float64Array, count: number): void {
  requireInteger("count", count, 0, Number.MAX_SAFE_INTEGER);
  requireRoom("x", x, count);
  requireRoom("ai", ai, count);
  requireRoom("aiPrime", aiPrime, count);
  if (ai === aiPrime) throw new InvalidArgumentError("aiPrime", "an array other than ai", aiPrime);
}
