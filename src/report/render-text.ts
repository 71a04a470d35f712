/** A report as plain text for a terminal: ruled tables, paragraphs wrapped at 92 columns. */

import CliTable from "cli-table3";
import { largest } from "../core/extremes.ts";
import { displayTable, plainText, provenanceLines, sourceLine, tableNotes } from "./cells.ts";
import type { FigureBlock, ReportBlock, ReportDocument, TableBlock } from "./document.ts";

const WIDTH = 92;
const ROWS_AT_A_TIME = 200;

// Only a rule beneath the titles: numbers line up without a cage, and the table survives a copy and paste.
const RULES = {
  top: "",
  "top-mid": "",
  "top-left": "",
  "top-right": "",
  bottom: "",
  "bottom-mid": "",
  "bottom-left": "",
  "bottom-right": "",
  left: "",
  "left-mid": "",
  mid: "",
  "mid-mid": "",
  right: "",
  "right-mid": "",
  middle: "  ",
};

/** Breaks a text at spaces; a longer word keeps its line to itself. */
export function wrapText(text: string, width: number = WIDTH, indent = ""): string {
  const lines: string[] = [];
  let line = "";
  for (const word of plainText(text).split(" ")) {
    const longer = line === "" ? word : `${line} ${word}`;
    if (line !== "" && longer.length > width - indent.length) {
      lines.push(line);
      line = word;
    } else line = longer;
  }
  lines.push(line);
  return lines.join(`\n${indent}`);
}

function tableText(table: TableBlock, document: ReportDocument): string {
  const shown = displayTable(table);
  const widths = shown.columns.map((column, i) =>
    Math.max(column.title.length, largest(shown.rows.map((row) => row[i].length))),
  );
  const lines = [
    shown.columns.map((column) => column.title),
    widths.map((width) => "─".repeat(width)),
    ...shown.rows,
  ];
  // The table maker takes a time that grows with the square of the rows: long tables go through it in parts of equal
  // column widths.
  const parts: string[] = [];
  for (let at = 0; at < lines.length; at += ROWS_AT_A_TIME) {
    const grid = new CliTable({
      chars: RULES,
      style: { head: [], border: [], "padding-left": 0, "padding-right": 0, compact: true },
      colAligns: shown.columns.map((column) => column.align),
      colWidths: widths,
    });
    for (const line of lines.slice(at, at + ROWS_AT_A_TIME)) grid.push([...line]);
    parts.push(grid.toString());
  }
  const body = parts
    .join("\n")
    .split("\n")
    .map((line) => line.trimEnd())
    .join("\n");
  const notes = tableNotes(table, document).map((note) => wrapText(note));
  return [wrapText(table.caption), "", body, ...(notes.length > 0 ? ["", ...notes] : [])].join("\n");
}

function figureText(figure: FigureBlock, document: ReportDocument): string {
  const source = sourceLine(figure.law === undefined ? [] : [figure.law], document.provenance);
  return wrapText(`Figure: ${figure.title}. ${figure.description} (Drawn in the HTML report.) ${source}`);
}

function blockText(block: ReportBlock, document: ReportDocument): string {
  switch (block.kind) {
    case "heading":
      return `${plainText(block.text)}\n${"-".repeat(block.text.length)}`;
    case "paragraph":
      return wrapText(block.text);
    case "note":
      return `Note: ${wrapText(block.text, WIDTH, "      ")}`;
    case "table":
      return tableText(block, document);
    case "figure":
      return figureText(block, document);
  }
}

/**
 * The report as plain text.
 *
 * @param document - The report.
 * @returns Text that ends with a line break. Control characters of the data are replaced, so nothing in it can
 *   drive a terminal.
 */
export function renderText(document: ReportDocument): string {
  const title = plainText(document.title);
  const parts = [`${title}\n${"=".repeat(title.length)}`];
  for (const block of document.blocks) parts.push(blockText(block, document));
  const lines = provenanceLines(document.provenance);
  const width = Math.max(...lines.map(([label]) => label.length)) + 2;
  const indent = " ".repeat(width);
  const provenance = lines.map(([label, text]) => label.padEnd(width) + wrapText(text, WIDTH, indent));
  parts.push(["Provenance\n----------", ...provenance].join("\n"));
  return `${parts.join("\n\n")}\n`;
}
