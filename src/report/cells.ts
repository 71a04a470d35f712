/**
 * Tables for people: cells as display text, shared by the text, Markdown and HTML renderers.
 *
 * A measured column becomes two, value and error, so that the error stays a number of its own. A value that
 * missed its tolerance carries a dagger, and {@link tableNotes} explains it.
 */
import {
  type Cell,
  checkTable,
  isMeasured,
  type ReportDocument,
  type ReportProvenance,
  type TableBlock,
  type TableColumn,
} from "./document.ts";
import {
  DEFAULT_DIGITS,
  formatError,
  formatErrorFromLog,
  formatProbability,
  formatValue,
  fullDigits,
  printsFromLog,
} from "./numbers.ts";

/** One column as printed. */
export interface DisplayColumn {
  readonly title: string;
  readonly align: "left" | "right";
  /** True for the error beside a value. */
  readonly isError: boolean;
}

/** A table as printed. */
export interface DisplayTable {
  readonly columns: readonly DisplayColumn[];
  readonly rows: readonly (readonly string[])[];
}

const MISSED = "†";

function hasError(kind: TableColumn["kind"]): boolean {
  return kind === "measured" || kind === "probability";
}

/** Text without control characters: no terminal escape, no line break can come out of a data file. */
export function plainText(text: string): string {
  // biome-ignore lint/suspicious/noControlCharactersInRegex: they are what is being removed
  return text.replace(/[\u0000-\u001f\u007f-\u009f\u2028\u2029\u202a-\u202e\u2066-\u2069]/g, "\ufffd");
}

function displayCell(column: TableColumn, cell: Cell, digits: number): string[] {
  if (cell === null) return hasError(column.kind) ? ["–", ""] : ["–"];
  if (isMeasured(cell)) {
    const probability = cell.probability ?? column.kind === "probability";
    const text = probability ? formatProbability(cell, digits) : formatValue(cell.value, cell.error, digits);
    const error =
      probability && cell.logValue !== undefined && printsFromLog(cell)
        ? formatErrorFromLog(cell.logValue, cell.logError)
        : formatError(cell.error);
    return [cell.converged === false ? `${text} ${MISSED}` : text, error];
  }
  if (column.kind === "plain" && typeof cell === "number") return [formatValue(cell, 0, digits)];
  const text = typeof cell === "number" ? fullDigits(cell) : plainText(cell);
  return hasError(column.kind) ? [text, ""] : [text];
}

/**
 * The table as it is printed.
 *
 * @param table - The table.
 * @returns Display columns and rows of text, all rows of one length.
 * @throws InvalidArgumentError if a row does not fit the columns.
 */
export function displayTable(table: TableBlock): DisplayTable {
  checkTable(table);
  const digits = table.digits ?? DEFAULT_DIGITS;
  const columns: DisplayColumn[] = [];
  for (const column of table.columns) {
    const align = column.kind === "text" ? "left" : "right";
    columns.push({ title: plainText(column.title), align, isError: false });
    if (hasError(column.kind)) {
      columns.push({ title: plainText(column.errorTitle ?? "error"), align: "right", isError: true });
    }
  }
  const rows = table.rows.map((row) =>
    row.flatMap((cell, i) => displayCell(table.columns[i] as TableColumn, cell, digits)),
  );
  return { columns, rows };
}

/** Symbols of the laws that a table draws on, in order of appearance. */
export function lawsInTable(table: TableBlock): string[] {
  const symbols = new Set<string>();
  for (const column of table.columns) if (column.law !== undefined) symbols.add(column.law);
  for (const row of table.rows) {
    for (const cell of row) if (isMeasured(cell) && cell.law !== undefined) symbols.add(cell.law);
  }
  return [...symbols];
}

/** One line that says which law, convention and version a table or figure rests on. */
export function sourceLine(symbols: readonly string[], provenance: ReportProvenance): string {
  const parts = provenance.laws
    .filter((law) => symbols.includes(law.symbol))
    .map((law) => `${law.symbol} (${law.name}): ${law.convention}`);
  const sentences = [...parts, `edgelaw ${provenance.version}`].map((part) =>
    /[.…]$/.test(part) ? part : `${part}.`,
  );
  return plainText(sentences.join(" "));
}

/**
 * What has to be said beneath a table: how numbers are rounded, which convention, what the dagger means.
 */
export function tableNotes(table: TableBlock, document: ReportDocument): string[] {
  const notes: string[] = [];
  if (table.columns.some((column) => hasError(column.kind))) {
    notes.push(
      `Values are rounded to at most ${table.digits ?? DEFAULT_DIGITS} significant digits and never to more than their error ` +
        "supports; the error is absolute and that of the value before rounding.",
    );
  }
  if (table.columns.some((column) => column.kind === "plain")) {
    notes.push(
      "Columns without an error come from plain double-precision sums and carry rounding errors only.",
    );
  }
  if (table.rows.some((row) => row.some((cell) => isMeasured(cell) && cell.converged === false))) {
    notes.push(`${MISSED} tolerance missed: the best value reached, with its error.`);
  }
  const symbols = lawsInTable(table);
  if (symbols.length > 0) notes.push(sourceLine(symbols, document.provenance));
  return notes;
}

/** The provenance as label and text pairs, in the order in which they are printed. */
export function provenanceLines(provenance: ReportProvenance): [string, string][] {
  const lines: [string, string][] = [["Computed by", `edgelaw ${provenance.version}`]];
  for (const law of provenance.laws) {
    lines.push([`Law ${law.symbol}`, law.name]);
    lines.push(["Formula", law.formula], ["Convention", law.convention], ["Source", law.source]);
  }
  for (const method of provenance.methods ?? []) lines.push(["Method", method]);
  for (const input of provenance.inputs) {
    const size = input.rows === undefined ? "" : `, ${input.rows} × ${input.columns ?? 1} numbers`;
    lines.push(["Input", `${input.name}${size}, ${input.digest}`]);
  }
  const options = Object.entries(provenance.options).map(([key, value]) => `${key} = ${String(value)}`);
  if (options.length > 0) lines.push(["Options", options.join("; ")]);
  if (provenance.date !== undefined) lines.push(["Date", provenance.date]);
  return lines.map(([label, text]) => [plainText(label), plainText(text)]);
}
