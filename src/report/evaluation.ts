/** The table of values: quantities of laws at given points, each from the exact route with its error. */
import { InvalidArgumentError } from "../core/errors.ts";
import type { Law, LawQuantity } from "../laws/law.ts";
import type { Cell, ReportDocument, TableBlock } from "./document.ts";
import { densityFigure, tailFigure } from "./law-figures.ts";
import { type ReportOptions, requireDistinctLaws } from "./percentiles.ts";
import { type EstimateOptions, lawCell, lawReferences } from "./provenance.ts";
import { libraryVersion } from "./version.ts";

/** A quantity with the points (for quantiles: probabilities) at which it is wanted. */
export interface EvaluationRequest {
  readonly quantity: LawQuantity;
  readonly at: readonly number[];
}

/** What each quantity is called in a table. */
export const QUANTITY_TITLES: Readonly<Record<LawQuantity, string>> = {
  pdf: "density",
  cdf: "P(X ≤ x)",
  survival: "P(X > x)",
  logPdf: "log density",
  logCdf: "log P(X ≤ x)",
  logSurvival: "log P(X > x)",
  quantile: "x with P(X ≤ x) = p",
  upperQuantile: "x with P(X > x) = q",
};

function isQuantile(quantity: LawQuantity): boolean {
  return quantity === "quantile" || quantity === "upperQuantile";
}

/** Curves are drawn with marks for this many points at most. */
const MOST_MARKS = 12;

/**
 * Quantities of laws at points.
 *
 * @param laws - Laws.
 * @param requests - Quantities and points; every law is asked for all of them.
 * @param options - Digits, figures, tolerances for the exact route.
 * @returns A report whose main table is `values`, one row a number.
 * @throws InvalidArgumentError for a point that is not finite, a probability outside (0, 1), or nothing asked.
 */
export function evaluationReport(
  laws: readonly Law[],
  requests: readonly EvaluationRequest[],
  options: ReportOptions & EstimateOptions = {},
): ReportDocument {
  requireDistinctLaws(laws);
  const perLaw = requests.reduce((sum, request) => sum + request.at.length, 0);
  if (perLaw === 0) throw new InvalidArgumentError("requests", "at least one quantity and point", requests);
  const bad = requests.flatMap((request) => [...request.at]).find((x) => !Number.isFinite(x));
  if (bad !== undefined) throw new InvalidArgumentError("at", "finite numbers", bad);
  const total = perLaw * laws.length;
  let done = 0;
  const rows: Cell[][] = [];
  for (const law of laws) {
    for (const { quantity, at } of requests) {
      for (const x of at) {
        rows.push([law.symbol, QUANTITY_TITLES[quantity], x, lawCell(law, quantity, x, options)]);
        options.onProgress?.(++done, total);
      }
    }
  }
  const table: TableBlock = {
    kind: "table",
    id: "values",
    caption: `Values of ${laws.map((law) => law.symbol).join(", ")}`,
    columns: [
      { key: "law", title: "law", kind: "text" },
      { key: "quantity", title: "quantity", kind: "text" },
      { key: "at", title: "at", kind: "given" },
      { key: "value", title: "value", kind: "measured" },
    ],
    rows,
    ...(options.digits === undefined ? {} : { digits: options.digits }),
  };
  const points = [...new Set(requests.filter((r) => !isQuantile(r.quantity)).flatMap((r) => [...r.at]))];
  const marks = points.length > MOST_MARKS ? [] : points.map((x) => ({ x, label: String(x) }));
  const figures =
    options.figures === false
      ? []
      : laws.flatMap((law) => [densityFigure(law, marks), tailFigure(law, marks)]);
  return {
    title: `Values of ${laws.map((law) => law.symbol).join(", ")}`,
    blocks: [table, ...figures],
    mainTable: "values",
    provenance: {
      version: libraryVersion,
      laws: lawReferences(laws),
      options: options.named ?? {},
      inputs: [],
      ...(options.date === undefined ? {} : { date: options.date }),
    },
  };
}
