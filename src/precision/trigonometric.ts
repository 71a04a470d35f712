/**
 * Sine and cosine in fixed point.
 */
import { piFixed } from "./constants.ts";
import { floorDivide } from "./decimal.ts";
import { bitLength, rescale, squareRoot } from "./fixed-point.ts";

/**
 * sin x and cos x at `bits`: each at most two units off.
 *
 * x = q π/2 + r with |r| ≤ π/4. The Maclaurin series of the sine at r/2^j, the cosine as a root, then j doublings
 * s' = 2 s c, c' = 1 − 2 s². An error (δs, δc) becomes at most 2(1 + |s|) max(δs, δc) plus 2 units, and
 * Π (1 + |s_i|) ≤ e^{π/4} < 2.2 because the angles halve: j + 3 guard bits hold the growth.
 *
 * @param x - Fixed-point number at `xBits`, taken as exact.
 */
export function sineCosineFixed(x: bigint, xBits: bigint, bits: bigint): [sine: bigint, cosine: bigint] {
  const halvings = BigInt(Math.floor(0.5 * Math.sqrt(Number(bits))) + 2);
  // The series has fewer terms than there are bits, each within two units.
  const work = bits + halvings + BigInt(bitLength(bits)) + 8n;
  const size = BigInt(bitLength(x)) - xBits;
  const more = size > 0n ? size + 2n : 2n;
  const half = piFixed(work + more - 1n); // π/2 at work + more: π at one bit less
  const whole = rescale(x, xBits, work + more);
  const q = floorDivide(whole + (half >> 1n), half);
  const r = (whole - q * half) >> more; // within 3 units
  const theta = r >> halvings;
  const square = (theta * theta) >> work;
  let sine = 0n;
  let term = theta;
  for (let k = 2n; term !== 0n && term !== -1n; k += 2n) {
    sine += term;
    term = ((-term * square) >> work) / (k * (k + 1n));
  }
  const one = 1n << work;
  let cosine = squareRoot(one - ((sine * sine) >> work), work);
  for (let i = 0n; i < halvings; i++) {
    const doubled = (sine * cosine) >> (work - 1n);
    cosine = one - ((sine * sine) >> (work - 1n));
    sine = doubled;
  }
  const s = sine >> (work - bits);
  const c = cosine >> (work - bits);
  const quadrant = Number(((q % 4n) + 4n) % 4n);
  return quadrant === 0 ? [s, c] : quadrant === 1 ? [c, -s] : quadrant === 2 ? [-s, -c] : [-c, s];
}
