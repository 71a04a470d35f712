/**
 * Double-double arithmetic: a number is the exact sum of two doubles hi + lo, |lo| ≤ ulp(hi)/2, about 32 digits.
 *
 * Algorithms: T. J. Dekker, Numer. Math. 18 (1971) 224; D. E. Knuth, The Art of Computer Programming 2, § 4.2.2.
 * Results go to out[0], out[1]; nothing is allocated.
 */

const SPLIT = 134217729; // 2²⁷ + 1

/** (a + al) + (b + bl). */
export function addInto(out: Float64Array, a: number, al: number, b: number, bl: number): void {
  const s = a + b;
  const v = s - a;
  const t = a - (s - v) + (b - v) + (al + bl);
  const hi = s + t;
  out[0] = hi;
  out[1] = t - (hi - s);
}

/** (a + al) · (b + bl). */
export function multiplyInto(out: Float64Array, a: number, al: number, b: number, bl: number): void {
  const p = a * b;
  const ca = SPLIT * a;
  const ah = ca - (ca - a);
  const at = a - ah;
  const cb = SPLIT * b;
  const bh = cb - (cb - b);
  const bt = b - bh;
  const t = at * bt - (p - ah * bh - at * bh - ah * bt) + (a * bl + al * b);
  const hi = p + t;
  out[0] = hi;
  out[1] = t - (hi - p);
}

/** (a + al) / (b + bl). */
export function divideInto(out: Float64Array, a: number, al: number, b: number, bl: number): void {
  const q = a / b;
  multiplyInto(out, b, bl, q, 0);
  const r = a - out[0] + (al - out[1]);
  const t = r / b;
  const hi = q + t;
  out[0] = hi;
  out[1] = t - (hi - q);
}
