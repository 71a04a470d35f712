/**
 * The compiled form of ../structured-symmetric.ts, in AssemblyScript: the same operations in the same order, two or
 * four rows at a time. Rows do not touch each other, nothing is fused and nothing is summed across lanes, so that
 * every number has the same bits as in the plain form.
 *
 * Pointers are bytes in linear memory; all checks are the caller's.
 */

/** Pivot pairs with at least so many rows below them are swept in scaled form. The plain form has the same figure. */
const SCALED_FROM: i32 = 48;

// Nodes must lie below 2⁵⁰⁰ and all but one above 2⁻⁴⁴⁰ in size.
const MOST: f64 = reinterpret<f64>(<u64>(1023 + 500) << 52);
const LEAST: f64 = reinterpret<f64>(<u64>(1023 - 440) << 52);

/** As the plain function; −1, and nothing done, for nodes of extreme scale. */
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
  // gapsAreModerate of the plain form.
  let tiny: i32 = 0;
  for (let i: usize = 0; i < end; i += 8) {
    const size = abs<f64>(load<f64>(x + i));
    if (!(size < MOST)) return -1;
    tiny += <i32>(size < LEAST);
  }
  if (tiny > 1) return -1;
  for (let q: i32 = 0; q < pivots; q += 2) {
    const p: usize = (<usize>q) << 3;
    const m: f64 = 1.0 - load<f64>(e + p);
    if (!(m > least)) return q;
    const inverse: f64 = 1.0 / m;
    const xp = load<f64>(x + p);
    const ap = load<f64>(a + p);
    const bp = load<f64>(b + p);
    if (q + 1 === pivots) {
      sweepOne(x, a, b, e, p + 8, end, xp, ap, bp, inverse);
      return pivots;
    }
    const xq = load<f64>(x + p, 8);
    const a0 = load<f64>(a + p, 8);
    const b0 = load<f64>(b + p, 8);
    const v = (a0 * bp - b0 * ap) * (1.0 / (xq - xp));
    const t = v * inverse;
    const eq = load<f64>(e + p, 8) + t * v;
    const mq: f64 = 1.0 - eq;
    if (!(mq > least)) {
      sweepOne(x, a, b, e, p + 8, end, xp, ap, bp, inverse);
      return q + 1;
    }
    const aq = a0 + t * ap;
    const bq = b0 + t * bp;
    store<f64>(a + p, aq, 8);
    store<f64>(b + p, bq, 8);
    store<f64>(e + p, eq, 8);
    if (rows - q < SCALED_FROM) {
      sweepTwo(x, a, b, e, p + 16, end, xp, ap, bp, inverse, xq, aq, bq, 1.0 / mq);
    } else {
      const sp = 1.0 / Math.sqrt(m);
      const sq = 1.0 / Math.sqrt(mq);
      sweepTwoScaled(x, a, b, e, p + 16, end, xp, ap * sp, bp * sp, xq, aq * sq, bq * sq);
    }
  }
  return pivots;
}

function sweepOne(
  x: usize,
  a: usize,
  b: usize,
  e: usize,
  from: usize,
  end: usize,
  xp: f64,
  ap: f64,
  bp: f64,
  inverse: f64,
): void {
  for (let i: usize = from; i < end; i += 8) {
    const ai = load<f64>(a + i);
    const bi = load<f64>(b + i);
    const v = (ai * bp - bi * ap) * (1.0 / (load<f64>(x + i) - xp));
    const t = v * inverse;
    store<f64>(a + i, ai + t * ap);
    store<f64>(b + i, bi + t * bp);
    store<f64>(e + i, load<f64>(e + i) + t * v);
  }
}

function sweepTwo(
  x: usize,
  a: usize,
  b: usize,
  e: usize,
  from: usize,
  end: usize,
  xp: f64,
  ap: f64,
  bp: f64,
  ip: f64,
  xq: f64,
  aq: f64,
  bq: f64,
  iq: f64,
): void {
  const XP = f64x2.splat(xp);
  const AP = f64x2.splat(ap);
  const BP = f64x2.splat(bp);
  const IP = f64x2.splat(ip);
  const XQ = f64x2.splat(xq);
  const AQ = f64x2.splat(aq);
  const BQ = f64x2.splat(bq);
  const IQ = f64x2.splat(iq);
  const one = f64x2.splat(1.0);
  let i: usize = from;
  for (; i + 8 < end; i += 16) {
    const xi = v128.load(x + i);
    let ai = v128.load(a + i);
    let bi = v128.load(b + i);
    let ei = v128.load(e + i);
    const gp = f64x2.sub(xi, XP);
    const gq = f64x2.sub(xi, XQ);
    const r = f64x2.div(one, f64x2.mul(gp, gq));
    const vp = f64x2.mul(f64x2.sub(f64x2.mul(ai, BP), f64x2.mul(bi, AP)), f64x2.mul(r, gq));
    const tp = f64x2.mul(vp, IP);
    ai = f64x2.add(ai, f64x2.mul(tp, AP));
    bi = f64x2.add(bi, f64x2.mul(tp, BP));
    ei = f64x2.add(ei, f64x2.mul(tp, vp));
    const vq = f64x2.mul(f64x2.sub(f64x2.mul(ai, BQ), f64x2.mul(bi, AQ)), f64x2.mul(r, gp));
    const tq = f64x2.mul(vq, IQ);
    v128.store(a + i, f64x2.add(ai, f64x2.mul(tq, AQ)));
    v128.store(b + i, f64x2.add(bi, f64x2.mul(tq, BQ)));
    v128.store(e + i, f64x2.add(ei, f64x2.mul(tq, vq)));
  }
  if (i < end) {
    let ai = load<f64>(a + i);
    let bi = load<f64>(b + i);
    const gp = load<f64>(x + i) - xp;
    const gq = load<f64>(x + i) - xq;
    const r = 1.0 / (gp * gq);
    const vp = (ai * bp - bi * ap) * (r * gq);
    const tp = vp * ip;
    ai += tp * ap;
    bi += tp * bp;
    const vq = (ai * bq - bi * aq) * (r * gp);
    const tq = vq * iq;
    store<f64>(a + i, ai + tq * aq);
    store<f64>(b + i, bi + tq * bq);
    store<f64>(e + i, load<f64>(e + i) + tp * vp + tq * vq);
  }
}

function sweepTwoScaled(
  x: usize,
  a: usize,
  b: usize,
  e: usize,
  from: usize,
  end: usize,
  xp: f64,
  ap: f64,
  bp: f64,
  xq: f64,
  aq: f64,
  bq: f64,
): void {
  const XP = f64x2.splat(xp);
  const AP = f64x2.splat(ap);
  const BP = f64x2.splat(bp);
  const XQ = f64x2.splat(xq);
  const AQ = f64x2.splat(aq);
  const BQ = f64x2.splat(bq);
  const one = f64x2.splat(1.0);
  let i: usize = from;
  // Four rows, so that one pair's arithmetic fills the waits of the other's.
  for (; i + 24 < end; i += 32) {
    const xi = v128.load(x + i);
    const xj = v128.load(x + i, 16);
    let ai = v128.load(a + i);
    let aj = v128.load(a + i, 16);
    let bi = v128.load(b + i);
    let bj = v128.load(b + i, 16);
    let ei = v128.load(e + i);
    let ej = v128.load(e + i, 16);
    const gpi = f64x2.sub(xi, XP);
    const gpj = f64x2.sub(xj, XP);
    const gqi = f64x2.sub(xi, XQ);
    const gqj = f64x2.sub(xj, XQ);
    const ri = f64x2.div(one, f64x2.mul(gpi, gqi));
    const rj = f64x2.div(one, f64x2.mul(gpj, gqj));
    const vi = f64x2.mul(f64x2.sub(f64x2.mul(ai, BP), f64x2.mul(bi, AP)), f64x2.mul(ri, gqi));
    const vj = f64x2.mul(f64x2.sub(f64x2.mul(aj, BP), f64x2.mul(bj, AP)), f64x2.mul(rj, gqj));
    ai = f64x2.add(ai, f64x2.mul(vi, AP));
    aj = f64x2.add(aj, f64x2.mul(vj, AP));
    bi = f64x2.add(bi, f64x2.mul(vi, BP));
    bj = f64x2.add(bj, f64x2.mul(vj, BP));
    ei = f64x2.add(ei, f64x2.mul(vi, vi));
    ej = f64x2.add(ej, f64x2.mul(vj, vj));
    const ui = f64x2.mul(f64x2.sub(f64x2.mul(ai, BQ), f64x2.mul(bi, AQ)), f64x2.mul(ri, gpi));
    const uj = f64x2.mul(f64x2.sub(f64x2.mul(aj, BQ), f64x2.mul(bj, AQ)), f64x2.mul(rj, gpj));
    v128.store(a + i, f64x2.add(ai, f64x2.mul(ui, AQ)));
    v128.store(a + i, f64x2.add(aj, f64x2.mul(uj, AQ)), 16);
    v128.store(b + i, f64x2.add(bi, f64x2.mul(ui, BQ)));
    v128.store(b + i, f64x2.add(bj, f64x2.mul(uj, BQ)), 16);
    v128.store(e + i, f64x2.add(ei, f64x2.mul(ui, ui)));
    v128.store(e + i, f64x2.add(ej, f64x2.mul(uj, uj)), 16);
  }
  for (; i < end; i += 8) {
    let ai = load<f64>(a + i);
    let bi = load<f64>(b + i);
    const gp = load<f64>(x + i) - xp;
    const gq = load<f64>(x + i) - xq;
    const r = 1.0 / (gp * gq);
    const v = (ai * bp - bi * ap) * (r * gq);
    ai += v * ap;
    bi += v * bp;
    const u = (ai * bq - bi * aq) * (r * gp);
    store<f64>(a + i, ai + u * aq);
    store<f64>(b + i, bi + u * bq);
    store<f64>(e + i, load<f64>(e + i) + v * v + u * u);
  }
}
