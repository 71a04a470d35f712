/**
 * Extrapolation for kernels whose first derivative jumps across the diagonal (Green's functions, covariances of Markov
 * processes). Their Gauss–Legendre determinants converge only like n⁻², but regularly: measured errors follow an
 * expansion in h = (n + ½)^−2,
 *
 *   d_n = d + c_1 h + c_2 h² + …,
 *
 * the kink of every row lying exactly at a node. The polynomial through the last determinants, read at h = 0
 * (L. F. Richardson, Phil. Trans. R. Soc. A 226 (1927) 299), removes term after term. It is used only when the
 * differences fall as the first term says, and its error is read off its own last corrections.
 */

/** A determinant at one order, as the extrapolation needs it. */
export interface OrderedValue {
  readonly order: number;
  readonly value: number;
  readonly noise: number;
}

/** Extrapolated value with its error. */
export interface Extrapolated {
  readonly value: number;
  readonly error: number;
}

const MOST_POINTS = 9;
const LEAST_POINTS = 5;
const DEVIATION = 0.1; // by how much the last ratios of differences may miss those of the first term
const SAFETY = 100;
// The corrections that judge an extrapolation carry the same rounding noise as its value, and the best is chosen by them.
const NOISE_FACTOR = 3;

/** Whether the last determinants approach their limit as c (n + ½)^−2 does. */
export function convergesLikeKink(history: readonly OrderedValue[]): boolean {
  const k = history.length - 1;
  if (history.length < LEAST_POINTS) return false;
  for (let j = k; j > k - 3; j--) {
    const last = history[j].value - history[j - 1].value;
    const before = history[j - 1].value - history[j - 2].value;
    const expected =
      (step(history[j - 1]) - step(history[j])) / (step(history[j - 2]) - step(history[j - 1]));
    // Differences within the noise say nothing.
    if (Math.abs(last) < 100 * history[j].noise) return false;
    if (!(Math.abs(last / before / expected - 1) < DEVIATION)) return false;
  }
  return true;
}

function step(item: OrderedValue): number {
  return (item.order + 0.5) ** -2;
}

/** The best of the extrapolations through the last determinants, by its own error estimate. */
export function extrapolateKink(history: readonly OrderedValue[]): Extrapolated {
  let best: Extrapolated = { value: Number.NaN, error: Number.POSITIVE_INFINITY };
  const most = Math.min(MOST_POINTS, history.length);
  let before = readAtZero(history.slice(-2));
  let correction = Number.POSITIVE_INFINITY;
  for (let count = 3; count <= most; count++) {
    const found = readAtZero(history.slice(-count));
    const difference = Math.abs(found.value - before.value);
    // A correction that is small by chance is not believed: the one before counts half.
    const error = SAFETY * Math.max(difference, 0.5 * correction) + NOISE_FACTOR * found.noise;
    if (count > 3 && error < best.error) best = { value: found.value, error };
    correction = difference;
    before = found;
  }
  return best;
}

/** Lagrange's polynomial in h through the given determinants, at h = 0, and the rounding noise it carries. */
function readAtZero(items: readonly OrderedValue[]): { value: number; noise: number } {
  let value = 0;
  let noise = 0;
  for (const item of items) {
    let weight = 1;
    for (const other of items) {
      if (other !== item) weight *= step(other) / (step(other) - step(item));
    }
    value += weight * item.value;
    noise += Math.abs(weight) * item.noise;
  }
  return { value, noise };
}
