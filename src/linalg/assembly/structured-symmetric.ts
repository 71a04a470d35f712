/**
 * The compiled form of ../structured-symmetric.ts, in AssemblyScript: the same operations in the same order, two or
 * four rows at a time. Rows do not touch each other, nothing is fused and nothing is summed across lanes, so that
 * every number has the same bits as in the plain form.
 *
 * Pointers are bytes in linear memory, best multiples of 16; all checks are the caller's.
 */

export function eliminateStructuredSymmetric(
  x: usize,
  a: usize,
  b: usize,
  e: usize,
  pivots: i32,
  rows: i32,
  least: f64,
): i32 {
  const end: usize = (<usize>rows) << 3;
  for (let q: i32 = 0; q < pivots; q++) {
    const p: usize = (<usize>q) << 3;
    const m: f64 = 1.0 - load<f64>(e + p);
    if (!(m > least)) return q;
    const inverse: f64 = 1.0 / m;
    const xq = load<f64>(x + p);
    const aq = load<f64>(a + p);
    const bq = load<f64>(b + p);
    const sa = aq * inverse;
    const sb = bq * inverse;
    let i: usize = p + 8;
    // A lane begins at an even row: loads that straddled the stores of the sweep before would wait for them.
    if ((i & 8) !== 0 && i < end) {
      eliminateRow(x, a, b, e, i, xq, aq, bq, sa, sb, inverse);
      i += 8;
    }
    const XQ = f64x2.splat(xq);
    const AQ = f64x2.splat(aq);
    const BQ = f64x2.splat(bq);
    const SA = f64x2.splat(sa);
    const SB = f64x2.splat(sb);
    const IN = f64x2.splat(inverse);
    // Four rows, so that the arithmetic of two fills the waits of the others.
    for (; i + 24 < end; i += 32) {
      const a0 = v128.load(a + i);
      const a1 = v128.load(a + i, 16);
      const b0 = v128.load(b + i);
      const b1 = v128.load(b + i, 16);
      const n0 = f64x2.sub(f64x2.mul(a0, BQ), f64x2.mul(b0, AQ));
      const n1 = f64x2.sub(f64x2.mul(a1, BQ), f64x2.mul(b1, AQ));
      const v0 = f64x2.div(n0, f64x2.sub(v128.load(x + i), XQ));
      const v1 = f64x2.div(n1, f64x2.sub(v128.load(x + i, 16), XQ));
      v128.store(a + i, f64x2.add(a0, f64x2.mul(v0, SA)));
      v128.store(a + i, f64x2.add(a1, f64x2.mul(v1, SA)), 16);
      v128.store(b + i, f64x2.add(b0, f64x2.mul(v0, SB)));
      v128.store(b + i, f64x2.add(b1, f64x2.mul(v1, SB)), 16);
      v128.store(e + i, f64x2.add(v128.load(e + i), f64x2.mul(f64x2.mul(v0, v0), IN)));
      v128.store(e + i, f64x2.add(v128.load(e + i, 16), f64x2.mul(f64x2.mul(v1, v1), IN)), 16);
    }
    if (i + 8 < end) {
      const a0 = v128.load(a + i);
      const b0 = v128.load(b + i);
      const n0 = f64x2.sub(f64x2.mul(a0, BQ), f64x2.mul(b0, AQ));
      const v0 = f64x2.div(n0, f64x2.sub(v128.load(x + i), XQ));
      v128.store(a + i, f64x2.add(a0, f64x2.mul(v0, SA)));
      v128.store(b + i, f64x2.add(b0, f64x2.mul(v0, SB)));
      v128.store(e + i, f64x2.add(v128.load(e + i), f64x2.mul(f64x2.mul(v0, v0), IN)));
      i += 16;
    }
    if (i < end) eliminateRow(x, a, b, e, i, xq, aq, bq, sa, sb, inverse);
  }
  return pivots;
}

@inline
function eliminateRow(
  x: usize,
  a: usize,
  b: usize,
  e: usize,
  i: usize,
  xq: f64,
  aq: f64,
  bq: f64,
  sa: f64,
  sb: f64,
  inverse: f64,
): void {
  const ai = load<f64>(a + i);
  const bi = load<f64>(b + i);
  const v = (ai * bq - bi * aq) / (load<f64>(x + i) - xq);
  store<f64>(a + i, ai + v * sa);
  store<f64>(b + i, bi + v * sb);
  store<f64>(e + i, load<f64>(e + i) + v * v * inverse);
}
