/**
 * Determinants det(I − W K) in fixed point, the entries being jets: power series in ε with one coefficient when no
 * derivative is asked for.
 *
 * Structured elimination, O(r n²): an integrable kernel K_ij = Σ_k F_ik G_jk / (x_i − x_j), K_ii = e_i, keeps its form.
 * With pivot m = 1 − w_q e_q, column v_i = K_iq and row u_j = K_qj,
 *
 *   F′_i = F_i + v_i (w_q/m) F_q,  G′_j = G_j + u_j (w_q/m) G_q,  e′_i = e_i + v_i u_i w_q/m
 *
 * (as linalg/structured-general.ts; T. Kailath, S.-Y. Kung, M. Morf, J. Math. Anal. Appl. 68 (1979) 395). The largest
 * remaining |m| is the next pivot. Dense elimination with row exchanges is the way out when all those vanish.
 */
import { absolute, bitLength } from "./fixed-point.ts";
import { addProduct, crossJets, divideJets, type Jet, multiplyJets, subtractJets } from "./jet.ts";

/** A determinant as Σ_k value[k] 2^−scale ε^k. */
export interface FixedDeterminant {
  readonly value: Jet;
  readonly scale: bigint;
  /** log2 of the smallest |pivot|; −∞ when the determinant vanished within the precision. */
  readonly smallestPivot: number;
}

/** Nodes, weights (times z) and entries; all jets of one length. */
export interface StructuredMatrix {
  readonly x: Jet[];
  readonly weight: Jet[];
  readonly left: Jet[][];
  /** `undefined` for the antisymmetric pair: left is then [φ, ψ]. */
  readonly right: Jet[][] | undefined;
  readonly diagonal: Jet[];
}

/** Structured elimination; overwrites its argument. `undefined` when the pivots vanish. */
export function eliminateStructured(m: StructuredMatrix, bits: bigint): FixedDeterminant | undefined {
  const n = m.x.length;
  const product = newProduct(m.diagonal[0].length, bits);
  const one = 1n << bits;
  const pivots = m.diagonal.map((e, i) => oneMinus(multiplyJets(m.weight[i], e, bits), one));
  for (let q = 0; q < n; q++) {
    let best = q;
    for (let i = q + 1; i < n; i++) if (absolute(pivots[i][0]) > absolute(pivots[best][0])) best = i;
    if (best !== q) {
      for (const list of [m.x, m.weight, m.diagonal, pivots]) exchange(list, q, best);
      exchange(m.left, q, best);
      if (m.right) exchange(m.right, q, best);
    }
    const pivot = pivots[q];
    if (bitLength(pivot[0]) <= Number(bits) / 2) return undefined;
    timesEquals(product, pivot, bits);
    const scaled = divideJets(m.weight[q], pivot, bits);
    if (m.right) sweepGeneral(m.x, m.left, m.right, m.diagonal, scaled, q, bits);
    else sweepPair(m.x, m.left, m.diagonal, scaled, q, bits);
    for (let i = q + 1; i < n; i++) pivots[i] = oneMinus(multiplyJets(m.weight[i], m.diagonal[i], bits), one);
  }
  return finished(product);
}

function sweepPair(x: Jet[], pair: Jet[][], e: Jet[], scaled: Jet, q: number, bits: bigint): void {
  const [aq, bq] = pair[q];
  const sa = multiplyJets(aq, scaled, bits);
  const sb = multiplyJets(bq, scaled, bits);
  for (let i = q + 1; i < x.length; i++) {
    const [a, b] = pair[i];
    // K(x_i, x_q) = (φ_i ψ_q − ψ_i φ_q)/(x_i − x_q).
    const v = divideJets(crossJets(a, bq, b, aq, bits), subtractJets(x[i], x[q]), bits);
    pair[i] = [addProduct(a, v, sa, bits), addProduct(b, v, sb, bits)];
    e[i] = addProduct(e[i], multiplyJets(v, v, bits), scaled, bits);
  }
}

function sweepGeneral(
  x: Jet[],
  left: Jet[][],
  right: Jet[][],
  e: Jet[],
  scaled: Jet,
  q: number,
  bits: bigint,
): void {
  for (let i = q + 1; i < x.length; i++) {
    const gap = subtractJets(x[i], x[q]);
    const v = divideJets(inner(left[i], right[q], bits), gap, bits);
    const u = divideJets(
      inner(left[q], right[i], bits),
      gap.map((g) => -g),
      bits,
    );
    const sv = multiplyJets(v, scaled, bits);
    const su = multiplyJets(u, scaled, bits);
    left[i] = left[i].map((f, k) => addProduct(f, sv, left[q][k], bits));
    right[i] = right[i].map((g, k) => addProduct(g, su, right[q][k], bits));
    e[i] = addProduct(e[i], v, su, bits);
  }
}

function inner(a: readonly Jet[], b: readonly Jet[], bits: bigint): Jet {
  let sum = multiplyJets(a[0], b[0], bits);
  for (let k = 1; k < a.length; k++) sum = addProduct(sum, a[k], b[k], bits);
  return sum;
}

/**
 * Elimination of I − W K for a symmetric kernel matrix without exchanges; `rows[i][j]`, j ≤ i, holds K and is
 * overwritten: the Schur complements K_ij + K_iq (w_q/m) K_jq stay symmetric.
 */
export function eliminateSymmetric(
  rows: Jet[][],
  weight: readonly Jet[],
  bits: bigint,
): FixedDeterminant | undefined {
  const n = rows.length;
  const product = newProduct(rows[0][0].length, bits);
  const one = 1n << bits;
  for (let q = 0; q < n; q++) {
    const pivot = oneMinus(multiplyJets(weight[q], rows[q][q], bits), one);
    if (bitLength(pivot[0]) <= Number(bits) / 2) return undefined;
    timesEquals(product, pivot, bits);
    const scaled = divideJets(weight[q], pivot, bits);
    for (let i = q + 1; i < n; i++) {
      const factor = multiplyJets(rows[i][q], scaled, bits);
      for (let j = q + 1; j <= i; j++) rows[i][j] = addProduct(rows[i][j], factor, rows[j][q], bits);
    }
  }
  return finished(product);
}

/** Elimination of I − A with row exchanges by the leading coefficients; overwrites A. */
export function eliminateDense(rows: Jet[][], bits: bigint): FixedDeterminant {
  const n = rows.length;
  const one = 1n << bits;
  const m = rows.map((row, i) => row.map((a, j) => (i === j ? oneMinus(a, one) : a.map((c) => -c))));
  const product = newProduct(rows[0][0].length, bits);
  for (let q = 0; q < n; q++) {
    let best = q;
    for (let i = q + 1; i < n; i++) if (absolute(m[i][q][0]) > absolute(m[best][q][0])) best = i;
    if (m[best][q][0] === 0n) {
      const value = m[0][0].map(() => 0n);
      return { value, scale: bits, smallestPivot: Number.NEGATIVE_INFINITY };
    }
    if (best !== q) {
      exchange(m, q, best);
      product.value = product.value.map((c) => -c);
    }
    timesEquals(product, m[q][q], bits);
    for (let i = q + 1; i < n; i++) {
      const factor = divideJets(m[i][q], m[q][q], bits).map((c) => -c);
      for (let j = q + 1; j < n; j++) m[i][j] = addProduct(m[i][j], factor, m[q][j], bits);
    }
  }
  return finished(product);
}

/** A product that keeps `bits` significant bits of its leading coefficient, whatever its size. */
interface RunningProduct {
  value: Jet;
  scale: bigint;
  smallest: number;
}

function newProduct(length: number, bits: bigint): RunningProduct {
  const value: bigint[] = [1n << bits];
  while (value.length < length) value.push(0n);
  return { value, scale: bits, smallest: 0 };
}

function timesEquals(product: RunningProduct, pivot: Jet, bits: bigint): void {
  const length = bitLength(pivot[0]);
  product.smallest = Math.min(product.smallest, length - Number(bits));
  // The shift leaves the leading coefficient with `bits` + 1 or so digits.
  const shift = BigInt(Math.max(0, bitLength(product.value[0]) + length - Number(bits) - 1));
  product.value = multiplyJets(product.value, pivot, shift);
  product.scale += bits - shift;
}

function finished({ value, scale, smallest }: RunningProduct): FixedDeterminant {
  return { value, scale, smallestPivot: smallest };
}

function oneMinus(a: Jet, one: bigint): Jet {
  return a.map((c, k) => (k === 0 ? one - c : -c));
}

function exchange<T>(list: T[], p: number, q: number): void {
  const kept = list[p];
  list[p] = list[q];
  list[q] = kept;
}
