/**
 * Samples for the tables of the Tracy–Widom laws. The exact route answers one point with an error; a table wants
 * hundreds of points with as little rounding noise as possible. Determinants of different order have independent
 * rounding errors: their mean is used, and their agreement shows that all have converged.
 */
import { discretizedDeterminant } from "../determinant/discretized.ts";
import { truncate } from "../determinant/truncation.ts";
import { airyKernel } from "../kernels/airy-kernel.ts";
import { airySumKernel } from "../kernels/airy-sum-kernel.ts";
import { halfLine } from "../quadrature/domain.ts";
import { type Beta, exactPoint, hasMinorRoute, RIGHT_SWITCH } from "./tracy-widom-exact.ts";

/** Distribution function, survival function and density at one point. */
export interface LawSample {
  readonly cdf: number;
  readonly survival: number;
  readonly pdf: number;
}

const ORDERS: Readonly<Record<Beta, readonly number[]>> = {
  1: [48, 53],
  2: [40, 43, 46],
  4: [44, 48, 52, 56],
};
const AGREEMENT = 4e-15;

/** The law at s, in the unscaled variable. */
export function samplePoint(beta: Beta, s: number): LawSample {
  if (s <= RIGHT_SWITCH[beta] && !hasMinorRoute(beta, s)) {
    const found = ORDERS[beta].map((order) => atOrder(beta, s, order));
    const [first] = found;
    // Relative where the survival function is small, absolute otherwise.
    const scale = AGREEMENT * Math.min(1, Math.abs(first.survival));
    const agree = found.every(
      (other) =>
        Math.abs(other.survival - first.survival) <= scale && Math.abs(other.pdf - first.pdf) <= AGREEMENT,
    );
    if (agree) return mean(found);
  }
  const { cdf, survival, pdf } = exactPoint(beta, s);
  return { cdf: cdf.value, survival: survival.value, pdf: pdf.value };
}

function mean(samples: readonly LawSample[]): LawSample {
  const average = (read: (sample: LawSample) => number): number =>
    samples.reduce((sum, sample) => sum + read(sample), 0) / samples.length;
  return { cdf: average((p) => p.cdf), survival: average((p) => p.survival), pdf: average((p) => p.pdf) };
}

function atOrder(beta: Beta, s: number, order: number): LawSample {
  if (beta === 2) return oneDeterminant(beta, s, order, 1);
  const minus = oneDeterminant(beta, s, order, 1);
  return beta === 1 ? minus : mean([minus, oneDeterminant(beta, s, order, -1)]);
}

function oneDeterminant(beta: Beta, s: number, order: number, z: number): LawSample {
  const kernel = beta === 2 ? airyKernel() : airySumKernel();
  const { panels } = truncate([halfLine(s)], kernel, z);
  const { value, complement, resolvent } = discretizedDeterminant(kernel, panels, order, z, s);
  return { cdf: value, survival: complement, pdf: value * resolvent };
}
