/**
 * Whole results do not depend on the arithmetic chosen: every field, bit for bit.
 */
import { describe, expect, it } from "vitest";
import { compiled } from "../../src/core/web-assembly.ts";
import {
  type DeterminantOptions,
  determinantWithResolvent,
  fredholmDeterminant,
} from "../../src/determinant/fredholm-determinant.ts";
import type { Kernel } from "../../src/determinant/kernel.ts";
import { airyKernel } from "../../src/kernels/airy-kernel.ts";
import { airySumKernel } from "../../src/kernels/airy-sum-kernel.ts";
import { integrableKernel } from "../../src/kernels/integrable-kernel.ts";
import { type Domain, halfLine, interval, union } from "../../src/quadrature/domain.ts";
import fixture from "../fixtures/known-determinants.json" with { type: "json" };
import { buildCase, type KnownCase } from "./known-cases.ts";

const sine = integrableKernel({
  left: [(x) => Math.sin(Math.PI * x) / Math.PI, (x) => Math.cos(Math.PI * x)],
  diagonal: () => 1,
  contraction: true,
});

/** Results with the three choices; throws where they throw. */
function choices<T>(call: (options: DeterminantOptions) => T): T[] {
  return (["plain", "wasm", "automatic"] as const).map((arithmetic) => call({ arithmetic }));
}

function expectSame(call: (options: DeterminantOptions) => unknown, what: string): void {
  const [plain, wasm, automatic] = choices(call);
  // toEqual on numbers is Object.is.
  expect(wasm, what).toEqual(plain);
  expect(automatic, what).toEqual(plain);
}

describe("the choice of arithmetic", () => {
  it("changes no field of F2 and its resolvent, from the left tail to the right", () => {
    for (let s = -12; s <= 12; s += 0.37) {
      expectSame((options) => fredholmDeterminant(airyKernel(), halfLine(s), options), `F2(${s})`);
      expectSame((options) => determinantWithResolvent(airyKernel(), halfLine(s), s, options), `s = ${s}`);
    }
  });

  it("changes nothing at fixed orders, odd and even, large and small, nor beyond the table", () => {
    for (const order of [1, 2, 3, 5, 16, 24, 41, 63, 64, 300]) {
      const at = (options: DeterminantOptions): DeterminantOptions => ({
        ...options,
        order,
        maxOrder: order,
      });
      expectSame((o) => fredholmDeterminant(airyKernel(), interval(-30, 25), at(o)), `order ${order}`);
      expectSame((o) => fredholmDeterminant(sine, interval(0, 3), at(o)), `sine, order ${order}`);
    }
  });

  it("changes nothing for other kernels, domains, z and routes", () => {
    const table: readonly [Kernel, Domain, number][] = [
      [sine, interval(0, 4), 1],
      [sine, union(interval(0, 1), interval(2, 3)), 0.5],
      [sine, interval(0, 3), 3], // pivots fail: the dense route
      [sine, interval(0, 3), -7],
      [airyKernel(), union(interval(-3, -1), halfLine(0)), 1],
      [airyKernel(), halfLine(-60), 1], // exhausted
      [airySumKernel(), halfLine(-2), 1],
    ];
    for (const [kernel, domain, z] of table) {
      expectSame(
        (o) => fredholmDeterminant(kernel, domain, { ...o, z, maxOrder: 128 }),
        `${kernel.name}, ${z}`,
      );
    }
  });

  it("changes nothing in a hundred of the known cases", () => {
    (fixture.cases as unknown as KnownCase[]).forEach((c, index) => {
      if (index % 21 !== 0) return;
      const [kernel, domain] = buildCase(c, index);
      expectSame((o) => fredholmDeterminant(kernel, domain, { ...o, z: c.z, maxOrder: 64 }), `case ${index}`);
    });
  });

  it("is checked", () => {
    for (const value of ["fast", "", null, 0]) {
      const options = { arithmetic: value } as unknown as DeterminantOptions;
      expect(() => fredholmDeterminant(sine, interval(0, 1), options)).toThrow(
        /^options\.arithmetic: expected "auto/,
      );
    }
  });
});

describe("a kernel that calls the library while it is sampled", () => {
  /** The sine kernel, with a determinant of its own inside each sample. */
  const calling = (inner: () => unknown): Kernel =>
    integrableKernel({
      left: [
        (x) => {
          inner();
          return Math.sin(Math.PI * x) / Math.PI;
        },
        (x) => Math.cos(Math.PI * x),
      ],
      diagonal: () => 1,
      contraction: true,
    });

  it("gets the result of one that does not, and so do the inner calls", () => {
    const inside = fredholmDeterminant(airyKernel(), halfLine(-2));
    const outside = fredholmDeterminant(sine, interval(0, 2));
    for (const arithmetic of ["wasm", "plain"] as const) {
      const found = fredholmDeterminant(
        calling(() => {
          const options = { arithmetic } as const;
          expect(fredholmDeterminant(airyKernel(), halfLine(-2), options)).toEqual(inside);
        }),
        interval(0, 2),
        { arithmetic },
      );
      expect(found).toEqual(outside);
    }
  });

  it("gives its memory back when it throws, however deep", () => {
    const memory = compiled()?.memory;
    const before = memory?.free;
    const throwing = calling(() => {
      throw new Error("no more");
    });
    const nested = calling(() => fredholmDeterminant(throwing, interval(0, 1)));
    for (let k = 0; k < 100; k++) {
      expect(() => fredholmDeterminant(nested, interval(0, 1), { arithmetic: "wasm" })).toThrow("no more");
    }
    expect(memory?.free).toBe(before);
  });

  it("is served where linear memory is full", () => {
    const expected = fredholmDeterminant(airyKernel(), halfLine(-3));
    const memory = compiled()?.memory;
    if (memory === undefined) throw new Error("not compiled");
    const { mark, free } = memory;
    for (const left of [0, 2, 100, 600, 800, 2000]) {
      expect(memory.lend(free - left)).toBe(true);
      try {
        expect(fredholmDeterminant(airyKernel(), halfLine(-3))).toEqual(expected);
        expect(fredholmDeterminant(airyKernel(), halfLine(-3), { arithmetic: "wasm" })).toEqual(expected);
      } finally {
        memory.giveBack(mark);
      }
    }
    expect(memory.free).toBe(free);
  });
});
