/**
 * Seeded uniform generator: xoshiro128** (D. Blackman, S. Vigna, "Scrambled linear pseudorandom number
 * generators", ACM Trans. Math. Softw. 47 (2021) 36), seeded by SplitMix32-style mixing.
 *
 * Nothing in the library calls `Math.random`; every sampler takes a generator like this one.
 */
import { requireInteger } from "./check.ts";

/** Returns independent uniform numbers strictly inside (0, 1). */
export type UniformGenerator = () => number;

/**
 * A reproducible uniform generator.
 *
 * @param seed - Integer from 0 to 2³² − 1; the same seed gives the same sequence everywhere.
 * @returns A function that returns the next uniform number in (0, 1), 53 random bits each.
 * @throws {@link InvalidArgumentError} if the seed is not such an integer.
 */
export function seededGenerator(seed: number): UniformGenerator {
  let mix = requireInteger("seed", seed, 0, 0xffffffff) >>> 0;
  const nextMix = (): number => {
    mix = (mix + 0x9e3779b9) >>> 0;
    let z = mix;
    z = Math.imul(z ^ (z >>> 16), 0x85ebca6b);
    z = Math.imul(z ^ (z >>> 13), 0xc2b2ae35);
    return (z ^ (z >>> 16)) >>> 0;
  };
  let a = nextMix();
  let b = nextMix();
  let c = nextMix();
  let d = nextMix();
  const next32 = (): number => {
    const m = Math.imul(b, 5);
    const result = Math.imul((m << 7) | (m >>> 25), 9) >>> 0;
    const t = b << 9;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= t;
    d = (d << 11) | (d >>> 21);
    return result;
  };
  // 53 bits, centred in their cell so that neither 0 nor 1 can occur.
  return () => ((next32() >>> 5) * 67108864 + (next32() >>> 6) + 0.5) / 9007199254740992;
}
