/** One door to the renderers, by the name of the format. */
import { InvalidArgumentError } from "../core/errors.ts";
import type { ReportDocument } from "./document.ts";
import { renderCsv } from "./render-csv.ts";
import { renderHtml } from "./render-html.ts";
import { renderJson } from "./render-json.ts";
import { renderMarkdown } from "./render-markdown.ts";
import { renderText } from "./render-text.ts";

/** Formats a report can be written in. */
export const REPORT_FORMATS = ["text", "markdown", "csv", "json", "html"] as const;

/** A format a report can be written in. */
export type ReportFormat = (typeof REPORT_FORMATS)[number];

/**
 * The report in a format.
 *
 * @param report - The report.
 * @param format - `"text"`, `"markdown"`, `"csv"` (one table), `"json"` or `"html"`.
 * @param options - `table`: the table that CSV holds; default the main table.
 * @returns Text that ends with a line break.
 * @throws InvalidArgumentError for an unknown format or table.
 */
export function renderReport(
  report: ReportDocument,
  format: ReportFormat,
  options: { readonly table?: string } = {},
): string {
  switch (format) {
    case "text":
      return renderText(report);
    case "markdown":
      return renderMarkdown(report);
    case "csv":
      return renderCsv(report, options);
    case "json":
      return renderJson(report);
    case "html":
      return renderHtml(report);
    default:
      throw new InvalidArgumentError("format", `one of ${REPORT_FORMATS.join(", ")}`, format);
  }
}
