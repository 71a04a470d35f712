/** Provenance of laws and the measured cells that come out of their exact route. */
import type { Law, LawQuantity } from "../laws/law.ts";
import type { LawReference, MeasuredCell } from "./document.ts";

/** Tolerances for the exact route, as {@link Law.estimate} takes them. */
export interface EstimateOptions {
  readonly absTol?: number;
  readonly relTol?: number;
}

/** How a report names a law. */
export function lawReference(law: Law): LawReference {
  const { formula, source, convention } = law.provenance;
  return { symbol: law.symbol, name: law.name, formula, source, convention };
}

/** References of laws, each symbol and convention once. */
export function lawReferences(laws: readonly Law[]): LawReference[] {
  const seen = new Map<string, LawReference>();
  for (const law of laws) if (!seen.has(law.symbol)) seen.set(law.symbol, lawReference(law));
  return [...seen.values()];
}

/** A symbol as a key in CSV and a name in HTML. */
export function lawKey(symbol: string): string {
  return symbol.replace(/[^A-Za-z0-9]+/g, "_").replace(/_$/, "");
}

const LOGARITHM_OF: Partial<Record<LawQuantity, LawQuantity>> = {
  cdf: "logCdf",
  survival: "logSurvival",
  pdf: "logPdf",
};

/** Below this a double starts to lose digits, so the logarithm is asked for too. */
const SMALL = 1e-300;

/**
 * One quantity of a law through its exact route, as a cell with error, law and, for a probability too small for
 * a double, its logarithm.
 */
export function lawCell(law: Law, what: LawQuantity, x: number, options: EstimateOptions = {}): MeasuredCell {
  const { value, error, errorKind, converged } = law.estimate(what, x, options);
  const probability = what === "cdf" || what === "survival" || what === "pdf";
  const cell: MeasuredCell = { value, error, errorKind, converged, law: law.symbol, probability };
  const logarithm = LOGARITHM_OF[what];
  if (logarithm === undefined || !(value < SMALL)) return cell;
  const log = law.estimate(logarithm, x, options);
  if (!Number.isFinite(log.value)) return cell;
  return { ...cell, logValue: log.value, logError: log.error };
}
