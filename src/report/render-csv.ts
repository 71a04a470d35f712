/**
 * One table of a report as CSV (RFC 4180, line feeds), for spreadsheets and scripts.
 *
 * A measured column `x` becomes `x`, `x_error`, `x_converged` and `x_provenance`, so every number carries its
 * error, law, convention and version even when a row is cut out of the file. Numbers have all their digits: the
 * shortest decimal that reads back as the same double. A probability below the range of a double is written as
 * a decimal from its logarithm (it reads back as 0 in a double, and as itself in anything wider).
 */
import { stringify } from "csv-stringify/browser/esm/sync";
import { plainText } from "./cells.ts";
import {
  type Cell,
  isMeasured,
  type MeasuredCell,
  type ReportDocument,
  type TableColumn,
  tableOf,
} from "./document.ts";
import { formatErrorFromLog, formatFromLog, fullDigits } from "./numbers.ts";

/** A text that a spreadsheet would run as a formula gets an apostrophe in front. */
function safeText(text: string): string {
  const plain = plainText(text);
  return /^[=+\-@]/.test(plain) && !Number.isFinite(Number(plain)) ? `'${plain}` : plain;
}

/** A measured value with every digit; never 0 for a probability whose logarithm is known. */
export function machineValue(cell: MeasuredCell): string {
  if (cell.value === 0 && cell.logValue !== undefined && Number.isFinite(cell.logValue)) {
    return formatFromLog(cell.logValue, cell.logError, 17);
  }
  return fullDigits(cell.value);
}

function machineError(cell: MeasuredCell): string {
  if (cell.value === 0 && cell.logValue !== undefined && Number.isFinite(cell.logValue)) {
    return formatErrorFromLog(cell.logValue, cell.logError);
  }
  return cell.error === undefined ? "" : fullDigits(cell.error);
}

function provenanceText(document: ReportDocument, symbol: string | undefined): string {
  const version = `edgelaw ${document.provenance.version}`;
  const law = document.provenance.laws.find((candidate) => candidate.symbol === symbol);
  if (law === undefined) return version;
  return safeText(`${law.name}; ${law.convention}; ${law.formula}; ${law.source}; ${version}`);
}

function isWide(column: TableColumn): boolean {
  return column.kind === "measured" || column.kind === "probability";
}

function header(column: TableColumn): string[] {
  const { key } = column;
  return isWide(column) ? [key, `${key}_error`, `${key}_converged`, `${key}_provenance`] : [key];
}

function fields(document: ReportDocument, column: TableColumn, cell: Cell): string[] {
  if (cell === null) return isWide(column) ? ["", "", "", ""] : [""];
  if (isMeasured(cell)) {
    const error = machineError(cell);
    const converged = cell.converged === undefined ? "" : String(cell.converged);
    return [machineValue(cell), error, converged, provenanceText(document, cell.law ?? column.law)];
  }
  const text = typeof cell === "number" ? fullDigits(cell) : safeText(cell);
  return isWide(column) ? [text, "", "", provenanceText(document, column.law)] : [text];
}

/**
 * A table of the report as CSV.
 *
 * @param document - The report.
 * @param options - `table`: id of the table; default the main table.
 * @returns CSV with a header line.
 * @throws InvalidArgumentError if there is no table of that id.
 */
export function renderCsv(document: ReportDocument, options: { readonly table?: string } = {}): string {
  const table = tableOf(document, options.table ?? document.mainTable);
  const lines = [
    table.columns.flatMap(header),
    ...table.rows.map((row) =>
      row.flatMap((cell, i) => fields(document, table.columns[i] as TableColumn, cell)),
    ),
  ];
  return stringify(lines);
}
