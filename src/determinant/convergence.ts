/**
 * What the differences between successive orders say: whether refinement has settled, and how far it is from the limit.
 * Derivation: docs/mathematics.md § 3, "Quadrature".
 */

/** Whether a sequence has settled: what is left is rounding, or the differences have stopped falling just above it. */
export function quiet(differences: readonly number[], noise: number, scale: number): boolean {
  const k = differences.length - 1;
  const last = differences[k];
  const before = differences[k - 1];
  // One small difference may be chance: the one before must already predict an error below the noise.
  if (last <= noise && predicted(differences, scale) <= noise) return true;
  return (
    k >= 3 &&
    last <= 1e3 * noise &&
    last >= 0.25 * before &&
    before <= 1e3 * noise &&
    before >= 0.25 * differences[k - 2]
  );
}

/**
 * Error of the newest approximation when convergence is geometric in the order, err = S ρ^(−2n): as the order grows by
 * 4/3 at a time, err_k / S = (err_{k−1} / S)^(4/3), and the difference D_k is about err_{k−1}. The worst of the last
 * three differences speaks, so that one that is small by chance does not.
 */
function predicted(differences: readonly number[], scale: number): number {
  const k = differences.length - 1;
  let error = 0;
  for (let back = 0; back <= 2 && back <= k; back++) {
    error = Math.max(error, scale * Math.min(1, differences[k - back] / scale) ** ((4 / 3) ** (back + 1)));
  }
  return error;
}

/** Error of the newest of a sequence of approximations, from their differences. */
export function quadratureError(differences: readonly number[], settled: boolean, scale: number): number {
  const k = differences.length - 1;
  if (k < 0) return Number.POSITIVE_INFINITY;
  if (settled) {
    const falling = k > 0 && differences[k] < 0.25 * differences[k - 1];
    return falling ? differences[k] : Math.max(differences[k], differences[k - 1] ?? 0);
  }
  if (k < 1) return 10 * differences[k];
  // Algebraic convergence: the differences fall by a constant ratio.
  const ratio = (p: number): number => (differences[p - 1] > 0 ? differences[p] / differences[p - 1] : 1);
  const worst = k >= 2 ? Math.max(ratio(k), ratio(k - 1)) : ratio(k);
  const r = Math.min(Math.max(worst, 1e-3), 0.95);
  return 20 * Math.max((differences[k] * r) / (1 - r), predicted(differences, scale));
}
