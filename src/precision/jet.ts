/**
 * Truncated power series in one small variable ε with fixed-point coefficients: what carries derivatives in an endpoint
 * exactly through a determinant. A jet is an array of coefficients of ε⁰, ε¹, …; all jets of one computation have the
 * same length. With length 1 these are plain numbers.
 */
import { divide } from "./fixed-point.ts";

/** Coefficients of ε⁰, ε¹, …. */
export type Jet = readonly bigint[];

/** Series cut or filled with zeros to `length`. */
export function padded(series: readonly bigint[], length: number): Jet {
  const out = series.slice(0, length);
  while (out.length < length) out.push(0n);
  return out;
}

/** a − b. */
export function subtractJets(a: Jet, b: Jet): Jet {
  return a.map((x, k) => x - b[k]);
}

/** a · b: each coefficient at most one unit too low. */
export function multiplyJets(a: Jet, b: Jet, bits: bigint): Jet {
  if (a.length === 1) return [(a[0] * b[0]) >> bits];
  return a.map((_, k) => {
    let sum = 0n;
    for (let i = 0; i <= k; i++) sum += a[i] * b[k - i];
    return sum >> bits;
  });
}

/** a b − c d with one rounding a coefficient. */
export function crossJets(a: Jet, b: Jet, c: Jet, d: Jet, bits: bigint): Jet {
  if (a.length === 1) return [(a[0] * b[0] - c[0] * d[0]) >> bits];
  return a.map((_, k) => {
    let sum = 0n;
    for (let i = 0; i <= k; i++) sum += a[i] * b[k - i] - c[i] * d[k - i];
    return sum >> bits;
  });
}

/** a + b c with one rounding a coefficient. */
export function addProduct(a: Jet, b: Jet, c: Jet, bits: bigint): Jet {
  if (a.length === 1) return [a[0] + ((b[0] * c[0]) >> bits)];
  return a.map((x, k) => {
    let sum = 0n;
    for (let i = 0; i <= k; i++) sum += b[i] * c[k - i];
    return x + (sum >> bits);
  });
}

/** a / b; the leading coefficient of b must not be 0. */
export function divideJets(a: Jet, b: Jet, bits: bigint): Jet {
  if (a.length === 1) return [divide(a[0], b[0], bits)];
  const out: bigint[] = [];
  for (let k = 0; k < a.length; k++) {
    let rest = a[k] << bits;
    for (let i = 0; i < k; i++) rest -= out[i] * b[k - i];
    out.push(rest / b[0]);
  }
  return out;
}

/** f(x + slope · ε) from the Taylor coefficients of f at x. */
export function composeLinear(taylor: readonly bigint[], slope: bigint, length: number, bits: bigint): Jet {
  const out = padded(taylor, length).slice();
  let power = slope;
  for (let k = 1; k < length; k++) {
    out[k] = (out[k] * power) >> bits;
    power = (power * slope) >> bits;
  }
  return out;
}
