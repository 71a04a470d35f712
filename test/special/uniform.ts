/** Evenly spread reals for property tests: fast-check's own doubles are even in their bits, so mostly tiny. */
import fc from "fast-check";

export function uniform(min: number, max: number): fc.Arbitrary<number> {
  return fc.integer({ min: 0, max: 2 ** 31 }).map((k) => min + ((max - min) * k) / 2 ** 31);
}
