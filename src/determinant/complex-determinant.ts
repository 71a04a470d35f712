/**
 * det(I − zK) at a complex z for a real kernel: the generating function of counts off the real axis. With
 * z = 1 − e^{iθ} it is the characteristic function of the number of points in the domain.
 *
 * The matrix √w K √w is real; I − zA is eliminated as a dense complex matrix. The order is the one the real engine
 * needed at |z| or more, grown until the differences settle, as in `fredholm-determinant.ts`.
 */
import Complex from "complex.js";
import { requireFinite, requireInteger, requireNonNegative } from "../core/check.ts";
import { InvalidArgumentError } from "../core/errors.ts";
import { eliminateDenseComplex } from "../linalg/dense-complex.ts";
import { type Domain, partsOf } from "../quadrature/domain.ts";
import type { Kernel } from "./kernel.ts";
import { kernelMatrix } from "./scene.ts";
import { truncate } from "./truncation.ts";

/** A complex number, as complex.js makes them or by its parts. */
export interface ComplexNumber {
  readonly re: number;
  readonly im: number;
}

/** A complex determinant with its error. */
export interface ComplexDeterminantEstimate {
  /** The value; has `re`, `im` and the methods of complex.js. */
  readonly value: Complex;
  /** Absolute error: `|value − true| ≤ error`. */
  readonly error: number;
  readonly errorKind: "estimate";
  readonly converged: boolean;
  readonly order: number;
}

/** Options of {@link complexDeterminant}. */
export interface ComplexDeterminantOptions {
  /** Absolute tolerance. Default 1e-13. */
  readonly absTol?: number;
  /** Most points a panel. Default 256. */
  readonly maxOrder?: number;
}

/**
 * det(I − zK) for complex z.
 *
 * @param kernel - A real kernel.
 * @param domain - Made by `interval`, `halfLine` or `union`.
 * @param z - Complex factor.
 * @param options - Tolerance and largest order.
 * @throws {@link InvalidArgumentError} for bad input, as `fredholmDeterminant`.
 *
 * **Error.** Estimate: last difference + truncation + rounding model of the elimination. **Cost.** 4 n³/3 at order n.
 */
export function complexDeterminant(
  kernel: Kernel,
  domain: Domain,
  z: ComplexNumber,
  options: ComplexDeterminantOptions = {},
): ComplexDeterminantEstimate {
  if (kernel?.kind !== "integrable" && kernel?.kind !== "smooth") {
    throw new InvalidArgumentError(
      "kernel",
      "a kernel made by integrableKernel(), smoothKernel() or a built-in one",
      kernel,
    );
  }
  const zr = requireFinite("z.re", z?.re);
  const zi = requireFinite("z.im", z?.im);
  const absTol = requireNonNegative("options.absTol", options.absTol ?? 1e-13);
  const maxOrder = requireInteger("options.maxOrder", options.maxOrder ?? 256, 4, 1024);
  const modulus = Math.hypot(zr, zi);
  const { panels, error: cut } = truncate(partsOf(domain), kernel, modulus);
  const at = (n: number): Step => evaluate(kernelMatrix(kernel, panels, n), n * panels.length, zr, zi);
  let order = Math.min(8, maxOrder);
  let current = at(order);
  let before = Number.POSITIVE_INFINITY;
  for (;;) {
    const next = Math.ceil((order * 4) / 3);
    if (next > maxOrder) return finish(current, order, 10 * before, cut, absTol);
    const refined = at(next);
    const difference = Math.hypot(refined.re - current.re, refined.im - current.im);
    const scale = Math.hypot(refined.re, refined.im);
    current = refined;
    order = next;
    // As in the real engine: one small difference may be chance, the one before must be small too.
    if (difference <= 8 * refined.noise && before <= Math.sqrt(refined.noise * Math.max(1, scale))) {
      return finish(current, order, difference, cut, absTol);
    }
    before = difference;
  }
}

interface Step {
  readonly re: number;
  readonly im: number;
  readonly noise: number;
}

function evaluate(matrix: Float64Array, n: number, zr: number, zi: number): Step {
  const stride = n + (n % 8 === 0 ? 1 : 0);
  const re = new Float64Array(n * stride);
  const im = new Float64Array(n * stride);
  let square = 0;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      const a = matrix[i * n + j];
      square += a * a;
      re[i * stride + j] = (i === j ? 1 : 0) - zr * a;
      im[i * stride + j] = -zi * a;
    }
  }
  const { logAbs, argument, smallestPivot } = eliminateDenseComplex(re, im, n, stride);
  const size = Math.exp(logAbs);
  const norm = Math.hypot(zr, zi) * Math.sqrt(square);
  const noise = size * 2 ** -52 * (8 + (8 * (norm + norm * norm)) / Math.max(smallestPivot, 2 ** -52));
  return { re: size * Math.cos(argument), im: size * Math.sin(argument), noise };
}

function finish(
  step: Step,
  order: number,
  difference: number,
  cut: number,
  absTol: number,
): ComplexDeterminantEstimate {
  const error = step.noise + difference + cut * Math.hypot(step.re, step.im);
  return {
    value: new Complex(step.re, step.im),
    error,
    errorKind: "estimate",
    converged: error <= absTol,
    order,
  };
}
