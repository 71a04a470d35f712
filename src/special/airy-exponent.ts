/**
 * The exponent of the Airy functions, ζ = (2/3) x^{3/2}, in two parts.
 *
 * Rounding ζ to one double costs exp(−ζ), or the phase for x < 0, a relative error ζ·2⁻⁵³: 7e-14 at x = 100. So ζ is
 * carried as head + tail. With s = fl(√x) the rest of the root is (x − s²)/(2s), and all products are exact by
 * Veltkamp's splitting (T. J. Dekker, Numer. Math. 18 (1971) 224); JavaScript has no fused multiply-add.
 */

const SPLITTER = 134217729; // 2^27 + 1

/** a·b − product without error, product = fl(a·b), barring underflow and |a|, |b| > 2^970. */
function productTail(a: number, b: number, product: number): number {
  const wideA = SPLITTER * a;
  const highA = wideA - (wideA - a);
  const lowA = a - highA;
  const wideB = SPLITTER * b;
  const highB = wideB - (wideB - b);
  const lowB = b - highB;
  return lowA * lowB - (product - highA * highB - lowA * highB - highA * lowB);
}

/** Head of ζ(x), x ≥ 0; within 2 units in the last place of ζ. */
export function exponentHead(x: number): number {
  return (2 * (x * Math.sqrt(x))) / 3;
}

/** ζ(x) − exponentHead(x), x ≥ 0; the sum is good to 2⁻¹⁰⁰ ζ. */
export function exponentTail(x: number): number {
  const root = Math.sqrt(x);
  const power = x * root;
  if (power === 0 || power === Number.POSITIVE_INFINITY) return 0;
  const square = root * root;
  const rootTail = (x - square - productTail(root, root, square)) / (2 * root);
  const powerTail = productTail(x, root, power) + x * rootTail;
  const head = (2 * power) / 3;
  // 2·power − 3·head without error: both subtractions are of numbers within a factor 2.
  const remainder = 2 * power - 2 * head - head;
  return (remainder + 2 * powerTail) / 3;
}

/**
 * The exponent ζ(x) = (2/3) x^{3/2} of the scaled Airy functions, as an unevaluated sum of two doubles.
 *
 * @param x - Real. For x < 0, where the scale factor is 1, the exponent is 0. NaN passes through.
 * @returns [head, tail] with |tail| ≲ 2⁻⁵² head. exp(−ζ) is exp(−head)·(1 − tail); the tail enters at first order only.
 *
 * **Error.** |head + tail − ζ| ≤ 2⁻¹⁰⁰ ζ.
 *
 * @example
 * const [head, tail] = airyExponent(100); // 666.666…, about 2e-14
 * const scale = Math.exp(-head) * (1 - tail); // e^{−ζ(100)} to the last place
 *
 * @category Special functions
 * @since 0.1.0
 */
export function airyExponent(x: number): readonly [head: number, tail: number] {
  if (x < 0) return [0, 0];
  return [exponentHead(x), exponentTail(x)];
}

/** e^{ζ(x)}·value for moderate x ≥ 0. */
export function scaleUp(x: number, value: number): number {
  return Math.exp(exponentHead(x)) * (value + value * exponentTail(x));
}

/** e^{−ζ(x)}·value, x ≥ 0; 0, without a sign, once the exponential underflows. */
export function scaleDown(x: number, value: number): number {
  const exponential = Math.exp(-exponentHead(x));
  return exponential === 0 ? 0 : exponential * (value - value * exponentTail(x));
}
