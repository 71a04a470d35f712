/**
 * The Hastings–McLeod solution of Painlevé II and the functions made of it, for s → −∞.
 *
 *   q(−x) = √(x/2) g,  g = Σ a_k x^{−3k}.   q'' = s q + 2 q³ gives, with a_0 = 1,
 *   2 a_m = ((3(m − 1))² − ¼) a_{m−1} − [x^{−3m}](g³ without 3 a_m).
 *
 * S. P. Hastings, J. B. McLeod, Arch. Rational Mech. Anal. 73 (1980) 31; constants: P. Deift, A. Its, I. Krasovsky,
 * Commun. Math. Phys. 278 (2008) 643; J. Baik, R. Buckingham, J. DiFranco, Commun. Math. Phys. 280 (2008) 463.
 */

/** log F2, its derivative, μ = ∫_s^∞ q and q at one point. */
export interface PainleveValues {
  readonly logF2: number;
  readonly slope: number;
  readonly mu: number;
  readonly q: number;
}

/** log τ₂ = ζ'(−1) + (log 2)/24, ζ'(−1) = −0.16542114370045092921… (OEIS A084448). */
const LOG_TAU = -0.13654001117711987;
const TERMS = 14;

/**
 * The expansions at s = −x, x ≥ 11, cut at their smallest term.
 *
 * log F2 = −x³/12 − (log x)/8 + log τ₂ + Σ b_k x^{−3k}, 3k(3k + 1) b_k = −½ (g²)_{k+1};
 * μ = ½ log 2 + 2^{−1/2} Σ a_k x^{3/2 − 3k} / (3/2 − 3k).
 */
export function painleveSeries(x: number): PainleveValues {
  const { a, b } = COEFFICIENTS;
  const cube = x * x * x;
  const root = Math.sqrt(x / 2);
  let power = 1;
  let g = 0;
  let integral = 0;
  let log = 0;
  let slope = 0;
  let least = Number.POSITIVE_INFINITY;
  for (let k = 0; k < TERMS; k++) {
    const term = a[k] * power;
    if (Math.abs(term) > least) break;
    least = Math.abs(term);
    g += term;
    integral += term / (1.5 - 3 * k);
    if (k > 0) {
      log += b[k] * power;
      slope += (3 * k * b[k] * power) / x;
    }
    power /= cube;
  }
  return {
    logF2: -cube / 12 - (Math.log(x) / 8 - LOG_TAU) + log,
    // d/ds = −d/dx.
    slope: (x * x) / 4 + 1 / (8 * x) + slope,
    mu: 0.5 * Math.LN2 + x * root * integral,
    q: root * g,
  };
}

const COEFFICIENTS = coefficients();

function coefficients(): { readonly a: readonly number[]; readonly b: readonly number[] } {
  const a = [1];
  for (let m = 1; m <= TERMS; m++) {
    let cubeRest = 0; // [x^{−3m}] g³ without the three products that hold a_m
    for (let i = 0; i < m; i++) {
      for (let j = 0; j < m && i + j <= m; j++) {
        const k = m - i - j;
        if (k < m) cubeRest += a[i] * a[j] * a[k];
      }
    }
    a.push(0.5 * ((9 * (m - 1) * (m - 1) - 0.25) * a[m - 1] - cubeRest));
  }
  const b = [0];
  for (let k = 1; k < TERMS; k++) {
    let square = 0;
    for (let i = 0; i <= k + 1; i++) square += a[i] * a[k + 1 - i];
    b.push((-0.5 * square) / (3 * k * (3 * k + 1)));
  }
  return { a, b };
}
