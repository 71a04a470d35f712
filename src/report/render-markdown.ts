/** A report as Markdown (tables as in GitHub's dialect), every text escaped. */
import { markdownTable } from "markdown-table";
import { displayTable, plainText, provenanceLines, sourceLine, tableNotes } from "./cells.ts";
import type { ReportBlock, ReportDocument, TableBlock } from "./document.ts";

/** Plain text as Markdown that shows exactly this text: no emphasis, no link, no HTML, no table cell. */
export function escapeMarkdown(text: string): string {
  return plainText(text)
    .replaceAll("&", "&amp;")
    .replace(/[\\`*_[\]<>|~#]/g, (mark) => (mark === "<" ? "&lt;" : mark === ">" ? "&gt;" : `\\${mark}`))
    .replace(/^(\s*)([-+])(?=\s)/, "$1\\$2")
    .replace(/^(\s*\d+)([.)])(?=\s)/, "$1\\$2");
}

function tableMarkdown(table: TableBlock, document: ReportDocument): string {
  const shown = displayTable(table);
  const grid = markdownTable(
    [
      shown.columns.map((column) => escapeMarkdown(column.title)),
      ...shown.rows.map((row) => row.map((cell) => escapeMarkdown(cell))),
    ],
    { align: shown.columns.map((column) => (column.align === "left" ? "l" : "r")) },
  );
  const notes = tableNotes(table, document).map((note) => escapeMarkdown(note));
  return [`**${escapeMarkdown(table.caption)}**`, grid, ...notes].join("\n\n");
}

function blockMarkdown(block: ReportBlock, document: ReportDocument): string {
  switch (block.kind) {
    case "heading":
      return `## ${escapeMarkdown(block.text)}`;
    case "paragraph":
      return block.answer === true ? `**${escapeMarkdown(block.text)}**` : escapeMarkdown(block.text);
    case "note":
      return `> ${escapeMarkdown(block.text)}`;
    case "table":
      return tableMarkdown(block, document);
    case "figure": {
      const source = sourceLine(block.law === undefined ? [] : [block.law], document.provenance);
      const text = `${block.title}. ${block.description} (Drawn in the HTML report.) ${source}`;
      return `*Figure:* ${escapeMarkdown(text)}`;
    }
  }
}

/**
 * The report as Markdown.
 *
 * @param document - The report.
 * @returns Markdown that ends with a line break.
 */
export function renderMarkdown(document: ReportDocument): string {
  const parts = [`# ${escapeMarkdown(document.title)}`];
  for (const block of document.blocks) parts.push(blockMarkdown(block, document));
  const lines = provenanceLines(document.provenance);
  parts.push(
    "## Provenance",
    lines.map(([label, text]) => `- ${escapeMarkdown(label)}: ${escapeMarkdown(text)}`).join("\n"),
  );
  return `${parts.join("\n\n")}\n`;
}
