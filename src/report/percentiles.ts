/** The table of percentiles: laws × levels, each number from the exact route with its error. */
import { InvalidArgumentError } from "../core/errors.ts";
import type { Law } from "../laws/law.ts";
import type { Cell, FigureBlock, ReportDocument, TableBlock, TableColumn } from "./document.ts";
import { densityFigure } from "./law-figures.ts";
import { type EstimateOptions, lawCell, lawKey, lawReferences } from "./provenance.ts";
import { libraryVersion } from "./version.ts";

/** Told after every piece of work. */
export type ProgressListener = (done: number, total: number) => void;

/** What every report builder takes beside its subject. */
export interface ReportOptions {
  /** Most significant digits shown to people; default 10 (6 for tests on data). */
  readonly digits?: number;
  /** Whether to draw figures; default true. They cost a few hundred evaluations of each law. */
  readonly figures?: boolean;
  /** Options to be named in the provenance. */
  readonly named?: Readonly<Record<string, string | number | boolean>>;
  /** Date and time to be printed. The library never looks at a clock itself. */
  readonly date?: string;
  /** Told after every number, for progress bars. */
  readonly onProgress?: ProgressListener;
}

/** Throws when two laws share a symbol: their columns could not be told apart. */
export function requireDistinctLaws(laws: readonly Law[]): void {
  if (laws.length === 0) throw new InvalidArgumentError("laws", "at least one law", laws);
  const symbols = laws.map((law) => law.symbol);
  const twice = symbols.find((symbol, i) => symbols.indexOf(symbol) !== i);
  if (twice !== undefined) throw new InvalidArgumentError("laws", "each law once", twice);
}

/**
 * Percentiles of laws.
 *
 * @param laws - Laws, one column each.
 * @param levels - `lower`: probabilities p with P(X ≤ x) = p; `upper`: probabilities q with P(X > x) = q, down
 *   to 1e-300. All strictly inside (0, 1); at least one.
 * @param options - Digits, figures, tolerances for the exact route.
 * @returns A report whose main table is `percentiles`.
 * @throws InvalidArgumentError for a level outside (0, 1), no law, no level, or a law given twice.
 */
export function percentilesReport(
  laws: readonly Law[],
  levels: { readonly lower?: readonly number[]; readonly upper?: readonly number[] },
  options: ReportOptions & EstimateOptions = {},
): ReportDocument {
  requireDistinctLaws(laws);
  const lower = levels.lower ?? [];
  const upper = levels.upper ?? [];
  if (lower.length + upper.length === 0)
    throw new InvalidArgumentError("levels", "at least one level", lower);
  const total = (lower.length + upper.length) * laws.length;
  let done = 0;
  const quantileCell = (law: Law, what: "quantile" | "upperQuantile", level: number): Cell => {
    const cell = lawCell(law, what, level, options);
    options.onProgress?.(++done, total);
    return cell;
  };
  const lowerColumn: TableColumn = { key: "lower_probability", title: "P(X ≤ x)", kind: "given" };
  const upperColumn: TableColumn = { key: "upper_probability", title: "P(X > x)", kind: "given" };
  const levelColumns = [
    ...(lower.length > 0 ? [lowerColumn] : []),
    ...(upper.length > 0 ? [upperColumn] : []),
  ];
  const blank: Cell[] = levelColumns.length > 1 ? [null] : [];
  const rows = [
    ...lower.map((p) => [p, ...blank, ...laws.map((law) => quantileCell(law, "quantile", p))]),
    ...upper.map((q) => [...blank, q, ...laws.map((law) => quantileCell(law, "upperQuantile", q))]),
  ];
  const table: TableBlock = {
    kind: "table",
    id: "percentiles",
    caption: `Percentiles x of ${laws.map((law) => law.symbol).join(", ")}`,
    columns: [
      ...levelColumns,
      ...laws.map((law): TableColumn => {
        return { key: lawKey(law.symbol), title: law.symbol, kind: "measured", law: law.symbol };
      }),
    ],
    rows,
    ...(options.digits === undefined ? {} : { digits: options.digits }),
  };
  const figures: FigureBlock[] = options.figures === false ? [] : laws.map((law) => densityFigure(law, []));
  return {
    title: `Percentiles of ${laws.map((law) => law.symbol).join(", ")}`,
    blocks: [table, ...figures],
    mainTable: "percentiles",
    provenance: {
      version: libraryVersion,
      laws: lawReferences(laws),
      options: options.named ?? {},
      inputs: [],
      ...(options.date === undefined ? {} : { date: options.date }),
    },
  };
}
