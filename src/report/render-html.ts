/**
 * A report as one self-contained HTML page: style and figures inside, no script, no outside request (a content
 * security policy forbids it), light, dark and print, with captions and text alternatives.
 */
import { displayTable, plainText, provenanceLines, sourceLine, tableNotes } from "./cells.ts";
import type { FigureBlock, ReportBlock, ReportDocument, TableBlock } from "./document.ts";
import { HTML_STYLE } from "./html-style.ts";
import {
  type ElementFactory,
  elementFactory,
  type MarkupDocument,
  type MarkupElement,
  newDocument,
} from "./markup.ts";
import { figureElement } from "./svg.ts";

function tableElement(table: TableBlock, report: ReportDocument, make: ElementFactory): MarkupElement {
  const shown = displayTable(table);
  const classOf = (i: number): Record<string, string> => {
    const column = shown.columns[i] as (typeof shown.columns)[number];
    if (column.isError) return { class: "error" };
    return column.align === "left" ? { class: "left" } : {};
  };
  const head = shown.columns.map((column, i) =>
    make.html("th", { scope: "col", ...classOf(i) }, column.title),
  );
  const rows = shown.rows.map((row) =>
    make.html(
      "tr",
      {},
      ...row.map((cell, i) =>
        i === 0 ? make.html("th", { scope: "row", ...classOf(i) }, cell) : make.html("td", classOf(i), cell),
      ),
    ),
  );
  const grid = make.html(
    "table",
    { id: `table-${table.id}` },
    make.html("caption", {}, plainText(table.caption)),
    make.html("thead", {}, make.html("tr", {}, ...head)),
    make.html("tbody", {}, ...rows),
  );
  const notes = tableNotes(table, report).map((note) => make.html("p", { class: "small" }, note));
  // A wide table scrolls inside its box; the box takes the keyboard focus so that it can be scrolled by keys.
  const box = make.html(
    "div",
    { class: "table", role: "region", tabindex: "0", "aria-label": plainText(table.caption) },
    grid,
  );
  return make.html("div", {}, box, ...notes);
}

function figureFrame(
  figure: FigureBlock,
  report: ReportDocument,
  document: MarkupDocument,
  make: ElementFactory,
): MarkupElement {
  const source = sourceLine(figure.law === undefined ? [] : [figure.law], report.provenance);
  return make.html(
    "figure",
    { id: `figure-${figure.id}` },
    figureElement(figure, document),
    make.html(
      "figcaption",
      {},
      make.html("b", {}, plainText(figure.title)),
      plainText(figure.description),
      make.html("p", { class: "small" }, source),
    ),
  );
}

function blockElement(
  block: ReportBlock,
  report: ReportDocument,
  document: MarkupDocument,
  make: ElementFactory,
): MarkupElement {
  switch (block.kind) {
    case "heading":
      return make.html("h2", {}, plainText(block.text));
    case "paragraph":
      return make.html("p", block.answer === true ? { class: "answer" } : {}, plainText(block.text));
    case "note":
      return make.html("p", { class: "note" }, plainText(block.text));
    case "table":
      return tableElement(block, report, make);
    case "figure":
      return figureFrame(block, report, document, make);
  }
}

/**
 * The report as one HTML page.
 *
 * @param report - The report.
 * @returns HTML text. Every text of the report is escaped; nothing is loaded from elsewhere.
 */
export function renderHtml(report: ReportDocument): string {
  const document = newDocument();
  const make = elementFactory(document);
  document.documentElement.setAttribute("lang", "en");
  document.head.append(
    make.html("meta", { charset: "utf-8" }),
    make.html("meta", {
      "http-equiv": "Content-Security-Policy",
      content: "default-src 'none'; style-src 'unsafe-inline'",
    }),
    make.html("meta", { name: "viewport", content: "width=device-width, initial-scale=1" }),
    make.html("meta", { name: "generator", content: `edgelaw ${report.provenance.version}` }),
    make.html("title", {}, plainText(report.title)),
    make.html("style", {}, HTML_STYLE),
  );
  const provenance = provenanceLines(report.provenance).flatMap(([label, text]) => [
    make.html("dt", {}, label),
    make.html("dd", {}, text),
  ]);
  document.body.append(
    make.html(
      "main",
      {},
      make.html("h1", {}, plainText(report.title)),
      ...report.blocks.map((block) => blockElement(block, report, document, make)),
      make.html(
        "section",
        { "aria-labelledby": "provenance" },
        make.html("h2", { id: "provenance" }, "Provenance"),
        make.html("dl", {}, ...provenance),
      ),
    ),
  );
  return `<!doctype html>\n${document.documentElement.outerHTML}\n`;
}
