/** The renderers: structure, escaping of hostile text, and numbers that read back unchanged. */
import { parse } from "csv-parse/sync";
import { parseHTML } from "linkedom";
import { describe, expect, it } from "vitest";
import { InvalidArgumentError } from "../../src/core/errors.ts";
import type { Cell, ReportDocument, TableBlock } from "../../src/report/document.ts";
import { allConverged } from "../../src/report/document.ts";
import { densityFigure } from "../../src/report/law-figures.ts";
import { lawReference } from "../../src/report/provenance.ts";
import { REPORT_FORMATS, type ReportFormat, renderReport } from "../../src/report/render.ts";
import { REPORT_SCHEMA, type ReportJson } from "../../src/report/render-json.ts";
import { gumbelLaw } from "./gumbel-law.ts";

const HOSTILE = [
  "<script>alert(1)</script>",
  '"><img src=x onerror=alert(1)>',
  "a&quot;b&amp;c",
  "</style><b>",
  "]]>--><!--",
  "| pipe | `code` *bold* _it_ [link](http://example.org) \\",
  "=1+2",
  "@SUM(A1)",
  "line\nbreak\ttab",
  "\u001b[31mred\u0007",
  "\u202egnp.exe",
];

const NUMBERS = [
  0.1 + 0.2,
  -3.895432673123456,
  1 / 3,
  4.957912153331047e-8,
  1e-300,
  123456789.12345679,
  5e-324,
];

function table(rows: readonly (readonly Cell[])[], more: Partial<TableBlock> = {}): TableBlock {
  return {
    kind: "table",
    id: "main",
    caption: "A table",
    columns: [
      { key: "name", title: "name", kind: "text" },
      { key: "given", title: "given", kind: "given" },
      { key: "x", title: "x", kind: "measured", law: "Gumbel" },
      { key: "p", title: "p", kind: "probability", law: "Gumbel" },
    ],
    rows,
    ...more,
  };
}

function report(blocks: ReportDocument["blocks"], more: Partial<ReportDocument> = {}): ReportDocument {
  return {
    title: "A report",
    blocks,
    mainTable: "main",
    provenance: {
      version: "9.9.9",
      laws: [lawReference(gumbelLaw())],
      methods: ["centring by Someone (2000)"],
      options: { level: 0.05 },
      inputs: [{ name: "data.csv", digest: "sha256:abc", rows: 3, columns: 2 }],
      date: "2026-12-01T00:00:00Z",
    },
    ...more,
  };
}

const plainRow: Cell[] = ["row", 0.5, { value: 1.25, error: 1e-12 }, { value: 0.04, error: 1e-15 }];

/** The page as a document, typed as far as these tests look. */
interface Page {
  readonly title: string;
  readonly body: { readonly textContent: string };
  querySelectorAll(
    selector: string,
  ): ArrayLike<{ readonly textContent: string; getAttribute(name: string): string | null }>;
}
function page(html: string): Page {
  return (parseHTML(html) as unknown as { document: Page }).document;
}

describe("every format", () => {
  it.each([...REPORT_FORMATS])("%s carries convention, error, law, formula, source and version", (format) => {
    const text = renderReport(report([table([plainRow])]), format).replace(/\\/g, "");
    expect(text).toContain("location 0, scale 1");
    expect(text).toContain("F(x) = exp(−exp(−x))");
    expect(text).toContain("E. J. Gumbel, Statistics of Extremes (1958)");
    expect(text).toContain("9.9.9");
    expect(text).toMatch(/1e-12/);
    expect(text.endsWith("\n")).toBe(true);
    if (format === "csv") return;
    expect(text).toContain("centring by Someone (2000)");
    expect(text).toContain("sha256:abc");
    expect(text).toContain("2026-12-01T00:00:00Z");
  });

  it.each([...REPORT_FORMATS])("%s never prints an underflowing probability as 0", (format) => {
    const cell = { value: 0, error: 0, logValue: -900, logError: 1e-10 };
    const text = renderReport(report([table([["far", 1, null, cell]])]), format);
    expect(text).toContain("1.364477212");
    expect(text).toContain("e-391");
  });

  it.each([...REPORT_FORMATS])("%s is the same for the same report", (format) => {
    const subject = report([table([plainRow]), densityFigure(gumbelLaw(), [{ x: 1, label: "root 1" }])]);
    expect(renderReport(subject, format)).toBe(renderReport(subject, format));
  });

  it("refuses an unknown format, a missing table and a ragged table", () => {
    const subject = report([table([plainRow])]);
    expect(() => renderReport(subject, "pdf" as ReportFormat)).toThrow(InvalidArgumentError);
    expect(() => renderReport(subject, "csv", { table: "none" })).toThrow(/table: expected one of main/);
    for (const format of REPORT_FORMATS) {
      expect(() => renderReport(report([table([["short"]])]), format)).toThrow(/4 cells a row/);
    }
  });

  it("marks a missed tolerance", () => {
    const missed = report([table([["row", 1, { value: 2, error: 0.1, converged: false }, null]])]);
    expect(allConverged(missed)).toBe(false);
    expect(allConverged(report([table([plainRow])]))).toBe(true);
    for (const format of ["text", "markdown", "html"] as const) {
      expect(renderReport(missed, format)).toContain("† tolerance missed");
    }
    expect(renderReport(missed, "csv")).toContain("2,0.1,false");
  });
});

describe("text", () => {
  it("has this structure", () => {
    const shown = renderReport(
      report([
        { kind: "heading", text: "Part" },
        { kind: "paragraph", text: "Some words.", answer: true },
        { kind: "note", text: "A caution." },
        table([
          plainRow,
          ["longer name", 0.25, { value: -10.5, error: 1e-3 }, { value: 1e-20, error: 1e-16 }],
        ]),
      ]),
      "text",
    );
    expect(shown.split("Provenance")[0]).toBe(
      [
        "A report",
        "========",
        "",
        "Part",
        "----",
        "",
        "Some words.",
        "",
        "Note: A caution.",
        "",
        "A table",
        "",
        "name         given            x  error              p  error",
        "───────────  ─────  ───────────  ─────  ─────────────  ─────",
        "row            0.5  1.250000000  1e-12  0.04000000000  1e-15",
        "longer name   0.25      -10.500  0.001      < 1.1e-16  1e-16",
        "",
        "Values are rounded to at most 10 significant digits and never to more than their error",
        "supports; the error is absolute and that of the value before rounding.",
        "Gumbel (Gumbel, maxima): location 0, scale 1. edgelaw 9.9.9.",
        "",
        "",
      ].join("\n"),
    );
  });

  it("lets no control character through", () => {
    const rows = HOSTILE.map((name): Cell[] => [name, 1, null, null]);
    const shown = renderReport(report([table(rows), { kind: "note", text: HOSTILE.join(" ") }]), "text");
    // biome-ignore lint/suspicious/noControlCharactersInRegex: this is what must not be there
    expect(shown).not.toMatch(/[\u0000-\u0009\u000b-\u001f\u007f\u202e]/);
    expect(shown).toContain("line\ufffdbreak");
  });
});

describe("Markdown", () => {
  it("has this structure", () => {
    const shown = renderReport(report([table([plainRow])]), "markdown");
    expect(shown.split("\n").slice(0, 8)).toEqual([
      "# A report",
      "",
      "**A table**",
      "",
      "| name | given |           x | error |             p | error |",
      "| :--- | ----: | ----------: | ----: | ------------: | ----: |",
      "| row  |   0.5 | 1.250000000 | 1e-12 | 0.04000000000 | 1e-15 |",
      "",
    ]);
  });

  it("escapes markup, and keeps every row in its cells", () => {
    const rows = HOSTILE.map((name): Cell[] => [name, 1, null, null]);
    const shown = renderReport(report([table(rows)]), "markdown");
    expect(shown).not.toMatch(/<[a-z/!]/i);
    const lines = shown.split("\n").filter((line) => line.startsWith("|"));
    expect(lines).toHaveLength(HOSTILE.length + 2);
    for (const line of lines) expect(line.match(/(?<!\\)\|/g)).toHaveLength(7);
    expect(shown).toContain("\\*bold\\*");
    expect(shown).toContain("\\[link\\]");
  });
});

describe("CSV", () => {
  it("reads back to the same numbers", () => {
    const rows = NUMBERS.map((x): Cell[] => ["n", x, { value: x, error: Math.abs(x) * 1e-15 }, null]);
    const records: Record<string, string>[] = parse(renderReport(report([table(rows)]), "csv"), {
      columns: true,
    });
    expect(records).toHaveLength(NUMBERS.length);
    records.forEach((record, i) => {
      const x = NUMBERS[i] as number;
      expect(Number(record["given"])).toBe(x);
      expect(Number(record["x"])).toBe(x);
      expect(Number(record["x_error"])).toBe(Math.abs(x) * 1e-15);
      expect(record["x_provenance"]).toContain("edgelaw 9.9.9");
    });
  });

  it("keeps hostile text in its field and lets no spreadsheet run it", () => {
    const rows = HOSTILE.map((name): Cell[] => [name, -1, null, null]);
    const records: Record<string, string>[] = parse(renderReport(report([table(rows)]), "csv"), {
      columns: true,
    });
    expect(records).toHaveLength(HOSTILE.length);
    for (const record of records) {
      expect(record["name"]).not.toMatch(/^[=@+]/);
      expect(record["given"]).toBe("-1");
    }
    expect(records.some((record) => record["name"] === "'=1+2")).toBe(true);
  });

  it("holds the table asked for", () => {
    const second = table([["other", 7, null, null]], { id: "second" });
    const shown = renderReport(report([table([plainRow]), second]), "csv", { table: "second" });
    expect(shown).toContain("other,7");
    expect(shown).not.toContain("row,0.5");
  });
});

describe("JSON", () => {
  it("reads back to the same numbers, and says its schema", () => {
    const rows = NUMBERS.map((x): Cell[] => ["n", x, { value: x, error: 1e-15, errorKind: "bound" }, null]);
    const read = JSON.parse(renderReport(report([table(rows)]), "json")) as ReportJson;
    expect(read.schema).toBe(REPORT_SCHEMA);
    expect(read.provenance.version).toBe("9.9.9");
    expect(read.tables["main"]?.rows.map((row) => row["given"])).toEqual(NUMBERS);
    expect(read.tables["main"]?.rows[0]?.["x"]).toEqual({
      value: NUMBERS[0],
      error: 1e-15,
      errorKind: "bound",
      law: "Gumbel",
    });
  });

  it("has words for what JSON has no number for, and null with a decimal for an underflow", () => {
    const rows: Cell[][] = [
      ["a", Number.POSITIVE_INFINITY, { value: Number.NaN, error: Number.POSITIVE_INFINITY }, null],
      ["b", 1, null, { value: 0, error: 0, logValue: -900, logError: 1e-13 }],
    ];
    const read = JSON.parse(renderReport(report([table(rows)]), "json")) as ReportJson;
    const shown = read.tables["main"]?.rows;
    expect(shown?.[0]?.["given"]).toBe("Infinity");
    expect(shown?.[0]?.["x"]).toMatchObject({ value: "NaN", error: "Infinity" });
    expect(shown?.[1]?.["p"]).toMatchObject({ value: null, error: null, logValue: -900 });
    expect(shown?.[1]?.["p"]).toHaveProperty("decimal", expect.stringMatching(/^1\.3644772123\d*e-391$/));
  });

  it("holds answers, notes and what the figures draw", () => {
    const figure = densityFigure(gumbelLaw(), [{ x: 2, label: "root 1" }]);
    const read = JSON.parse(
      renderReport(
        report([
          { kind: "paragraph", text: "Yes.", answer: true },
          { kind: "paragraph", text: "Words." },
          { kind: "note", text: "Careful." },
          table([plainRow]),
          figure,
        ]),
        "json",
      ),
    ) as ReportJson;
    expect(read.answers).toEqual(["Yes."]);
    expect(read.notes).toEqual(["Careful."]);
    const layers = read.figures["density-Gumbel"]?.layers;
    expect(layers?.map((layer) => layer.kind)).toEqual(["curve", "sticks"]);
  });
});

describe("HTML", () => {
  const rows = HOSTILE.map((name): Cell[] => [name, 1, { value: 2, error: 1e-9 }, null]);
  const hostile = report(
    [
      { kind: "heading", text: HOSTILE.join(" ") },
      { kind: "paragraph", text: HOSTILE.join(" "), answer: true },
      { kind: "note", text: HOSTILE.join(" ") },
      table(rows, { caption: HOSTILE.join(" ") }),
      densityFigure(gumbelLaw({ name: HOSTILE.join(" ") }), [{ x: 1, label: HOSTILE.join(" ") }]),
    ],
    {
      title: HOSTILE.join(" "),
      provenance: {
        version: "9.9.9",
        laws: [{ ...lawReference(gumbelLaw()), convention: HOSTILE.join(" ") }],
        options: { file: HOSTILE.join(" ") },
        inputs: [{ name: HOSTILE.join(" "), digest: "sha256:0" }],
      },
    },
  );

  it("shows hostile text as text", () => {
    const html = renderReport(hostile, "html");
    const shown = page(html);
    expect(shown.querySelectorAll("script")).toHaveLength(0);
    expect(shown.querySelectorAll("img")).toHaveLength(0);
    expect(shown.querySelectorAll("b")).toHaveLength(1);
    expect(shown.querySelectorAll("table")).toHaveLength(1);
    const names = Array.from(shown.querySelectorAll("tbody th"), (cell) => cell.textContent);
    expect(names[0]).toBe("<script>alert(1)</script>");
    expect(names[2]).toBe("a&quot;b&amp;c");
    const label = shown.querySelectorAll("svg[role=img]")[0]?.getAttribute("aria-label");
    expect(label).toContain('"><img src=x onerror=alert(1)>');
    expect(label).toContain("a&quot;b&amp;c");
  });

  it("asks for nothing outside itself", () => {
    const html = renderReport(hostile, "html");
    const shown = page(html);
    for (const selector of [
      "link",
      "script",
      "iframe",
      "image",
      "use",
      "[src]",
      "[href]",
      "[srcset]",
      "[onerror]",
    ]) {
      expect(shown.querySelectorAll(selector), selector).toHaveLength(0);
    }
    expect(html).not.toMatch(/url\((?!#)|@import/);
    expect(html).toContain("default-src 'none'");
  });

  it("is accessible: language, captions, header cells, named figures", () => {
    const html = renderReport(report([table([plainRow]), densityFigure(gumbelLaw(), [])]), "html");
    const shown = page(html);
    expect(html).toContain('<html lang="en">');
    expect(shown.title).toBe("A report");
    expect(shown.querySelectorAll("caption")[0]?.textContent).toBe("A table");
    expect(shown.querySelectorAll('thead th[scope="col"]')).toHaveLength(6);
    expect(shown.querySelectorAll('tbody th[scope="row"]')).toHaveLength(1);
    expect(shown.querySelectorAll("figure figcaption")).toHaveLength(1);
    expect(shown.querySelectorAll("svg[role=img]")[0]?.getAttribute("aria-label")).toMatch(
      /^Density of Gumbel/,
    );
    expect(html).toContain("prefers-color-scheme: dark");
    expect(html).toContain("@media print");
  });
});
