/**
 * Bernoulli numbers, exactly.
 */

/** B_{2k} = numerator / denominator; not in lowest terms. */
export interface BernoulliNumber {
  readonly numerator: bigint;
  readonly denominator: bigint;
}

let known: readonly BernoulliNumber[] = [];

/**
 * B_2, B_4, …, B_{2n} (and possibly more) as an array from index 0. Costs n² short products once, then nothing.
 *
 * From the tangent numbers, B_{2k} = (−1)^{k−1} 2k T_k / (4^k (4^k − 1)), by the recurrence without cancellation of
 * R. P. Brent, D. Harvey, Fast computation of Bernoulli, tangent and secant numbers (2013), algorithm TangentNumbers.
 */
export function bernoulliNumbers(n: number): readonly BernoulliNumber[] {
  if (known.length >= n) return known;
  const count = Math.max(n, 2 * known.length, 32);
  const tangent = [0n, 1n];
  for (let k = 2; k <= count; k++) tangent.push(BigInt(k - 1) * tangent[k - 1]);
  for (let k = 2; k <= count; k++) {
    for (let j = k; j <= count; j++) {
      tangent[j] = BigInt(j - k) * tangent[j - 1] + BigInt(j - k + 2) * tangent[j];
    }
  }
  known = tangent.slice(1).map((t, index) => {
    const k = BigInt(index + 1);
    const power = 1n << (2n * k);
    return { numerator: (k % 2n === 1n ? 2n * k : -2n * k) * t, denominator: power * (power - 1n) };
  });
  return known;
}
