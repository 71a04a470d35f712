/**
 * A function on a row of intervals, one Chebyshev expansion each.
 */
import { chebyshevCoefficients, chebyshevPoints, clenshaw } from "./chebyshev.ts";

// Each expansion reaches a little beyond its interval: noise in the samples is largest at the ends of an expansion,
// where all T_k are ±1, and those ends are then never used.
const MARGIN = 0.1;

/** Chebyshev expansions of one degree on consecutive intervals. */
export class PiecewiseChebyshev {
  readonly breaks: Float64Array;
  readonly degree: number;
  readonly coefficients: Float64Array;

  /**
   * @param breaks - End points of the intervals, increasing.
   * @param degree - Degree on each interval.
   * @param coefficients - degree + 1 coefficients for each interval, one interval after another.
   */
  constructor(breaks: Float64Array, degree: number, coefficients: Float64Array) {
    this.breaks = breaks;
    this.degree = degree;
    this.coefficients = coefficients;
  }

  /** Index of the interval that holds x; the first or last one when x lies outside. */
  locate(x: number): number {
    const { breaks } = this;
    let low = 0;
    let high = breaks.length - 2;
    while (low < high) {
      const middle = (low + high + 1) >> 1;
      if (x >= breaks[middle]) low = middle;
      else high = middle - 1;
    }
    return low;
  }

  /** Value at x on interval `piece`. */
  evaluateOn(piece: number, x: number): number {
    const lower = this.breaks[piece];
    const upper = this.breaks[piece + 1];
    const t = (x - lower - (upper - x)) / ((1 + MARGIN) * (upper - lower));
    return clenshaw(this.coefficients, piece * (this.degree + 1), this.degree, t);
  }
}

/**
 * Points at which a function must be sampled to be tabulated: `count` Chebyshev points on each interval, a
 * twentieth of its length beyond both ends.
 */
export function tabulationPoints(breaks: readonly number[], count: number): Float64Array {
  const points = new Float64Array((breaks.length - 1) * count);
  for (let p = 0; p + 1 < breaks.length; p++) {
    const margin = 0.5 * MARGIN * (breaks[p + 1] - breaks[p]);
    points.set(chebyshevPoints(count, breaks[p] - margin, breaks[p + 1] + margin), p * count);
  }
  return points;
}

/**
 * The table of a function from its samples at {@link tabulationPoints}.
 *
 * @param degree - Below `count`; the coefficients beyond it are noise and are dropped.
 */
export function fromSamples(
  breaks: readonly number[],
  count: number,
  degree: number,
  samples: Float64Array,
): PiecewiseChebyshev {
  const coefficients = new Float64Array((breaks.length - 1) * (degree + 1));
  for (let p = 0; p + 1 < breaks.length; p++) {
    const c = chebyshevCoefficients(samples.subarray(p * count, (p + 1) * count), degree);
    coefficients.set(withoutNoise(c), p * (degree + 1));
  }
  return new PiecewiseChebyshev(Float64Array.from(breaks), degree, coefficients);
}

/** Sets the trailing coefficients to 0 that are below a rounding of the largest: they hold noise, not the function. */
function withoutNoise(c: Float64Array): Float64Array {
  const most = c.reduce((m, x) => Math.max(m, Math.abs(x)), 0);
  let last = c.length - 1;
  while (last > 0 && Math.abs(c[last]) <= 2 ** -53 * most) last--;
  c.fill(0, last + 1);
  return c;
}
