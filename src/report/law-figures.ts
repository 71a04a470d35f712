/**
 * The three figures about a law and what was observed: its density, its upper tail on a logarithmic axis, and
 * the quantile plot of a sample.
 *
 * The tail is drawn in base-10 logarithms from `logSurvival`, so an observation at 10⁻⁴⁰⁰ still has its place.
 * The band of the quantile plot is the simultaneous Dvoretzky–Kiefer–Wolfowitz band with Massart's constant
 * (P. Massart, Ann. Probab. 18 (1990) 1269): with probability at least 95 % the empirical distribution function
 * stays within √(log(2/0.05)/(2n)) of the true one everywhere.
 */

import { InvalidArgumentError } from "../core/errors.ts";
import { largest, least } from "../core/extremes.ts";
import type { Law } from "../laws/law.ts";
import type { FigureBlock, FigureLayer } from "./document.ts";
import { lawKey } from "./provenance.ts";

/** One observed value and what to call it in a figure. */
export interface ObservedValue {
  readonly x: number;
  readonly label: string;
  /** True to leave the label out of the drawing, where many would crowd it. */
  readonly quiet?: boolean;
}

function drawnLabels(observed: readonly ObservedValue[]): string[] {
  return observed.map((o) => (o.quiet === true ? "" : o.label));
}

const CURVE_POINTS = 241;
/** The frame of a density reaches from quantile to upper quantile of this probability. */
const FRAME_TAIL = 1e-5;
/** Observations within this many frame widths beyond the frame stretch it; further ones are pointed at. */
const STRETCH = 0.6;
const BAND_LEVEL = 0.05;

function grid(low: number, high: number, count: number = CURVE_POINTS): number[] {
  return Array.from({ length: count }, (_, i) => low + ((high - low) * i) / (count - 1));
}

function requireObservations(values: readonly number[]): void {
  const bad = values.find((x) => !Number.isFinite(x));
  if (bad !== undefined) throw new InvalidArgumentError("observations", "finite numbers", bad);
}

function accuracyText(what: string, error: number): string {
  return `The curve's stated ${what} error is at most ${error.toExponential(0)}.`;
}

/** Limits of the frame, and the observations inside and beyond it. */
function frame(
  law: Law,
  values: readonly number[],
): { low: number; high: number; inside: number[]; beyond: number[] } {
  const start = law.quantile(FRAME_TAIL);
  const end = law.upperQuantile(FRAME_TAIL);
  const width = end - start;
  const inside = values.filter((x) => x >= start - STRETCH * width && x <= end + STRETCH * width);
  const beyond = values.filter((x) => !(x >= start - STRETCH * width && x <= end + STRETCH * width));
  const pad = 0.03 * width;
  const low = Math.min(start, ...inside.map((x) => x - pad));
  const high = Math.max(end, ...inside.map((x) => x + 2 * pad));
  return { low, high, inside, beyond };
}

/** Bins of equal width by the rule of Freedman and Diaconis, 2 · IQR · n^(−1/3), at least 5 and at most 80. */
function histogram(sorted: Float64Array): [number, number, number][] {
  const n = sorted.length;
  const low = sorted[0] as number;
  const high = sorted[n - 1] as number;
  if (!(high > low)) return [];
  const spread =
    (sorted[Math.floor(0.75 * (n - 1))] as number) - (sorted[Math.floor(0.25 * (n - 1))] as number);
  const width = 2 * spread * n ** (-1 / 3);
  const bins = width > 0 ? Math.min(80, Math.max(5, Math.ceil((high - low) / width))) : 5;
  const size = (high - low) / bins;
  const counts = new Float64Array(bins);
  for (const x of sorted) {
    const bin = Math.min(bins - 1, Math.floor((x - low) / size));
    counts[bin] = (counts[bin] as number) + 1;
  }
  return Array.from(counts, (count, i) => [low + i * size, low + (i + 1) * size, count / (n * size)]);
}

/**
 * Density of the law with the observed values as marks.
 *
 * @param law - The law.
 * @param observed - Observed values in the law's own variable, with labels. Values far outside the law are named
 *   at the edge instead of squeezing the curve.
 * @returns A figure.
 * @throws InvalidArgumentError for an observation that is not finite.
 */
export function densityFigure(law: Law, observed: readonly ObservedValue[]): FigureBlock {
  requireObservations(observed.map((o) => o.x));
  const { low, high, beyond } = frame(
    law,
    observed.map((o) => o.x),
  );
  const points = grid(low, high).map((x): [number, number] => [x, law.pdf(x)]);
  const peak = largest(points.map(([, y]) => y));
  const shown = observed.filter((o) => !beyond.includes(o.x)).sort((a, b) => b.x - a.x);
  const layers: FigureLayer[] = [{ kind: "curve", name: `density of ${law.symbol}`, points }];
  if (observed.length > 0) {
    layers.push({
      kind: "sticks",
      name: "observed",
      at: shown.map((o) => o.x),
      labels: drawnLabels(shown),
    });
  }
  const far = observed.filter((o) => beyond.includes(o.x));
  const named = far.length > 4 ? `${far.length} values` : far.map((o) => o.label).join(", ");
  const where = far.every((o) => o.x > high) ? "beyond the right edge" : "outside the frame";
  const places =
    far.length === 0
      ? ""
      : ` Outside the frame: ${far.map((o) => `${o.label} at ${o.x.toPrecision(5)}`).join(", ")}.`;
  const marks =
    observed.length === 0 ? "" : ` Observed values are marked: ${shown.length} inside the frame.${places}`;
  return {
    kind: "figure",
    id: `density-${lawKey(law.symbol)}`,
    title: `Density of ${law.name}`,
    description: `Density of ${law.symbol} over its bulk and both shoulders.${marks} ${accuracyText("absolute density", law.accuracy.pdfAbsolute)}`,
    x: { label: `variable of ${law.symbol}`, domain: [low, high], scale: "linear" },
    y: { label: "density", domain: [0, peak * (observed.length > 0 ? 1.5 : 1.06)], scale: "linear" },
    layers,
    law: law.symbol,
    ...(far.length === 0 ? {} : { beyond: `${named} ${where}` }),
  };
}

/**
 * Upper tail of the law on a logarithmic axis with the observed values on it.
 *
 * @param law - The law.
 * @param observed - Observed values; each stands on the curve at its own upper tail probability.
 * @param level - Significance level drawn as a line.
 * @returns A figure.
 * @throws InvalidArgumentError for an observation that is not finite.
 */
export function tailFigure(law: Law, observed: readonly ObservedValue[], level = 0.05): FigureBlock {
  requireObservations(observed.map((o) => o.x));
  const log10Survival = (x: number): number => law.logSurvival(x) / Math.LN10;
  const start = law.quantile(0.01);
  const end = Math.max(law.upperQuantile(1e-6), ...observed.map((o) => o.x));
  const high = end + 0.06 * (end - start);
  const low = Math.min(start, ...observed.map((o) => o.x).filter((x) => x > law.quantile(FRAME_TAIL)));
  const curve = grid(low, high)
    .map((x): [number, number] => [x, log10Survival(x)])
    .filter(([, y]) => Number.isFinite(y));
  const shown = observed
    .map((o) => ({ ...o, y: log10Survival(o.x) }))
    .filter((o) => Number.isFinite(o.y) && o.x >= low)
    .sort((a, b) => b.x - a.x);
  const floor = least(curve.map(([, y]) => y));
  const layers: FigureLayer[] = [
    { kind: "curve", name: `P(X > x), ${law.symbol}`, points: curve },
    {
      kind: "reference",
      name: `level ${level}`,
      points: [
        [low, Math.log10(level)],
        [high, Math.log10(level)],
      ],
    },
  ];
  if (observed.length > 0) {
    const points = shown.map((o): [number, number] => [o.x, o.y]);
    layers.push({ kind: "points", name: "observed", points, labels: drawnLabels(shown) });
  }
  const left = observed.length - shown.length;
  return {
    kind: "figure",
    id: `tail-${lawKey(law.symbol)}`,
    title: `Upper tail of ${law.name}`,
    description:
      `Probability that ${law.symbol} exceeds x, on a logarithmic axis, with the level ${level} as a dashed line` +
      `${observed.length > 0 ? " and the observed values at their p-values" : ""}.` +
      `${left > 0 ? ` ${left} observed values left of the frame are not drawn.` : ""} ` +
      accuracyText("relative tail", law.accuracy.survivalRelative),
    x: { label: `variable of ${law.symbol}`, domain: [low, high], scale: "linear" },
    // Half a tenth of headroom above probability 1, so that labels there stay inside the frame.
    y: { label: "upper tail probability", domain: [floor, -0.1 * floor], scale: "power-of-ten" },
    layers,
    law: law.symbol,
  };
}

/**
 * Density of the law with the histogram of a sample behind it.
 *
 * @param law - The law.
 * @param sample - At least two finite values.
 */
export function sampleDensityFigure(law: Law, sample: ArrayLike<number>): FigureBlock {
  const sorted = Float64Array.from(sample).sort();
  requireObservations(Array.from(sorted));
  const bars = histogram(sorted);
  const { low, high } = frame(law, [sorted[0] as number, sorted[sorted.length - 1] as number]);
  const points = grid(low, high).map((x): [number, number] => [x, law.pdf(x)]);
  const outside = Array.from(sorted).filter((x) => x < low || x > high).length;
  const peak = largest([...points.map(([, y]) => y), ...bars.map(([, , y]) => y)]);
  return {
    kind: "figure",
    id: `density-${lawKey(law.symbol)}`,
    title: `Sample against the density of ${law.name}`,
    description:
      `Histogram of ${sorted.length} values (${bars.length} bins, area 1) and the density of ${law.symbol}.` +
      `${outside > 0 ? ` ${outside} values lie outside the frame.` : ""} ` +
      accuracyText("absolute density", law.accuracy.pdfAbsolute),
    x: { label: `variable of ${law.symbol}`, domain: [low, high], scale: "linear" },
    y: { label: "density", domain: [0, peak * 1.08], scale: "linear" },
    layers: [
      { kind: "bars", name: "sample", bars },
      { kind: "curve", name: `density of ${law.symbol}`, points },
    ],
    law: law.symbol,
  };
}

/**
 * Quantile plot: ordered sample against the quantiles of the law at (i − ½)/n, with the identity and the
 * simultaneous 95 % band.
 *
 * @param law - The law.
 * @param sample - Finite values.
 * @returns A figure; more than 2000 points are thinned evenly, keeping both ends.
 */
export function quantileFigure(law: Law, sample: ArrayLike<number>): FigureBlock {
  const sorted = Float64Array.from(sample).sort();
  requireObservations(Array.from(sorted));
  const n = sorted.length;
  const stride = Math.max(1, Math.ceil(n / 2000));
  const chosen = Array.from({ length: n }, (_, i) => i).filter((i) => i % stride === 0 || i === n - 1);
  const points = chosen.map((i): [number, number] => [law.quantile((i + 0.5) / n), sorted[i] as number]);
  const epsilon = Math.sqrt(Math.log(2 / BAND_LEVEL) / (2 * n));
  const band = chosen
    .map((i) => (i + 0.5) / n)
    .filter((p) => p - epsilon > 0 && p + epsilon < 1)
    .map((p): [number, number, number] => [
      law.quantile(p),
      law.quantile(p - epsilon),
      law.quantile(p + epsilon),
    ]);
  const all = points.flat();
  const low = least(all);
  const high = largest(all);
  const pad = 0.04 * (high - low || 1);
  const domain: [number, number] = [low - pad, high + pad];
  const layers: FigureLayer[] = [];
  if (band.length > 1) layers.push({ kind: "band", name: "95 % band of the whole curve", points: band });
  layers.push(
    {
      kind: "reference",
      name: "perfect agreement",
      points: [
        [domain[0], domain[0]],
        [domain[1], domain[1]],
      ],
    },
    { kind: "points", name: "sample", points },
  );
  return {
    kind: "figure",
    id: `quantiles-${lawKey(law.symbol)}`,
    title: `Quantile plot against ${law.name}`,
    description:
      `Ordered values of the sample (${n}) against quantiles of ${law.symbol}; on the dashed line they would agree. ` +
      "The band is where the whole curve stays with probability at least 95 % if the law holds " +
      `(Dvoretzky–Kiefer–Wolfowitz, half width ${epsilon.toPrecision(3)} in probability). ` +
      accuracyText("absolute quantile", law.accuracy.quantileAbsolute),
    x: { label: `quantile of ${law.symbol}`, domain, scale: "linear" },
    y: { label: "ordered sample", domain, scale: "linear" },
    layers,
    law: law.symbol,
  };
}
