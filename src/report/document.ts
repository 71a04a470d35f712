/**
 * The document model: what a report says, free of how it is printed.
 *
 * A report is a list of blocks (headings, paragraphs, notes, tables, figures) with one provenance. The
 * renderers turn it into text, Markdown, CSV, JSON or HTML. All text in it is plain text: renderers escape it,
 * so names that come out of a data file can't smuggle markup in.
 */
import { InvalidArgumentError } from "../core/errors.ts";
import type { Measured } from "./numbers.ts";

/** How a column is printed and what its cells hold. */
export type ColumnKind =
  /** Words. */
  | "text"
  /** Whole numbers, exact. */
  | "integer"
  /** Numbers that the user or the data gave: printed as they are. */
  | "given"
  /** Numbers from plain arithmetic on the data: rounded for people, with rounding errors only. */
  | "plain"
  /** Computed numbers with an error; printed as two columns, value and error. */
  | "measured"
  /** Computed probabilities with an error; never printed as 0. */
  | "probability";

/** One column of a table. */
export interface TableColumn {
  /** Key in CSV and JSON: letters, digits, `_`. Unique in its table. */
  readonly key: string;
  /** Title for people. */
  readonly title: string;
  /** What the cells hold. */
  readonly kind: ColumnKind;
  /** Symbol of the law that the column belongs to, as listed in the provenance. */
  readonly law?: string;
  /** What the error column is called; default "error". */
  readonly errorTitle?: string;
}

/** A measured cell may name the law it belongs to when that changes from row to row. */
export interface MeasuredCell extends Measured {
  /** Symbol of the law, as listed in the provenance. */
  readonly law?: string | undefined;
  /** Whether it is a probability, where that changes from row to row. */
  readonly probability?: boolean | undefined;
}

/** A cell: text, a number, a measured number, or nothing. */
export type Cell = string | number | MeasuredCell | null;

/** A heading inside the report. */
export interface HeadingBlock {
  readonly kind: "heading";
  readonly text: string;
}

/** A paragraph; `answer` marks the sentence that the reader came for. */
export interface ParagraphBlock {
  readonly kind: "paragraph";
  readonly text: string;
  readonly answer?: boolean;
}

/** An assumption, a caution, a convention. */
export interface NoteBlock {
  readonly kind: "note";
  readonly text: string;
}

/** A table. Every row has one cell a column. */
export interface TableBlock {
  readonly kind: "table";
  /** Name in JSON, and for choosing a table in CSV: letters, digits, `-`. */
  readonly id: string;
  readonly caption: string;
  readonly columns: readonly TableColumn[];
  readonly rows: readonly (readonly Cell[])[];
  /** Most significant digits shown to people; default 10. */
  readonly digits?: number;
}

/** An axis of a figure. */
export interface FigureAxis {
  readonly label: string;
  readonly domain: readonly [number, number];
  /** `"power-of-ten"`: the values are base-10 logarithms, and the ticks are printed as powers of ten. */
  readonly scale: "linear" | "power-of-ten";
}

/** One layer of a figure. All numbers finite. */
export type FigureLayer =
  | { readonly kind: "curve"; readonly name: string; readonly points: readonly (readonly [number, number])[] }
  | {
      readonly kind: "reference";
      readonly name: string;
      readonly points: readonly (readonly [number, number])[];
    }
  /** x, low, high. */
  | {
      readonly kind: "band";
      readonly name: string;
      readonly points: readonly (readonly [number, number, number])[];
    }
  /** left, right, height. */
  | {
      readonly kind: "bars";
      readonly name: string;
      readonly bars: readonly (readonly [number, number, number])[];
    }
  | {
      readonly kind: "points";
      readonly name: string;
      readonly points: readonly (readonly [number, number])[];
      readonly labels?: readonly string[];
    }
  /** Vertical sticks at x from the bottom of the frame. */
  | {
      readonly kind: "sticks";
      readonly name: string;
      readonly at: readonly number[];
      readonly labels?: readonly string[];
    };

/** A plot. */
export interface FigureBlock {
  readonly kind: "figure";
  readonly id: string;
  readonly title: string;
  /** What the figure shows, in full sentences: the text alternative. */
  readonly description: string;
  readonly x: FigureAxis;
  readonly y: FigureAxis;
  readonly layers: readonly FigureLayer[];
  /** Symbol of the law drawn, as listed in the provenance. */
  readonly law?: string;
  /** Text at the right edge, for observations that lie outside the frame. */
  readonly beyond?: string;
}

/** Any part of a report. */
export type ReportBlock = HeadingBlock | ParagraphBlock | NoteBlock | TableBlock | FigureBlock;

/** A law as a report names it. */
export interface LawReference {
  readonly symbol: string;
  readonly name: string;
  readonly formula: string;
  readonly source: string;
  /** The scaling in which the variable is measured. */
  readonly convention: string;
}

/** A data file as a report names it. */
export interface InputReference {
  readonly name: string;
  /** For instance `"sha256:9f86…"`. */
  readonly digest: string;
  readonly rows?: number;
  readonly columns?: number;
}

/** Where every number of a report comes from. */
export interface ReportProvenance {
  /** Version of the library that computed the numbers. */
  readonly version: string;
  readonly laws: readonly LawReference[];
  /** Methods beside the laws: centring and scaling, distances. Each with its source. */
  readonly methods?: readonly string[];
  readonly options: Readonly<Record<string, string | number | boolean>>;
  readonly inputs: readonly InputReference[];
  /** Date and time, only when the caller passes one. */
  readonly date?: string;
}

/** A whole report. */
export interface ReportDocument {
  readonly title: string;
  readonly blocks: readonly ReportBlock[];
  /** Id of the table that answers the question; the one that CSV holds. */
  readonly mainTable: string;
  readonly provenance: ReportProvenance;
}

/** Whether a cell is a measured number. */
export function isMeasured(cell: Cell): cell is MeasuredCell {
  return typeof cell === "object" && cell !== null;
}

/** The tables of a report in order. */
export function tablesOf(document: ReportDocument): TableBlock[] {
  return document.blocks.filter((block): block is TableBlock => block.kind === "table");
}

/**
 * A table of a report by its id; checks that every row fits the columns.
 *
 * @throws InvalidArgumentError if there is no such table, or a row is too long or too short.
 */
export function tableOf(document: ReportDocument, id: string): TableBlock {
  const tables = tablesOf(document);
  const table = tables.find((candidate) => candidate.id === id);
  if (table === undefined) {
    throw new InvalidArgumentError(
      "table",
      `one of ${tables.map((t) => t.id).join(", ") || "(no table)"}`,
      id,
    );
  }
  checkTable(table);
  return table;
}

/** Throws unless every row of the table has one cell a column. */
export function checkTable(table: TableBlock): void {
  for (const row of table.rows) {
    if (row.length !== table.columns.length) {
      throw new InvalidArgumentError(`table ${table.id}`, `${table.columns.length} cells a row`, row.length);
    }
  }
}

/** Whether every measured number of the report met its tolerance. */
export function allConverged(document: ReportDocument): boolean {
  return tablesOf(document).every((table) =>
    table.rows.every((row) => row.every((cell) => !isMeasured(cell) || cell.converged !== false)),
  );
}
