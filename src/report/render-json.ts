/**
 * A report as JSON for machines. The schema is described in docs/reports.md and by {@link ReportJson}.
 *
 * Numbers are JSON numbers with every digit of the double (at most 17 significant). What JSON has no number for
 * is a string: "Infinity", "-Infinity", "NaN". A probability that underflows a double has `value` and `error`
 * null, its logarithm with `logError`, and its `decimal` as text: it is never 0.
 */
import {
  type Cell,
  checkTable,
  type FigureLayer,
  isMeasured,
  type ReportDocument,
  type ReportProvenance,
  type TableBlock,
  tablesOf,
} from "./document.ts";
import { formatFromLog } from "./numbers.ts";

/** Name and version of the schema; the number grows when a reader would break. */
export const REPORT_SCHEMA = "edgelaw-report/1";

/** A number, or the word for one that JSON can't hold. */
export type JsonNumber = number | "Infinity" | "-Infinity" | "NaN";

/** A measured number. */
export interface MeasuredJson {
  readonly value: JsonNumber | null;
  readonly error: JsonNumber | null;
  readonly errorKind?: "bound" | "estimate";
  readonly converged?: boolean;
  readonly logValue?: JsonNumber;
  readonly logError?: JsonNumber;
  /** Only where `value` is null: the number as decimal text. */
  readonly decimal?: string;
  /** Symbol of its law in `provenance.laws`. */
  readonly law?: string;
}

/** A table: rows are objects with one member a column key. */
export interface TableJson {
  readonly caption: string;
  readonly columns: readonly {
    readonly key: string;
    readonly title: string;
    readonly kind: string;
    readonly law?: string;
  }[];
  readonly rows: readonly Readonly<Record<string, MeasuredJson | JsonNumber | string | null>>[];
}

/** A figure: what is drawn, in numbers. */
export interface FigureJson {
  readonly title: string;
  readonly description: string;
  readonly law?: string;
  readonly x: { readonly label: string; readonly scale: string };
  readonly y: { readonly label: string; readonly scale: string };
  readonly layers: readonly FigureLayer[];
}

/** The whole file. */
export interface ReportJson {
  readonly schema: typeof REPORT_SCHEMA;
  readonly title: string;
  readonly mainTable: string;
  readonly answers: readonly string[];
  readonly notes: readonly string[];
  readonly tables: Readonly<Record<string, TableJson>>;
  readonly figures: Readonly<Record<string, FigureJson>>;
  readonly provenance: ReportProvenance;
}

function jsonNumber(value: number): JsonNumber {
  if (Number.isFinite(value)) return value;
  if (Number.isNaN(value)) return "NaN";
  return value > 0 ? "Infinity" : "-Infinity";
}

function cellJson(cell: Cell, columnLaw: string | undefined): MeasuredJson | JsonNumber | string | null {
  if (cell === null || typeof cell === "string") return cell;
  if (typeof cell === "number") return jsonNumber(cell);
  if (!isMeasured(cell)) return null;
  const { value, error, errorKind, converged, logValue, logError } = cell;
  const underflows = value === 0 && logValue !== undefined && Number.isFinite(logValue);
  const law = cell.law ?? columnLaw;
  return {
    value: underflows ? null : jsonNumber(value),
    error: error === undefined || underflows ? null : jsonNumber(error),
    ...(errorKind === undefined ? {} : { errorKind }),
    ...(converged === undefined ? {} : { converged }),
    ...(logValue === undefined ? {} : { logValue: jsonNumber(logValue) }),
    ...(logError === undefined ? {} : { logError: jsonNumber(logError) }),
    ...(underflows ? { decimal: formatFromLog(logValue, logError, 17) } : {}),
    ...(law === undefined ? {} : { law }),
  };
}

function tableJson(table: TableBlock): TableJson {
  checkTable(table);
  return {
    caption: table.caption,
    columns: table.columns.map(({ key, title, kind, law }) => ({
      key,
      title,
      kind,
      ...(law === undefined ? {} : { law }),
    })),
    rows: table.rows.map((row) =>
      Object.fromEntries(
        table.columns.map((column, i) => [column.key, cellJson(row[i] as Cell, column.law)] as const),
      ),
    ),
  };
}

/** The report as the plain object that {@link renderJson} prints. */
export function reportToJson(document: ReportDocument): ReportJson {
  const figures: [string, FigureJson][] = [];
  const answers: string[] = [];
  const notes: string[] = [];
  for (const block of document.blocks) {
    if (block.kind === "figure") {
      const { title, description, law, x, y, layers } = block;
      figures.push([
        block.id,
        {
          title,
          description,
          ...(law === undefined ? {} : { law }),
          x: { label: x.label, scale: x.scale },
          y: { label: y.label, scale: y.scale },
          layers,
        },
      ]);
    } else if (block.kind === "paragraph" && block.answer === true) answers.push(block.text);
    else if (block.kind === "note") notes.push(block.text);
  }
  return {
    schema: REPORT_SCHEMA,
    title: document.title,
    mainTable: document.mainTable,
    answers,
    notes,
    tables: Object.fromEntries(tablesOf(document).map((table) => [table.id, tableJson(table)])),
    figures: Object.fromEntries(figures),
    provenance: document.provenance,
  };
}

/**
 * The report as JSON text, indented by two spaces.
 *
 * @param document - The report.
 * @returns JSON that ends with a line break.
 */
export function renderJson(document: ReportDocument): string {
  return `${JSON.stringify(reportToJson(document), null, 2)}\n`;
}
