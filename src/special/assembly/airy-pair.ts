/**
 * The compiled form of Ai, Ai' and ∫Ai² on the tables of ../airy-taylor.ts and ../airy-square-integral.ts, in
 * AssemblyScript. The two lanes are Ai and Ai': the same operations in the same order as the plain form, nothing fused,
 * so that every number has the same bits.
 *
 * Pointers are bytes in linear memory; the tables are laid out by ../airy-compiled.ts.
 */

const LIMIT: f64 = 20.0;
/** Bytes a centre: (tail, coefficients 0 … 15) of Ai and of Ai', interleaved. */
const PAIR_STRIDE: usize = 2 * 17 * 8;
/** Bytes a centre: coefficients 0 … 12 of the ratio. */
const RATIO_STRIDE: usize = 13 * 8;

/** Ai and Ai' at `count` points, up to the first one outside [−20, 20]; returns how many were done. */
export function airyPair(x: usize, ai: usize, aiPrime: usize, count: i32, table: usize): i32 {
  for (let i: i32 = 0; i < count; i++) {
    const at: usize = (<usize>i) << 3;
    const value = load<f64>(x + at);
    if (!(value >= -LIMIT && value <= LIMIT)) return i;
    const j: i32 = <i32>(4.0 * (value + LIMIT) + 0.5);
    const step: f64 = value - (<f64>j * 0.25 - LIMIT);
    const t = f64x2.splat(step);
    const s = f64x2.splat(step * step);
    const p: usize = table + <usize>j * PAIR_STRIDE;
    // Coefficient k lies at 16 (k + 1) bytes, the tail of the leading one at 0.
    let even = f64x2.add(f64x2.mul(v128.load(p, 240), s), v128.load(p, 208));
    let odd = f64x2.add(f64x2.mul(v128.load(p, 256), s), v128.load(p, 224));
    even = f64x2.add(f64x2.mul(even, s), v128.load(p, 176));
    odd = f64x2.add(f64x2.mul(odd, s), v128.load(p, 192));
    even = f64x2.add(f64x2.mul(even, s), v128.load(p, 144));
    odd = f64x2.add(f64x2.mul(odd, s), v128.load(p, 160));
    even = f64x2.add(f64x2.mul(even, s), v128.load(p, 112));
    odd = f64x2.add(f64x2.mul(odd, s), v128.load(p, 128));
    even = f64x2.add(f64x2.mul(even, s), v128.load(p, 80));
    odd = f64x2.add(f64x2.mul(odd, s), v128.load(p, 96));
    even = f64x2.add(f64x2.mul(even, s), v128.load(p, 48));
    odd = f64x2.add(f64x2.mul(odd, s), v128.load(p, 64));
    even = f64x2.mul(even, s);
    odd = f64x2.add(f64x2.mul(odd, s), v128.load(p, 32));
    const tail = f64x2.add(v128.load(p), f64x2.add(even, f64x2.mul(t, odd)));
    const pair = f64x2.add(v128.load(p, 16), tail);
    v128.store64_lane(ai + at, pair, 0);
    v128.store64_lane(aiPrime + at, pair, 1);
  }
  return count;
}

/** ∫Ai² from (x, Ai, Ai') at `count` points, up to the first one above 20 or NaN; returns how many were done. */
export function airySquareIntegral(
  x: usize,
  ai: usize,
  aiPrime: usize,
  out: usize,
  count: i32,
  table: usize,
): i32 {
  for (let i: i32 = 0; i < count; i++) {
    const at: usize = (<usize>i) << 3;
    const value = load<f64>(x + at);
    const a = load<f64>(ai + at);
    if (value < 0.0) {
      const b = load<f64>(aiPrime + at);
      store<f64>(out + at, b * b - value * a * a);
      continue;
    }
    if (!(value <= LIMIT)) return i;
    const j: i32 = <i32>(4.0 * value + 0.5);
    const t: f64 = value - <f64>j * 0.25;
    const p: usize = table + <usize>j * RATIO_STRIDE;
    let sum = load<f64>(p, 96);
    sum = sum * t + load<f64>(p, 88);
    sum = sum * t + load<f64>(p, 80);
    sum = sum * t + load<f64>(p, 72);
    sum = sum * t + load<f64>(p, 64);
    sum = sum * t + load<f64>(p, 56);
    sum = sum * t + load<f64>(p, 48);
    sum = sum * t + load<f64>(p, 40);
    sum = sum * t + load<f64>(p, 32);
    sum = sum * t + load<f64>(p, 24);
    sum = sum * t + load<f64>(p, 16);
    sum = sum * t + load<f64>(p, 8);
    sum = sum * t + load<f64>(p);
    store<f64>(out + at, sum * a * a);
  }
  return count;
}
