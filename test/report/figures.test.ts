/** Figures: the numbers they draw, and the marks that reach the SVG. */
import { parseHTML } from "linkedom";
import { describe, expect, it } from "vitest";
import { InvalidArgumentError } from "../../src/core/errors.ts";
import { seededGenerator } from "../../src/core/random.ts";
import type { FigureBlock, FigureLayer } from "../../src/report/document.ts";
import {
  densityFigure,
  quantileFigure,
  sampleDensityFigure,
  tailFigure,
} from "../../src/report/law-figures.ts";
import { placeLabels, renderSvg } from "../../src/report/svg.ts";
import { powerOfTen, powerTicks } from "../../src/report/svg-axes.ts";
import { gumbelLaw } from "./gumbel-law.ts";

const law = gumbelLaw();

function layer<K extends FigureLayer["kind"]>(
  figure: FigureBlock,
  kind: K,
): Extract<FigureLayer, { kind: K }> {
  const found = figure.layers.find(
    (candidate): candidate is Extract<FigureLayer, { kind: K }> => candidate.kind === kind,
  );
  if (found === undefined) throw new Error(`no layer ${kind}`);
  return found;
}

interface Drawing {
  querySelectorAll(
    selector: string,
  ): ArrayLike<{ readonly textContent: string; getAttribute(name: string): string | null }>;
}
function drawing(figure: FigureBlock): Drawing {
  return (parseHTML(renderSvg(figure)) as unknown as { document: Drawing }).document;
}

describe("density", () => {
  it("draws the density of the law", () => {
    const { points } = layer(densityFigure(law, []), "curve");
    expect(points.length).toBeGreaterThan(100);
    for (const [x, y] of points) expect(y).toBeCloseTo(Math.exp(-x - Math.exp(-x)), 14);
  });

  it("marks the observed roots inside the frame and names those outside", () => {
    const figure = densityFigure(law, [
      { x: 1.5, label: "root 2" },
      { x: 3, label: "root 1" },
      { x: 500, label: "root 0" },
    ]);
    expect(layer(figure, "sticks").at).toEqual([3, 1.5]);
    expect(figure.beyond).toBe("root 0 beyond the right edge");
    expect(figure.description).toContain("root 0 at 500");
    expect(figure.x.domain[1]).toBeLessThan(30);
    const svg = drawing(figure);
    expect(svg.querySelectorAll('g[aria-label="rule"] line[y1]').length).toBeGreaterThanOrEqual(2);
    expect(svg.querySelectorAll('g[aria-label="dot"] circle')).toHaveLength(2);
    const texts = Array.from(svg.querySelectorAll("text"), (text) => text.textContent);
    expect(texts).toEqual(
      expect.arrayContaining(["root 1", "root 2", "root 0 beyond the right edge →", "observed"]),
    );
  });

  it("puts a mark where its value belongs on the axis", () => {
    const figure = densityFigure(law, [{ x: 2, label: "root 1" }]);
    const [low, high] = figure.x.domain;
    const dot = drawing(figure).querySelectorAll('g[aria-label="dot"] circle')[0];
    const expected = 62 + ((680 - 62 - 24) * (2 - low)) / (high - low);
    expect(Number(dot?.getAttribute("cx"))).toBeCloseTo(expected, 6);
  });

  it("refuses observations that are not finite", () => {
    expect(() => densityFigure(law, [{ x: Number.NaN, label: "a" }])).toThrow(InvalidArgumentError);
    expect(() => tailFigure(law, [{ x: Number.POSITIVE_INFINITY, label: "a" }])).toThrow(
      InvalidArgumentError,
    );
    expect(() => quantileFigure(law, [1, Number.NaN])).toThrow(InvalidArgumentError);
  });
});

describe("tail", () => {
  it("places observations at the base-10 logarithm of their tail probability", () => {
    const figure = tailFigure(law, [
      { x: 2, label: "root 1" },
      { x: 900, label: "root 0" },
    ]);
    const { points } = layer(figure, "points");
    expect(points[0]?.[0]).toBe(900);
    expect(points[0]?.[1]).toBeCloseTo(-900 / Math.LN10, 9);
    expect(points[1]?.[1]).toBeCloseTo(Math.log10(-Math.expm1(-Math.exp(-2))), 12);
    expect(figure.y.scale).toBe("power-of-ten");
    expect(layer(figure, "reference").points[0]?.[1]).toBeCloseTo(Math.log10(0.05), 12);
    const texts = Array.from(drawing(figure).querySelectorAll("text"), (text) => text.textContent);
    expect(texts).toContain("root 0");
    expect(texts.some((text) => /^10⁻\S+$/.test(text))).toBe(true);
  });
});

describe("sample", () => {
  const sample = law.sample(400, seededGenerator(11));

  it("draws a histogram of area 1", () => {
    const { bars } = layer(sampleDensityFigure(law, sample), "bars");
    const area = bars.reduce((sum, [left, right, height]) => sum + (right - left) * height, 0);
    expect(area).toBeCloseTo(1, 12);
  });

  it("pairs the ordered sample with the quantiles at (i − ½)/n", () => {
    const { points } = layer(quantileFigure(law, sample), "points");
    const sorted = Float64Array.from(sample).sort();
    expect(points).toHaveLength(400);
    points.forEach(([theory, value], i) => {
      expect(value).toBe(sorted[i]);
      expect(theory).toBeCloseTo(-Math.log(-Math.log((i + 0.5) / 400)), 12);
    });
  });

  it("has a band that holds the sample of the law and not a shifted one", () => {
    const outside = (values: Float64Array): number => {
      const figure = quantileFigure(law, values);
      const band = new Map(layer(figure, "band").points.map(([x, low, high]) => [x, [low, high] as const]));
      return layer(figure, "points").points.filter(([x, y]) => {
        const limits = band.get(x);
        return limits !== undefined && (y < limits[0] || y > limits[1]);
      }).length;
    };
    expect(outside(sample)).toBe(0);
    expect(outside(sample.map((x) => x + 0.5))).toBeGreaterThan(100);
  });

  it("thins a large sample but keeps both ends", () => {
    const large = law.sample(10_000, seededGenerator(5));
    const { points } = layer(quantileFigure(law, large), "points");
    expect(points.length).toBeLessThanOrEqual(2001);
    expect(points[0]?.[1]).toBe(Math.min(...large));
    expect(points[points.length - 1]?.[1]).toBe(Math.max(...large));
  });

  it("draws one dot a value", () => {
    expect(drawing(quantileFigure(law, sample)).querySelectorAll('g[aria-label="dot"] circle')).toHaveLength(
      400,
    );
  });
});

describe("labels and ticks", () => {
  it("never lets two labels overlap", () => {
    const labels = Array.from({ length: 40 }, (_, i) => ({ x: i * 9, y: 100, text: `root ${i + 1}` }));
    for (const beside of [false, true]) {
      const placed = placeLabels(labels, beside, 380);
      expect(placed.length).toBeGreaterThan(5);
      for (const a of placed) {
        for (const b of placed) {
          if (a === b || a.level !== b.level || a.anchor !== b.anchor) continue;
          expect(Math.abs(a.x - b.x)).toBeGreaterThan(6.8 * Math.min(a.text.length, b.text.length));
        }
      }
    }
  });

  it("writes powers of ten with raised digits, on at most nine ticks", () => {
    expect(powerOfTen(-120)).toBe("10⁻¹²⁰");
    expect(powerOfTen(0)).toBe("1");
    expect(powerTicks(-8, 0)).toEqual([0, -1, -2, -3, -4, -5, -6, -7, -8]);
    expect(powerTicks(-391, 39).length).toBeLessThanOrEqual(9);
    expect(powerTicks(-0.5, 0.05)).toEqual([0]);
  });
});
