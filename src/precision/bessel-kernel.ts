/**
 * The Bessel kernel of the hard edge for any number of digits, on (0, s):
 *
 *   K(x, y) = (J_α(√x) √y J_α′(√y) − √x J_α′(√x) J_α(√y)) / (2 (x − y)).
 *
 * With the entire function φ(x) = J_α(√x)/x^{α/2} it is (x y)^{α/2} (φ(x) y φ′(y) − x φ′(x) φ(y))/(x − y): the power goes
 * into the weight x^α of the Gauss rule, which so converges as fast for every α > −1.
 *
 * P. J. Forrester, Nucl. Phys. B 402 (1993) 709; C. Tracy, H. Widom, Commun. Math. Phys. 161 (1994) 289.
 */
import { InvalidArgumentError } from "../core/errors.ts";
import { besselEntirePairFixed } from "./bessel-fixed.ts";
import {
  numberFromExact,
  type PreciseInput,
  type Rational,
  rationalFromExact,
  readExact,
} from "./decimal.ts";
import type { PreciseArithmetic } from "./precise-arithmetic.ts";
import type { PreciseIntegrableKernel } from "./precise-kernel.ts";

/**
 * φ_ν, φ_{ν+1}, …, φ_{ν+count−1} at x: the last two directly, the others by φ_{k−1} = 2k φ_k − x φ_{k+1} (DLMF 10.6.1),
 * in which direction nothing is lost.
 */
function entireSequence(order: Rational, x: bigint, bits: bigint, count: number): bigint[] {
  const { numerator, denominator } = order;
  const at = (k: number): Rational => ({ numerator: numerator + BigInt(k) * denominator, denominator });
  const out: bigint[] = new Array(count);
  const guard = BigInt(8 * count + 8);
  const inner = bits + guard;
  const argument = x << guard;
  const [a, b] = besselEntirePairFixed(at(count - 2), argument, inner);
  out[count - 2] = a;
  out[count - 1] = b;
  for (let k = count - 3; k >= 0; k--) {
    const { numerator: p } = at(k + 1);
    out[k] = (2n * p * out[k + 1]) / denominator - ((argument * out[k + 2]) >> inner);
  }
  return out.map((v) => v >> guard);
}

/**
 * The Bessel kernel with parameter α, for intervals (0, s).
 *
 * @param alpha - α > −1, taken exactly; at most 1000.
 * @throws {@link InvalidArgumentError} for another α.
 *
 * @category Precise determinants
 * @since 0.2.0
 */
export function preciseBesselKernel(alpha: PreciseInput): PreciseIntegrableKernel {
  const exact = readExact("alpha", alpha);
  const near = numberFromExact(exact);
  if (!(near > -1 && near <= 1000))
    throw new InvalidArgumentError("alpha", "a number above -1 and at most 1000", alpha);
  const order = rationalFromExact(exact);
  return Object.freeze({
    kind: "integrable",
    name: `Bessel, α = ${near}`,
    rank: 2,
    antisymmetricPair: true,
    contraction: true,
    weightExponent: exact,
    generators:
      ({ bits }: PreciseArithmetic, terms: number) =>
      (x: bigint) => {
        // φ_ν′ = −½ φ_{ν+1}: the k-th coefficient is (−½)^k φ_{ν+k} / k!.
        const sequence = entireSequence(order, x, bits, terms + 2);
        const first: bigint[] = [];
        let scale = 1n;
        sequence.forEach((v, k) => {
          if (k > 0) scale *= -2n * BigInt(k);
          first.push(v / scale);
        });
        // x φ′ about x: x (k+1) a_{k+1} + k a_k.
        const second = first
          .slice(0, terms + 1)
          .map((c, k) => ((x * BigInt(k + 1) * first[k + 1]) >> bits) + BigInt(k) * c);
        return [first, second];
      },
    decay: undefined,
  });
}
