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

/**
 * Ai and Ai' at `count` points, up to the first one outside [−20, 20]; returns how many were done.
 *
 * First the places in the table, then the series, so that many of their chains run at once. Between the two a point's
 * step lies in `ai` and the place of its centre in `aiPrime`; either may be `x` itself.
 */
export function airyPair(x: usize, ai: usize, aiPrime: usize, count: i32, table: usize): i32 {
  let n: i32 = 0;
  for (; n < count; n++) {
    const at: usize = (<usize>n) << 3;
    const value = load<f64>(x + at);
    if (!(value >= -LIMIT && value <= LIMIT)) break;
    const j: i32 = <i32>(4.0 * (value + LIMIT) + 0.5);
    store<f64>(ai + at, value - (<f64>j * 0.25 - LIMIT));
    store<usize>(aiPrime + at, table + <usize>j * PAIR_STRIDE);
  }
  for (let i: i32 = 0; i < n; i++) {
    const at: usize = (<usize>i) << 3;
    const p = load<usize>(aiPrime + at);
    const t = v128.load64_splat(ai + at);
    const s = f64x2.mul(t, t);
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
  return n;
}

/**
 * ∫Ai² from (x, Ai, Ai') at `count` points, up to the first one above 20 or NaN; returns how many were done. On the
 * table two points at a time.
 */
export function airySquareIntegral(
  x: usize,
  ai: usize,
  aiPrime: usize,
  out: usize,
  count: i32,
  table: usize,
): i32 {
  let i: i32 = 0;
  while (i < count) {
    const at: usize = (<usize>i) << 3;
    const x0 = load<f64>(x + at);
    if (x0 < 0.0) {
      const a = load<f64>(ai + at);
      const b = load<f64>(aiPrime + at);
      store<f64>(out + at, b * b - x0 * a * a);
      i++;
      continue;
    }
    if (!(x0 <= LIMIT)) return i;
    const x1: f64 = i + 1 < count ? load<f64>(x + at, 8) : -1.0;
    if (x1 >= 0.0 && x1 <= LIMIT) {
      const a = v128.load(ai + at);
      v128.store(out + at, f64x2.mul(f64x2.mul(ratio(x0, x1, table), a), a));
      i += 2;
    } else {
      const a = load<f64>(ai + at);
      store<f64>(out + at, f64x2.extract_lane(ratio(x0, x0, table), 0) * a * a);
      i++;
    }
  }
  return count;
}

/** The ratio of ∫Ai² to Ai² at two points of [0, 20]. */
function ratio(x0: f64, x1: f64, table: usize): v128 {
  const j0: i32 = <i32>(4.0 * x0 + 0.5);
  const j1: i32 = <i32>(4.0 * x1 + 0.5);
  const t = f64x2.replace_lane(f64x2.splat(x0 - <f64>j0 * 0.25), 1, x1 - <f64>j1 * 0.25);
  const p: usize = table + <usize>j0 * RATIO_STRIDE;
  const q: usize = table + <usize>j1 * RATIO_STRIDE;
  let sum = v128.load64_lane(q, v128.load64_zero(p, 96), 1, 96);
  sum = f64x2.add(f64x2.mul(sum, t), v128.load64_lane(q, v128.load64_zero(p, 88), 1, 88));
  sum = f64x2.add(f64x2.mul(sum, t), v128.load64_lane(q, v128.load64_zero(p, 80), 1, 80));
  sum = f64x2.add(f64x2.mul(sum, t), v128.load64_lane(q, v128.load64_zero(p, 72), 1, 72));
  sum = f64x2.add(f64x2.mul(sum, t), v128.load64_lane(q, v128.load64_zero(p, 64), 1, 64));
  sum = f64x2.add(f64x2.mul(sum, t), v128.load64_lane(q, v128.load64_zero(p, 56), 1, 56));
  sum = f64x2.add(f64x2.mul(sum, t), v128.load64_lane(q, v128.load64_zero(p, 48), 1, 48));
  sum = f64x2.add(f64x2.mul(sum, t), v128.load64_lane(q, v128.load64_zero(p, 40), 1, 40));
  sum = f64x2.add(f64x2.mul(sum, t), v128.load64_lane(q, v128.load64_zero(p, 32), 1, 32));
  sum = f64x2.add(f64x2.mul(sum, t), v128.load64_lane(q, v128.load64_zero(p, 24), 1, 24));
  sum = f64x2.add(f64x2.mul(sum, t), v128.load64_lane(q, v128.load64_zero(p, 16), 1, 16));
  sum = f64x2.add(f64x2.mul(sum, t), v128.load64_lane(q, v128.load64_zero(p, 8), 1, 8));
  sum = f64x2.add(f64x2.mul(sum, t), v128.load64_lane(q, v128.load64_zero(p, 0), 1, 0));
  return sum;
}
