import { describe, expect, it } from "vitest";
import { InvalidArgumentError } from "../../src/core/errors.ts";
import { type Domain, halfLine, interval, partsOf, union } from "../../src/quadrature/domain.ts";

describe("domains", () => {
  it("keeps the parts of a union in order, nested unions flattened", () => {
    const domain = union(halfLine(5), union(interval(-1, 0), interval(2, 3)), interval(0, 1));
    expect(partsOf(domain).map((part) => part.lower)).toEqual([-1, 0, 2, 5]);
  });

  it.each<[string, () => Domain, RegExp]>([
    ["NaN", () => interval(Number.NaN, 1), /lower: expected a finite number, received NaN/],
    ["infinite lower end", () => interval(Number.NEGATIVE_INFINITY, 1), /lower/],
    [
      "infinite upper end",
      () => interval(0, Number.POSITIVE_INFINITY),
      /upper: expected a finite number above lower = 0/,
    ],
    ["reversed", () => interval(1, 0), /upper: expected a finite number above lower = 1, received 0/],
    ["empty", () => interval(1, 1), /upper/],
    ["half-line from NaN", () => halfLine(Number.NaN), /lower/],
    ["half-line from infinity", () => halfLine(Number.POSITIVE_INFINITY), /lower/],
    ["nothing", () => union(), /domains: expected at least one domain/],
    ["overlap", () => union(interval(0, 2), interval(1, 3)), /disjoint/],
    ["nested", () => union(interval(0, 3), interval(1, 2)), /disjoint/],
    ["beyond a half-line", () => union(halfLine(0), interval(1, 2)), /disjoint/],
    ["not a domain", () => union({ kind: "disc" } as unknown as Domain), /domains\[0\]: expected a domain/],
    ["made by hand, reversed", () => union({ kind: "interval", lower: 1, upper: 0 }), /upper/],
  ])("refuses %s", (_, make, message) => {
    expect(make).toThrow(InvalidArgumentError);
    expect(make).toThrow(message);
  });
});
