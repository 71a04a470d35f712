/**
 * The sine kernel for any number of digits: K(x, y) = sin(x − y)/(π (x − y)), generators sin x and cos x / π.
 *
 * M. Gaudin, Nucl. Phys. 25 (1961) 447; F. J. Dyson, Commun. Math. Phys. 47 (1976) 171.
 */
import { piFixed } from "./constants.ts";
import type { PreciseArithmetic } from "./precise-arithmetic.ts";
import type { PreciseIntegrableKernel } from "./precise-kernel.ts";
import { sineCosineFixed } from "./trigonometric.ts";

/** The sequence f, g, −f, −g, f, … divided by k!: Taylor coefficients of a solution of f″ = −f. */
export function oscillation(value: bigint, slope: bigint, order: number): bigint[] {
  const out: bigint[] = [];
  let factorial = 1n;
  for (let k = 0; k <= order; k++) {
    if (k > 1) factorial *= BigInt(k);
    const derivative = (k & 1) === 0 ? value : slope;
    out.push(((k & 2) === 0 ? derivative : -derivative) / factorial);
  }
  return out;
}

const SINE: PreciseIntegrableKernel = Object.freeze({
  kind: "integrable",
  name: "sine",
  rank: 2,
  antisymmetricPair: true,
  contraction: true,
  weightExponent: undefined,
  generators: ({ bits }: PreciseArithmetic, order: number) => {
    const pi = piFixed(bits);
    return (x: bigint) => {
      const [sine, cosine] = sineCosineFixed(x, bits, bits);
      const second = oscillation(cosine, -sine, order).map((c) => (c << bits) / pi);
      return [oscillation(sine, cosine, order), second];
    };
  },
  decay: undefined,
});

/**
 * The sine kernel sin(x − y)/(π (x − y)), in units in which the density is 1/π: det(I − K) on (0, 2t) is the
 * probability that a gap of t/π mean spacings on either side holds no eigenvalue.
 *
 * @category Precise determinants
 * @since 0.2.0
 */
export function preciseSineKernel(): PreciseIntegrableKernel {
  return SINE;
}
