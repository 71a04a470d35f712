/**
 * The eliminations against ml-matrix, against each other and against identities.
 */
import fc from "fast-check";
import { inverse, Matrix, determinant as mlDeterminant } from "ml-matrix";
import { describe, expect, it } from "vitest";
import { eliminateDensePivoted, eliminateDenseUnpivoted } from "../../src/linalg/dense-general.ts";
import { eliminateDenseSymmetric } from "../../src/linalg/dense-symmetric.ts";
import { summarizePivots } from "../../src/linalg/pivots.ts";
import { eliminateStructuredGeneral } from "../../src/linalg/structured-general.ts";
import { eliminateStructuredSymmetric } from "../../src/linalg/structured-symmetric.ts";

const settings = { seed: 20261201, numRuns: 200 };

/** Nodes, generators and diagonal of a symmetric matrix A with A_ij (x_i − x_j) = a_i b_j − b_i a_j, ‖A‖ < 1. */
const symmetricCase = fc.integer({ min: 1, max: 14 }).chain((n) =>
  fc.record({
    x: fc.array(fc.double({ min: 0.2, max: 1, noNaN: true }), { minLength: n, maxLength: n }),
    a: fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: n, maxLength: n }),
    b: fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: n, maxLength: n }),
    e: fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: n, maxLength: n }),
  }),
);

function build(c: { x: number[]; a: number[]; b: number[]; e: number[] }) {
  const n = c.x.length;
  // Increasing nodes with gaps of at least 0.2; entries scaled so that the row sums stay below 0.9.
  let at = 0;
  const x = Float64Array.from(c.x, (gap) => {
    at += gap;
    return at;
  });
  const raw = (i: number, j: number): number =>
    i === j ? c.e[i] : (c.a[i] * c.b[j] - c.b[i] * c.a[j]) / (x[i] - x[j]);
  let row = 1e-3;
  for (let i = 0; i < n; i++) {
    let sum = 0;
    for (let j = 0; j < n; j++) sum += Math.abs(raw(i, j));
    row = Math.max(row, sum);
  }
  const scale = 0.9 / row;
  const matrix = Float64Array.from({ length: n * n }, (_, k) => scale * raw(Math.floor(k / n), k % n));
  return {
    n,
    x,
    a: Float64Array.from(c.a, (v) => v * scale),
    b: Float64Array.from(c.b),
    e: Float64Array.from(c.e, (v) => v * scale),
    matrix,
  };
}

function identityMinus(matrix: Float64Array, n: number): Matrix {
  const m = Matrix.identity(n, n);
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) m.set(i, j, m.get(i, j) - matrix[i * n + j]);
  return m;
}

describe("elimination of I − A", () => {
  it("structured, dense symmetric, unpivoted and pivoted agree with ml-matrix", () => {
    fc.assert(
      fc.property(symmetricCase, (c) => {
        const { n, x, a, b, e, matrix } = build(c);
        const expected = mlDeterminant(identityMinus(matrix, n));
        const structured = e.slice();
        expect(eliminateStructuredSymmetric(x, a.slice(), b.slice(), structured, n, n, 0)).toBe(n);
        const general = e.slice();
        const left = Float64Array.from({ length: 2 * n }, (_, k) => (k % 2 === 0 ? a[k >> 1] : b[k >> 1]));
        const right = Float64Array.from({ length: 2 * n }, (_, k) => (k % 2 === 0 ? b[k >> 1] : -a[k >> 1]));
        expect(eliminateStructuredGeneral(x.slice(), left, right, general, 2, n, n).done).toBe(n);
        const symmetric = new Float64Array(n);
        expect(eliminateDenseSymmetric(matrix.slice(), symmetric, new Float64Array(n), n, n, n, 0)).toBe(n);
        const unpivoted = new Float64Array(n);
        eliminateDenseUnpivoted(matrix.slice(), unpivoted, n, n, n, 0);
        const pivoted = new Float64Array(n);
        const odd = eliminateDensePivoted(matrix.slice(), pivoted, n, n);
        const all = [structured, general, symmetric, unpivoted].map((p) => summarizePivots(p, n).value);
        for (const value of [...all, summarizePivots(pivoted, n, odd).value]) {
          expect(Math.abs(value - expected)).toBeLessThan(2e-14 * Math.max(1, Math.abs(expected)));
        }
      }),
      settings,
    );
  });

  it("a row carried along ends as the diagonal of A + A (I − A)⁻¹ A", () => {
    fc.assert(
      fc.property(
        symmetricCase.filter((c) => c.x.length > 1),
        (c) => {
          const { n, x, a, b, e, matrix } = build(c);
          const inner = Array.from({ length: n - 1 }, (_, i) => i);
          const full = new Matrix(inner.map((i) => inner.map((j) => matrix[i * n + j])));
          const solve = inverse(Matrix.identity(n - 1, n - 1).sub(full));
          const row = new Matrix([inner.map((j) => matrix[(n - 1) * n + j])]);
          const expected = matrix[n * n - 1] + row.mmul(solve).mmul(row.transpose()).get(0, 0);
          const structured = e.slice();
          eliminateStructuredSymmetric(x, a, b, structured, n - 1, n, 0);
          expect(Math.abs(structured[n - 1] - expected)).toBeLessThan(1e-13);
          const dense = new Float64Array(n);
          eliminateDenseSymmetric(matrix.slice(), dense, new Float64Array(n), n - 1, n, n, 0);
          expect(Math.abs(dense[n - 1] - expected)).toBeLessThan(1e-13);
        },
      ),
      settings,
    );
  });

  it("keeps the relative accuracy of a tiny complement", () => {
    // A = c u uᵀ with |u| = 1: det = 1 − c, complement c, at any size.
    for (const size of [1e-3, 1e-20, 1e-200]) {
      const n = 6;
      const u = Float64Array.from({ length: n }, (_, i) => Math.sqrt((2 * (i + 1)) / (n * (n + 1))));
      const matrix = Float64Array.from({ length: n * n }, (_, k) => size * u[Math.floor(k / n)] * u[k % n]);
      const e = new Float64Array(n);
      eliminateDenseSymmetric(matrix, e, new Float64Array(n), n, n, n, 0);
      const { complement, logAbs } = summarizePivots(e, n);
      expect(Math.abs(complement / size - 1)).toBeLessThan(4e-16);
      expect(Math.abs(logAbs / Math.log1p(-size) - 1)).toBeLessThan(1e-15);
    }
  });

  it("stops at a pivot that is not positive and says where", () => {
    const e = Float64Array.of(0.5, 2, 0.1);
    expect(
      eliminateStructuredSymmetric(
        Float64Array.of(0, 1, 2),
        new Float64Array(3),
        new Float64Array(3),
        e,
        3,
        3,
        0,
      ),
    ).toBe(1);
    const matrix = Float64Array.of(0.5, 0, 0, 0, 2, 0, 0, 0, 0.1);
    expect(eliminateDenseSymmetric(matrix, new Float64Array(3), new Float64Array(3), 3, 3, 3, 0)).toBe(1);
  });
});

describe("summarizePivots", () => {
  it("carries the logarithm past the range of doubles, with the sign", () => {
    const n = 3000;
    const small = summarizePivots(new Float64Array(n).fill(1 - 1e-3), n);
    expect(small.value).toBe(0);
    expect(Math.abs(small.logAbs - n * Math.log(1 - (1 - 1e-3)))).toBeLessThan(1e-9);
    const large = summarizePivots(new Float64Array(n + 1).fill(11), n + 1);
    expect(large.sign).toBe(-1);
    expect(large.value).toBe(Number.NEGATIVE_INFINITY);
    expect(Math.abs(large.logAbs - (n + 1) * Math.log(10))).toBeLessThan(1e-9);
  });

  it("reads a zero pivot as determinant 0", () => {
    const { value, sign, complement } = summarizePivots(Float64Array.of(0.3, 1, 0.2), 3);
    expect([value, sign, complement]).toEqual([0, 0, 1]);
  });
});
