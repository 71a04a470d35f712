/**
 * Where to cut a half-line (lower, ∞): from the kernel's own decay when it is known, by probing otherwise. A kernel
 * that dies out only like a power is not cut; its half-line is mapped to a finite interval instead.
 */
import { InvalidArgumentError } from "../core/errors.ts";
import type { HalfLine, Interval } from "../quadrature/domain.ts";
import type { Panel } from "../quadrature/panels.ts";
import type { Kernel } from "./kernel.ts";

/** Finite panels that stand for a domain, and what the truncation may cost in log det. */
export interface Truncation {
  readonly panels: readonly Panel[];
  readonly error: number;
}

// The part cut off may be 2⁻⁶⁰ of the whole (relative to min(1, whole)), so that small complements keep their digits.
const SHARE = 2 ** -60;

/** Replaces half-lines by intervals; z scales the kernel. */
export function truncate(parts: readonly (Interval | HalfLine)[], kernel: Kernel, z: number): Truncation {
  let error = 0;
  const panels = parts.map((part): Panel => {
    if (part.kind === "interval") return { lower: part.lower, upper: part.upper, mapped: false };
    const cut = kernel.decay ? cutByDecay(part.lower, kernel.decay.tail) : cutByProbing(part.lower, kernel);
    if ("scale" in cut) return { lower: part.lower, upper: part.lower + cut.scale, mapped: true };
    error += Math.abs(z) * cut.error;
    return { lower: part.lower, upper: cut.at, mapped: false };
  });
  return { panels, error };
}

interface Cut {
  readonly at: number;
  readonly error: number;
}

function cutByDecay(lower: number, tail: (lower: number, cut: number) => number): Cut {
  const target = SHARE * Math.min(1, tail(lower, lower));
  let step = 1;
  while (tail(lower, lower + step) > target && step < 1e12) step *= 2;
  let low = step / 2;
  let high = step;
  // The cut need not be sharp: 1/8 of an octave is enough.
  for (let k = 0; k < 3; k++) {
    const middle = 0.5 * (low + high);
    if (tail(lower, lower + middle) > target) low = middle;
    else high = middle;
  }
  const at = lower + high;
  return { at, error: tail(lower, at) };
}

const PROBES = 12; // probe points for each length tried
const LENGTHS = 24; // lengths tried, from 0.5 up by factors √2: to about 1400
// An exponential falls to 2⁻⁶⁰ within 30 times the length in which it falls to 1/4; a power takes far longer.
const MOST_FALLS = 60;

function cutByProbing(lower: number, kernel: Kernel): Cut | { readonly scale: number } {
  const size = kernelSize(kernel, lower);
  let most = 0;
  let quarter = 0; // first length beyond which the kernel stays below a quarter of its largest value
  let step = 0.5;
  for (let k = 0; k < LENGTHS; k++, step *= Math.SQRT2) {
    most = Math.max(most, largestOn(size, lower, lower + step));
    // Beyond the cut a stretch twice as long is probed, so that a passing zero or a gap does not look like decay.
    const beyond = largestOn(size, lower + step, lower + 3 * step);
    if (quarter === 0 && beyond <= 0.25 * most) quarter = step;
    if (most > 0 && beyond <= SHARE * most && step <= MOST_FALLS * quarter) {
      return { at: lower + step, error: 4 * beyond * step };
    }
  }
  // Decays like a power. Trace class needs more than 1/x: compare x·size over six octaves.
  const near = largestOn(size, lower + step, lower + 2 * step) * step;
  const far = largestOn(size, lower + 64 * step, lower + 128 * step) * 64 * step;
  if (quarter > 0 && (near === 0 || far < 0.25 * near)) return { scale: quarter };
  if (most === 0) return { at: lower + 1, error: 0 };
  throw new InvalidArgumentError(
    "domain",
    `a half-line on which ${kernel.name} decays faster than 1/x`,
    `halfLine(${lower})`,
  );
}

function largestOn(size: (x: number) => number, from: number, to: number): number {
  let most = 0;
  // Irrational spacing: equally spaced probes could all fall on the zeros of an oscillating kernel.
  for (let i = 1; i <= PROBES; i++) {
    const share = (i * 0.6180339887498949) % 1;
    most = Math.max(most, size(from + (to - from) * share));
  }
  return Math.max(most, size(from), size(to));
}

/** A positive function of x that bounds, up to a factor, how much the point x matters in the determinant. */
function kernelSize(kernel: Kernel, lower: number): (x: number) => number {
  if (kernel.kind === "smooth") {
    return (x) => {
      // |K(x,x)| enters at first order, K(x,y)K(y,x) for y near the lower end at second order.
      const near = lower + 0.25 * Math.min(1, x - lower);
      const first = Math.abs(finite(kernel, x, kernel.evaluate(x, x)));
      const second = Math.abs(
        finite(kernel, x, kernel.evaluate(x, near)) * finite(kernel, x, kernel.evaluate(near, x)),
      );
      return first + second;
    };
  }
  const nodes = new Float64Array(1);
  const left = Array.from({ length: kernel.rank }, () => new Float64Array(1));
  const right = kernel.antisymmetricPair
    ? []
    : Array.from({ length: kernel.rank }, () => new Float64Array(1));
  const diagonal = new Float64Array(1);
  return (x) => {
    nodes[0] = x;
    kernel.sample(nodes, 1, left, right, diagonal);
    let size = Math.abs(diagonal[0]);
    for (let k = 0; k < kernel.rank; k++) {
      // Far apart, |K(x,y) K(y,x)| ~ |f|²|g|²: the square of the generators bounds the second-order part.
      const g = kernel.antisymmetricPair ? left[1 - k][0] : right[k][0];
      size += Math.abs(left[k][0] * g);
    }
    return size;
  };
}

function finite(kernel: Kernel, x: number, value: number): number {
  if (Number.isFinite(value)) return value;
  throw new InvalidArgumentError(`kernel (${kernel.name})`, `a finite value at x = ${x}`, value);
}
