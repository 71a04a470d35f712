/**
 * Builds kernel and domain of each case of known-determinants.json.
 */
import type { Kernel } from "../../src/determinant/kernel.ts";
import { integrableKernel } from "../../src/kernels/integrable-kernel.ts";
import { smoothKernel } from "../../src/kernels/smooth-kernel.ts";
import { type Domain, halfLine, interval } from "../../src/quadrature/domain.ts";

/** A case: family, parameters, tolerance, and the value hi + lo. */
export interface KnownCase {
  readonly family: string;
  readonly z: number;
  readonly hi: number;
  readonly lo: number;
  readonly absTol?: number;
  readonly relTol?: number;
  readonly [parameter: string]: unknown;
}

const horner =
  (c: readonly number[]) =>
  (x: number): number => {
    let sum = 0;
    for (let k = c.length - 1; k >= 0; k--) sum = sum * x + c[k];
    return sum;
  };
const derivative = (c: readonly number[]): ((x: number) => number) =>
  horner(c.slice(1).map((v, k) => v * (k + 1)));

const SINE = integrableKernel({
  left: [(x) => Math.sin(Math.PI * x) / Math.PI, (x) => Math.cos(Math.PI * x)],
  diagonal: () => 1,
});
const SINE_FOUR = integrableKernel({
  left: [(x) => Math.sin(Math.PI * x) / Math.PI, (x) => Math.cos(Math.PI * x)],
  right: [(x) => Math.cos(Math.PI * x), (x) => -Math.sin(Math.PI * x) / Math.PI],
  diagonal: () => 1,
});

/** Kernel and domain of a case; `variant` chooses between equivalent ways to write the kernel. */
export function buildCase(c: KnownCase, variant: number): [Kernel, Domain] {
  const number = (key: string): number => c[key] as number;
  const list = (key: string): readonly number[] => c[key] as readonly number[];
  switch (c.family) {
    case "green": {
      const L = number("L");
      const kernel = smoothKernel((x, y) => (Math.min(x, y) * (L - Math.max(x, y))) / L, { symmetric: true });
      return [kernel, interval(0, L)];
    }
    case "brownian":
      return [smoothKernel((x, y) => Math.min(x, y)), interval(0, number("T"))];
    case "ornstein":
      return [smoothKernel((x, y) => Math.exp(-number("a") * Math.abs(x - y))), interval(0, number("T"))];
    case "exponentials": {
      const [w, l] = [list("c"), list("l")];
      const kernel = smoothKernel((x, y) => w.reduce((sum, v, j) => sum + v * Math.exp(-l[j] * (x + y)), 0));
      return [kernel, halfLine(number("s"))];
    }
    case "powers": {
      const [w, p, q] = [list("c"), list("p"), list("q")];
      const kernel = smoothKernel((x, y) => w.reduce((sum, v, j) => sum + v * x ** p[j] * y ** q[j], 0));
      return [kernel, interval(number("a"), number("b"))];
    }
    case "bezout": {
      const [p, q] = [horner(list("p")), horner(list("q"))];
      const [dp, dq] = [derivative(list("p")), derivative(list("q"))];
      const diagonal = (x: number): number => dp(x) * q(x) - p(x) * dq(x);
      const right = variant % 2 === 0 ? {} : { right: [q, (x: number) => -p(x)] };
      return [integrableKernel({ left: [p, q], ...right, diagonal }), interval(number("a"), number("b"))];
    }
    case "rational":
      return [
        smoothKernel((x, y) => number("c") / (x ** number("p") * y ** number("p"))),
        halfLine(number("s")),
      ];
    case "sine":
      return [variant % 3 === 0 ? SINE_FOUR : SINE, interval(number("a"), number("b"))];
    default:
      throw new Error(`unknown family ${c.family}`);
  }
}
