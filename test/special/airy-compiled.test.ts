/**
 * Compiled Airy functions against the plain ones, bit for bit.
 */
import { describe, expect, it } from "vitest";
import { InvalidArgumentError } from "../../src/core/errors.ts";
import { seededGenerator } from "../../src/core/random.ts";
import { Workspace } from "../../src/core/workspace.ts";
import { airyAi, airyAiPrime, airyPairInto, airySquareIntegral } from "../../src/special/airy.ts";
import { airySquareIntegralInto } from "../../src/special/airy-square-integral.ts";

const uniform = seededGenerator(20261201);
const random = (count: number, low: number, high: number): number[] =>
  Array.from({ length: count }, () => low + (high - low) * uniform());
/** Neighbours of every change of centre and of the ends of the table. */
const edges = Array.from({ length: 321 }, (_, k) => (k - 160) / 8).flatMap((x) => [
  x,
  x - 2 ** -49,
  x + 2 ** -49,
]);
const special = [Number.NaN, Number.POSITIVE_INFINITY, 0, -0, 5e-324, -5e-324, 20, -20, 1e5, 107, -1e10];

const sets: readonly (readonly [string, readonly number[]])[] = [
  ["on the table", [...random(3001, -20, 20), ...edges.filter((x) => Math.abs(x) <= 20)]],
  ["in and out of the table", [...random(700, -30, 30), ...special, ...random(700, 15, 25), ...edges]],
  ["outside", [...random(300, 20.01, 120), ...random(300, -60, -20.01)]],
  ["one", [1.25]],
  ["none", []],
];

describe.each(sets)("compiled pairs, %s", (_, values) => {
  const points = Float64Array.from(values);
  const n = points.length;

  it("have the bits of the single functions, on any arrays", () => {
    const workspace = Workspace.borrow(3 * n + 6, "wasm");
    try {
      const inside = [workspace.take(n), workspace.take(n), workspace.take(n)];
      const outside = [new Float64Array(n), new Float64Array(n), new Float64Array(n)];
      const mixed = [workspace.take(n), new Float64Array(n), new Float64Array(n)];
      for (const arrays of [inside, outside, mixed]) {
        for (const arithmetic of ["wasm", "automatic", "plain"] as const) {
          const [x, ai, aiPrime] = arrays;
          x.set(points);
          ai.fill(7);
          aiPrime.fill(7);
          airyPairInto(x, ai, aiPrime, n, arithmetic);
          for (let i = 0; i < n; i++) {
            expect(Object.is(x[i], points[i])).toBe(true);
            expect(ai[i], `Ai(${x[i]})`).toBe(airyAi(x[i]));
            expect(aiPrime[i], `Ai'(${x[i]})`).toBe(airyAiPrime(x[i]));
          }
        }
      }
    } finally {
      workspace.release();
    }
  });

  it("may overwrite their points, also in linear memory", () => {
    const workspace = Workspace.borrow(2 * n + 4, "wasm");
    try {
      for (const [first, second] of [
        [workspace.take(n), workspace.take(n)],
        [new Float64Array(n), new Float64Array(n)],
      ]) {
        first.set(points);
        airyPairInto(first, first, second, n, "wasm");
        expect([...first]).toEqual(values.map(airyAi));
        expect([...second]).toEqual(values.map(airyAiPrime));
        first.set(points);
        airyPairInto(first, second, first, n, "wasm");
        expect([...second]).toEqual(values.map(airyAi));
        expect([...first]).toEqual(values.map(airyAiPrime));
      }
    } finally {
      workspace.release();
    }
  });

  it("∫Ai² has the bits of the single function, on any arrays", () => {
    const workspace = Workspace.borrow(4 * n + 8, "wasm");
    try {
      for (const take of [(): Float64Array => workspace.take(n), () => new Float64Array(n)]) {
        for (const arithmetic of ["wasm", "automatic", "plain"] as const) {
          workspace.reset();
          const [x, ai, aiPrime, out] = [take(), take(), take(), take()];
          x.set(points);
          airyPairInto(x, ai, aiPrime, n);
          airySquareIntegralInto(x, ai, aiPrime, out, n, arithmetic);
          for (let i = 0; i < n; i++) expect(out[i], `at ${x[i]}`).toBe(airySquareIntegral(x[i]));
        }
      }
    } finally {
      workspace.release();
    }
  });
});

it("stops where the phase is lost, as the plain form: earlier points are done, later ones not", () => {
  const points = Float64Array.of(1, 2, 3, 30, -2e10, 5, 6);
  for (const arithmetic of ["wasm", "plain"] as const) {
    const ai = new Float64Array(7).fill(7);
    const aiPrime = new Float64Array(7).fill(7);
    expect(() => airyPairInto(points, ai, aiPrime, 7, arithmetic)).toThrow(
      /^x: expected a number ≥ -10000000000/,
    );
    expect([...ai]).toEqual([airyAi(1), airyAi(2), airyAi(3), airyAi(30), 7, 7, 7]);
  }
});

it("refuses an unknown arithmetic", () => {
  const two = new Float64Array(2);
  expect(() => airyPairInto(two, two, new Float64Array(2), 2, "fast" as "plain")).toThrow(
    InvalidArgumentError,
  );
});
