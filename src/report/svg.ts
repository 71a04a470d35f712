/**
 * Figures as SVG, drawn by Observable Plot on a document that needs no browser.
 *
 * Colours are CSS variables with a fallback (`var(--edgelaw-law, #1f5fa8)`), so a page can recolour a figure for
 * light, dark and print, and the SVG still stands alone. Labels of close marks are put on separate levels
 * instead of on top of each other.
 */
import * as Plot from "@observablehq/plot";
import { plainText } from "./cells.ts";
import type { FigureBlock, FigureLayer } from "./document.ts";
import {
  type ElementFactory,
  elementFactory,
  type MarkupDocument,
  type MarkupElement,
  newDocument,
  setAttribute,
} from "./markup.ts";
import { axisOptions, powerTicks } from "./svg-axes.ts";

const WIDTH = 680;
const HEIGHT = 380;
const MARGIN = { top: 46, right: 24, bottom: 46, left: 62 };
const FONT_SIZE = 12;
/** Mean width of a character of the system fonts at {@link FONT_SIZE}, with some room. */
const CHARACTER_WIDTH = 6.8;
const LABEL_HEIGHT = 15;

const COLOUR = {
  curve: "var(--edgelaw-law, #1f5fa8)",
  reference: "var(--edgelaw-reference, #6b7280)",
  band: "var(--edgelaw-law, #1f5fa8)",
  bars: "var(--edgelaw-bars, #9aa7b8)",
  points: "var(--edgelaw-data, #b3400e)",
  sticks: "var(--edgelaw-data, #b3400e)",
  paper: "var(--edgelaw-paper, #ffffff)",
} as const satisfies Record<FigureLayer["kind"] | "paper", string>;

interface Label {
  /** Place of the mark in pixels, x to the right and y downwards. */
  readonly x: number;
  readonly y: number;
  readonly text: string;
}

interface Placement {
  /** How many lines the label was moved up to clear the others. */
  readonly level: number;
  /** Where the text stands: centred above its mark, or beside it. */
  readonly anchor: "middle" | "start" | "end";
}

/**
 * Labels of marks, each on the lowest of three levels where it does not run into one already placed; labels for
 * which there is no room are left out (the marks themselves stay, and carry their label as a tooltip).
 *
 * @param labels - Labels in order of importance, in pixels.
 * @param beside - Whether they stand to the right of their mark instead of above it.
 * @param right - Right edge of the frame in pixels; labels that would cross it end at their mark.
 */
export function placeLabels<T extends Label>(
  labels: readonly T[],
  beside: boolean,
  right: number,
): (T & Placement)[] {
  const placed: (T & Placement & { readonly from: number; readonly to: number; readonly line: number })[] =
    [];
  for (const label of labels) {
    const width = label.text.length * CHARACTER_WIDTH;
    const reach = beside ? width + 8 : width / 2;
    const anchor = label.x + reach > right ? "end" : beside ? "start" : "middle";
    const from =
      anchor === "start" ? label.x + 8 : anchor === "end" ? label.x - width - 8 : label.x - width / 2;
    const to = from + width;
    for (let level = 0; level < 3; level++) {
      const line = label.y - LABEL_HEIGHT * level;
      const free = placed.every(
        (other) => other.to + 4 < from || to + 4 < other.from || Math.abs(other.line - line) >= LABEL_HEIGHT,
      );
      if (free) {
        placed.push({ ...label, level, anchor, from, to, line });
        break;
      }
    }
  }
  return placed;
}

interface LabelledRow {
  readonly x: number;
  readonly y: number;
  readonly text: string;
}

function labelMarks(rows: readonly LabelledRow[], figure: FigureBlock, beside: boolean): Plot.Markish[] {
  const [left, right] = figure.x.domain;
  const [floor, ceiling] = figure.y.domain;
  const across = (WIDTH - MARGIN.left - MARGIN.right) / (right - left);
  const down = (HEIGHT - MARGIN.top - MARGIN.bottom) / (ceiling - floor);
  const labels = rows
    .filter((row) => row.text !== "")
    .map((row) => ({ text: row.text, data: row, x: (row.x - left) * across, y: (ceiling - row.y) * down }));
  return placeLabels(labels, beside, (right - left) * across).map((label) => {
    const end = label.anchor === "end";
    return Plot.text([label.data], {
      x: "x",
      y: "y",
      text: "text",
      // Beside a falling curve there is room to the upper right and to the lower left.
      dx: label.anchor === "start" ? 8 : end ? -8 : 0,
      dy: (end && beside ? 12 : beside ? -7 : -11) - LABEL_HEIGHT * label.level,
      textAnchor: label.anchor,
      fill: COLOUR.points,
      stroke: COLOUR.paper,
      strokeWidth: 4,
    });
  });
}

function layerMarks(layer: FigureLayer, figure: FigureBlock): Plot.Markish[] {
  const [floor, ceiling] = figure.y.domain;
  switch (layer.kind) {
    case "curve":
      return [Plot.line(layer.points, { stroke: COLOUR.curve, strokeWidth: 2, clip: true })];
    case "reference":
      return [
        Plot.line(layer.points, {
          stroke: COLOUR.reference,
          strokeWidth: 1.2,
          strokeDasharray: "5 4",
          clip: true,
        }),
      ];
    case "band": {
      const rows = layer.points.map(([x, low, high]) => ({ x, low, high }));
      return [
        Plot.areaY(rows, { x: "x", y1: "low", y2: "high", fill: COLOUR.band, fillOpacity: 0.14, clip: true }),
      ];
    }
    case "bars": {
      const rows = layer.bars.map(([x1, x2, y]) => ({ x1, x2, y }));
      return [
        Plot.rectY(rows, {
          x1: "x1",
          x2: "x2",
          y1: floor,
          y2: "y",
          fill: COLOUR.bars,
          fillOpacity: 0.55,
          inset: 0.5,
          clip: true,
        }),
      ];
    }
    case "points": {
      const rows = layer.points.map(([x, y], i) => ({ x, y, text: plainText(layer.labels?.[i] ?? "") }));
      const many = rows.length > 60;
      const dots = Plot.dot(rows, {
        x: "x",
        y: "y",
        r: many ? 2 : 4,
        fill: COLOUR.points,
        fillOpacity: many ? 0.7 : 1,
        stroke: COLOUR.paper,
        strokeWidth: many ? 0.3 : 1,
        ...(layer.labels === undefined ? {} : { title: "text" }),
      });
      return [dots, ...labelMarks(rows, figure, true)];
    }
    case "sticks": {
      const top = floor + (ceiling - floor) * 0.74;
      const rows = layer.at.map((x, i) => ({ x, y: top, text: plainText(layer.labels?.[i] ?? "") }));
      return [
        Plot.ruleX(rows, {
          x: "x",
          y1: floor,
          y2: "y",
          stroke: COLOUR.sticks,
          strokeWidth: 1.6,
          title: "text",
        }),
        Plot.dot(rows, { x: "x", y: "y", r: 3.5, fill: COLOUR.sticks, title: "text" }),
        ...labelMarks(rows, figure, false),
      ];
    }
  }
}

/** A row of swatches with names above the frame. */
function legend(figure: FigureBlock, make: ElementFactory): MarkupElement {
  const group = make.svg("g", {
    class: "edgelaw-legend",
    "font-size": String(FONT_SIZE),
    "text-anchor": "start",
  });
  let x = MARGIN.left;
  let y = 14;
  for (const layer of figure.layers) {
    const name = plainText(layer.name);
    const width = 26 + name.length * CHARACTER_WIDTH + 14;
    if (x + width > WIDTH && x > MARGIN.left) {
      x = MARGIN.left;
      y += 16;
    }
    const colour = COLOUR[layer.kind];
    if (layer.kind === "points" || layer.kind === "sticks") {
      group.append(make.svg("circle", { cx: String(x + 10), cy: String(y - 4), r: "4", fill: colour }));
    } else if (layer.kind === "band" || layer.kind === "bars") {
      const opacity = layer.kind === "band" ? "0.25" : "0.55";
      group.append(
        make.svg("rect", {
          x: String(x),
          y: String(y - 9),
          width: "20",
          height: "10",
          fill: colour,
          "fill-opacity": opacity,
        }),
      );
    } else {
      const dash: Record<string, string> = layer.kind === "reference" ? { "stroke-dasharray": "5 4" } : {};
      group.append(
        make.svg("path", {
          d: `M${x},${y - 4}h20`,
          stroke: colour,
          "stroke-width": "2",
          fill: "none",
          ...dash,
        }),
      );
    }
    group.append(make.svg("text", { x: String(x + 26), y: String(y), fill: "currentColor" }, name));
    x += width;
  }
  return group;
}

/**
 * The plot library numbers its clip paths over the life of the process; named after the figure instead, equal
 * figures give equal text.
 */
function nameClipPaths(svg: MarkupElement, name: string): void {
  const names = new Map<string, string>();
  for (const element of svg.querySelectorAll("[id]")) {
    const old = element.getAttribute("id") ?? "";
    names.set(`url(#${old})`, `url(#${name}-clip-${names.size + 1})`);
    element.setAttribute("id", `${name}-clip-${names.size}`);
  }
  for (const element of svg.querySelectorAll("[clip-path]")) {
    element.setAttribute("clip-path", names.get(element.getAttribute("clip-path") ?? "") ?? "none");
  }
}

/**
 * A figure as an SVG element of a document (for embedding in a page built on the same document).
 *
 * @param figure - The figure.
 * @param document - Document that owns the element.
 * @returns The `<svg>` with `role="img"` and the description as its accessible name.
 */
export function figureElement(figure: FigureBlock, document: MarkupDocument): MarkupElement {
  const make = elementFactory(document);
  const [left] = figure.x.domain;
  const marks: Plot.Markish[] = [
    Plot.gridY({
      stroke: "currentColor",
      strokeOpacity: 0.12,
      ...(figure.y.scale === "linear" ? { ticks: 7 } : { ticks: powerTicks(...figure.y.domain) }),
    }),
    Plot.ruleY([figure.y.domain[0]], { stroke: "currentColor", strokeOpacity: 0.5 }),
    Plot.ruleX([left], { stroke: "currentColor", strokeOpacity: 0.5 }),
    ...figure.layers.flatMap((layer) => layerMarks(layer, figure)),
  ];
  if (figure.beyond !== undefined) {
    marks.push(
      Plot.text([`${plainText(figure.beyond)} →`], {
        frameAnchor: "top-right",
        dx: -4,
        dy: 6,
        fill: COLOUR.sticks,
        fontWeight: "bold",
        stroke: COLOUR.paper,
        strokeWidth: 4,
      }),
    );
  }
  const svg = Plot.plot({
    document: document as never,
    className: "edgelaw-plot",
    width: WIDTH,
    height: HEIGHT,
    marginTop: MARGIN.top,
    marginRight: MARGIN.right,
    marginBottom: MARGIN.bottom,
    marginLeft: MARGIN.left,
    style: { fontSize: `${FONT_SIZE}px`, background: "none" },
    x: axisOptions(figure.x),
    y: axisOptions(figure.y),
    marks,
  }) as unknown as MarkupElement;
  nameClipPaths(svg, figure.id);
  svg.append(legend(figure, make));
  setAttribute(svg, "role", "img");
  setAttribute(svg, "aria-label", `${plainText(figure.title)}. ${plainText(figure.description)}`);
  setAttribute(svg, "xmlns", "http://www.w3.org/2000/svg");
  return svg;
}

/**
 * A figure as a stand-alone SVG file.
 *
 * @param figure - The figure.
 * @returns SVG text that asks for nothing outside itself.
 */
export function renderSvg(figure: FigureBlock): string {
  return `${figureElement(figure, newDocument()).outerHTML}\n`;
}
