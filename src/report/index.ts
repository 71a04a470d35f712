/**
 * Tables, figures and provenance as text, Markdown, CSV, JSON and HTML.
 *
 * @packageDocumentation
 */
export {
  allConverged,
  type Cell,
  type ColumnKind,
  type FigureAxis,
  type FigureBlock,
  type FigureLayer,
  type HeadingBlock,
  type InputReference,
  type LawReference,
  type MeasuredCell,
  type NoteBlock,
  type ParagraphBlock,
  type ReportBlock,
  type ReportDocument,
  type ReportProvenance,
  type TableBlock,
  type TableColumn,
} from "./document.ts";
export { type EigenvalueReportOptions, eigenvalueReport } from "./eigenvalue-report.ts";
export { type EvaluationRequest, evaluationReport } from "./evaluation.ts";
export {
  densityFigure,
  type ObservedValue,
  quantileFigure,
  sampleDensityFigure,
  tailFigure,
} from "./law-figures.ts";
export {
  DEFAULT_DIGITS,
  formatError,
  formatProbability,
  formatValue,
  type Measured,
} from "./numbers.ts";
export { type ProgressListener, percentilesReport, type ReportOptions } from "./percentiles.ts";
export { type EstimateOptions, lawReference } from "./provenance.ts";
export { REPORT_FORMATS, type ReportFormat, renderReport } from "./render.ts";
export { renderCsv } from "./render-csv.ts";
export { renderHtml } from "./render-html.ts";
export {
  type FigureJson,
  type JsonNumber,
  type MeasuredJson,
  REPORT_SCHEMA,
  type ReportJson,
  renderJson,
  reportToJson,
  type TableJson,
} from "./render-json.ts";
export { renderMarkdown } from "./render-markdown.ts";
export { renderText } from "./render-text.ts";
export { type SampleReportOptions, sampleReport } from "./sample-report.ts";
export { renderSvg } from "./svg.ts";
export { libraryVersion } from "./version.ts";
