/**
 * The compiled elimination against the plain one, bit for bit, and the two against the formulas as they stand.
 */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { seededGenerator } from "../../src/core/random.ts";
import type { Arithmetic } from "../../src/core/web-assembly.ts";
import { Workspace } from "../../src/core/workspace.ts";
import { eliminateStructuredSymmetric } from "../../src/linalg/structured-symmetric.ts";

interface Case {
  readonly x: Float64Array;
  readonly a: Float64Array;
  readonly b: Float64Array;
  readonly e: Float64Array;
}

interface Outcome extends Case {
  readonly done: number;
}

type Route = (c: Case, pivots: number, rows: number, least: number) => Outcome;

/** On ordinary arrays: the compiled form copies. */
function onCopies(arithmetic: Arithmetic): Route {
  return (c, pivots, rows, least) => {
    const [x, a, b, e] = [c.x.slice(), c.a.slice(), c.b.slice(), c.e.slice()];
    return { x, a, b, e, done: eliminateStructuredSymmetric(x, a, b, e, pivots, rows, least, arithmetic) };
  };
}

/** On arrays in linear memory. */
const inPlace: Route = (c, pivots, rows, least) => {
  const workspace = Workspace.borrow(16, "wasm");
  try {
    const [x, a, b, e] = [c.x, c.a, c.b, c.e].map((source) => {
      const array = workspace.take(source.length);
      array.set(source);
      return array;
    });
    const done = eliminateStructuredSymmetric(x, a, b, e, pivots, rows, least, "wasm");
    return { x: x.slice(), a: a.slice(), b: b.slice(), e: e.slice(), done };
  } finally {
    workspace.release();
  }
};

const plain = onCopies("plain");

/** Object.is on every entry: −0 and 0 differ, NaN is NaN. */
function expectSame(found: Outcome, expected: Outcome, what: string): void {
  expect(found.done, what).toBe(expected.done);
  for (const name of ["x", "a", "b", "e"] as const) {
    const at = found[name].findIndex((value, i) => !Object.is(value, expected[name][i]));
    expect(at, `${what}: ${name}[${at}] = ${found[name][at]}, not ${expected[name][at]}`).toBe(-1);
  }
}

function expectTwins(c: Case, pivots: number, rows: number, least: number, what: string): Outcome {
  const expected = plain(c, pivots, rows, least);
  expectSame(inPlace(c, pivots, rows, least), expected, `${what}, in place`);
  expectSame(onCopies("wasm")(c, pivots, rows, least), expected, `${what}, copied`);
  expectSame(onCopies("automatic")(c, pivots, rows, least), expected, `${what}, automatic`);
  return expected;
}

/** The textbook form: one pivot at a time, one division an entry. */
function oneByOne(c: Case, pivots: number, rows: number, least: number): Outcome {
  const [x, a, b, e] = [c.x.slice(), c.a.slice(), c.b.slice(), c.e.slice()];
  for (let q = 0; q < pivots; q++) {
    const m = 1 - e[q];
    if (!(m > least)) return { x, a, b, e, done: q };
    const [aq, bq] = [a[q], b[q]];
    for (let i = q + 1; i < rows; i++) {
      const v = (a[i] * bq - b[i] * aq) / (x[i] - x[q]);
      a[i] += (v * aq) / m;
      b[i] += (v * bq) / m;
      e[i] += (v * v) / m;
    }
  }
  return { x, a, b, e, done: pivots };
}

/** A smooth kernel of small norm on n nodes, a few entries more than rows. */
function smoothCase(n: number, seed: number): Case {
  const uniform = seededGenerator(seed);
  const size = n + 3;
  const x = Float64Array.from({ length: size }, (_, i) => -1 + (2 * (i + 0.2 + 0.6 * uniform())) / size);
  const scale = 0.3 / size;
  const [p, q] = [1 + 3 * uniform(), uniform()];
  const f = (t: number): number => Math.sin(p * t + q);
  const g = (t: number): number => Math.cos(p * t + q);
  return {
    x,
    a: x.map((t) => scale * f(t)),
    b: x.map(g),
    e: x.map(() => scale * p),
  };
}

describe("compiled and plain elimination", () => {
  it("agree bit for bit at every order from 0 to 130 and at some larger ones", () => {
    for (const n of [...Array.from({ length: 131 }, (_, k) => k), 255, 256, 257, 511, 1000, 1001]) {
      const outcome = expectTwins(smoothCase(n, n + 1), n, n, 0, `n = ${n}`);
      expect(outcome.done).toBe(n);
    }
  });

  it("agree where rows are carried along, and leave the entries behind them alone", () => {
    for (const pivots of [0, 1, 2, 3, 7, 8, 45, 46, 47, 48, 49, 50, 51, 97]) {
      for (const extra of [1, 2, 3]) {
        const c = smoothCase(pivots + extra, 17 * pivots + extra);
        const rows = pivots + extra;
        const outcome = expectTwins(c, pivots, rows, 0, `${pivots} of ${rows}`);
        for (const name of ["a", "b", "e"] as const) {
          expect([...outcome[name].subarray(rows)]).toEqual([...c[name].subarray(rows)]);
        }
      }
    }
  });

  it("stop at the same pivot, with the rows below as the pivots before it left them", () => {
    for (const n of [1, 2, 3, 4, 9, 20, 60, 75]) {
      for (let stop = 0; stop < n; stop++) {
        const c = smoothCase(n, n + 100 * stop);
        c.e[stop] = 2;
        const outcome = expectTwins(c, n, n + 2, 0, `n = ${n}, stop at ${stop}`);
        expect(outcome.done).toBe(stop);
        const textbook = oneByOne(c, n, n + 2, 0);
        expect(textbook.done).toBe(stop);
        for (let i = 0; i < n + 2; i++) {
          expect(Math.abs(outcome.a[i] - textbook.a[i])).toBeLessThanOrEqual(1e-14);
          expect(Math.abs(outcome.e[i] - textbook.e[i])).toBeLessThanOrEqual(1e-14);
        }
      }
    }
  });

  it("agree on anything: random numbers, with infinities, NaN, zeros and equal nodes", () => {
    const entry = fc.oneof(
      { weight: 20, arbitrary: fc.double({ min: -2, max: 2, noNaN: true }) },
      { weight: 1, arbitrary: fc.double() },
      {
        weight: 1,
        arbitrary: fc.constantFrom(0, -0, Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY),
      },
    );
    const cases = fc.integer({ min: 1, max: 70 }).chain((rows) => {
      const column = fc
        .array(entry, { minLength: rows, maxLength: rows })
        .map((values) => Float64Array.from(values));
      return fc.record({
        x: column,
        a: column,
        b: column,
        e: column,
        pivots: fc.integer({ min: 0, max: rows }),
        least: fc.constantFrom(0, 1e-3, 0.5),
      });
    });
    let far = 0;
    fc.assert(
      fc.property(cases, ({ pivots, least, ...c }) => {
        if (expectTwins(c, pivots, c.x.length, least, "random").done > 2) far++;
      }),
      { seed: 20261201, numRuns: 1500 },
    );
    expect(far).toBeGreaterThan(100);
  });

  it("agree with the textbook form to rounding", () => {
    for (const n of [5, 24, 47, 48, 49, 120, 400]) {
      const c = smoothCase(n, n);
      const found = plain(c, n, n + 1, 0);
      const textbook = oneByOne(c, n, n + 1, 0);
      for (let i = 0; i <= n; i++) {
        const error = Math.abs(found.e[i] - textbook.e[i]);
        expect(error, `n = ${n}, row ${i}`).toBeLessThanOrEqual(1e-14 * Math.abs(textbook.e[i]));
      }
    }
  });
});

describe("nodes of extreme scale", () => {
  // x → c x with the kernel divided by c: the matrix is the same, and for c a power of two so are all its bits.
  const scaled = (c: Case, factor: number): Case => ({ ...c, x: c.x.map((value) => value * factor) });

  it.each([2 ** -700, 2 ** -600, 2 ** -450, 2 ** -300, 2 ** 300, 2 ** 499, 2 ** 505, 2 ** 700])(
    "give the determinant at scale %d, compiled or not",
    (factor) => {
      for (const n of [2, 9, 24, 61]) {
        const c = smoothCase(n, n);
        const textbook = oneByOne(c, n, n + 1, 0);
        const big = scaled(c, factor);
        // One generator takes the factor; it is kept in range by giving each its root.
        const root = Math.sqrt(Math.abs(factor));
        const given = { ...big, a: c.a.map((v) => v * root), b: c.b.map((v) => v * (factor / root)) };
        const found = expectTwins(given, n, n + 1, 0, `scale ${factor}`);
        expect(found.done).toBe(n);
        for (let i = 0; i <= n; i++) {
          const error = Math.abs(found.e[i] - textbook.e[i]);
          expect(error).toBeLessThanOrEqual(2e-14 * Math.abs(textbook.e[i]));
        }
      }
    },
  );

  it("with nodes of very different size beside each other", () => {
    const x = Float64Array.of(0, 1e-200, 3e-200, 1e-150, 1e-140, 1e-20, 1, 2);
    const c = { x, a: x.map((t) => 0.1 * t), b: x.map(() => 1), e: x.map(() => 0.1) };
    // a_i b_j − b_i a_j = 0.1 (x_i − x_j): every entry of A is 0.1, the determinant of I − A is 1 − 0.8.
    const found = expectTwins(c, 8, 8, 0, "mixed sizes");
    expect(found.done).toBe(8);
    const determinant = found.e.reduce((product, value) => product * (1 - value), 1);
    expect(Math.abs(determinant - 0.2)).toBeLessThan(1e-15);
  });
});
