/**
 * Axes of figures: linear ones, and logarithmic ones whose ticks read as powers of ten.
 */
import type * as Plot from "@observablehq/plot";
import { plainText } from "./cells.ts";
import type { FigureAxis } from "./document.ts";

const SUPERSCRIPT: Readonly<Record<string, string>> = {
  "-": "⁻",
  "0": "⁰",
  "1": "¹",
  "2": "²",
  "3": "³",
  "4": "⁴",
  "5": "⁵",
  "6": "⁶",
  "7": "⁷",
  "8": "⁸",
  "9": "⁹",
};

/** 10 to a whole power as a tick label: `"10⁻⁸"`. */
export function powerOfTen(exponent: number): string {
  if (exponent === 0) return "1";
  return `10${[...String(exponent)].map((sign) => SUPERSCRIPT[sign] ?? sign).join("")}`;
}

/** Whole exponents for a logarithmic axis, at most eight, evenly spaced. */
export function powerTicks(low: number, high: number): number[] {
  const step = Math.max(1, Math.ceil((high - low) / 8));
  const ticks: number[] = [];
  for (let k = Math.floor(high / step) * step; k >= low - 1e-9; k -= step) ticks.push(k === 0 ? 0 : k);
  return ticks;
}

/** An axis as Observable Plot takes it. */
export function axisOptions(axis: FigureAxis): Plot.ScaleOptions {
  const common = {
    domain: [...axis.domain],
    label: plainText(axis.label),
    labelArrow: "none" as const,
    labelAnchor: "center" as const,
  };
  if (axis.scale === "linear") return { ...common, ticks: 7 };
  return { ...common, ticks: powerTicks(...axis.domain), tickFormat: (d: number) => powerOfTen(d) };
}
