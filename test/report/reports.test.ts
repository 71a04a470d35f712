/** The report builders: what they put into the document. */
import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { largestRootTest } from "../../src/assessment/largest-root.ts";
import { sampleTest } from "../../src/assessment/sample-test.ts";
import { InvalidArgumentError } from "../../src/core/errors.ts";
import { seededGenerator } from "../../src/core/random.ts";
import { isMeasured, type ReportDocument, tableOf } from "../../src/report/document.ts";
import { eigenvalueReport } from "../../src/report/eigenvalue-report.ts";
import { evaluationReport } from "../../src/report/evaluation.ts";
import { percentilesReport } from "../../src/report/percentiles.ts";
import { sampleReport } from "../../src/report/sample-report.ts";
import { libraryVersion } from "../../src/report/version.ts";
import { gumbelLaw } from "./gumbel-law.ts";

function answers(report: ReportDocument): string[] {
  return report.blocks.flatMap((block) =>
    block.kind === "paragraph" && block.answer === true ? [block.text] : [],
  );
}

it("names the version of package.json", () => {
  const manifest = JSON.parse(readFileSync(new URL("../../package.json", import.meta.url), "utf8")) as {
    version: string;
  };
  expect(libraryVersion).toBe(manifest.version);
});

describe("percentilesReport", () => {
  const law = gumbelLaw();

  it("holds the quantiles with their errors, and reports its progress", () => {
    const steps: [number, number][] = [];
    const other = gumbelLaw({ symbol: "Other" });
    const report = percentilesReport(
      [law, other],
      { lower: [0.5], upper: [1e-8] },
      {
        figures: false,
        onProgress: (done, total) => steps.push([done, total]),
      },
    );
    const [first, second] = tableOf(report, "percentiles").rows;
    expect(first?.slice(0, 2)).toEqual([0.5, null]);
    expect(second?.slice(0, 2)).toEqual([null, 1e-8]);
    const cell = first?.[2] ?? null;
    expect(isMeasured(cell) && cell.value).toBeCloseTo(-Math.log(Math.LN2), 15);
    expect(isMeasured(cell) && cell.error).toBeGreaterThan(0);
    expect(steps).toEqual([
      [1, 4],
      [2, 4],
      [3, 4],
      [4, 4],
    ]);
    expect(report.provenance.laws.map((reference) => reference.symbol)).toEqual(["Gumbel", "Other"]);
  });

  it("refuses no law, a law twice and no level", () => {
    expect(() => percentilesReport([], { lower: [0.5] })).toThrow(InvalidArgumentError);
    expect(() => percentilesReport([law, law], { lower: [0.5] })).toThrow(/each law once/);
    expect(() => percentilesReport([law], {})).toThrow(/at least one level/);
  });
});

describe("evaluationReport", () => {
  it("asks for the logarithm where the probability underflows", () => {
    const report = evaluationReport([gumbelLaw()], [{ quantity: "survival", at: [900] }], { figures: false });
    const cell = tableOf(report, "values").rows[0]?.[3] ?? null;
    expect(isMeasured(cell) && cell.value).toBe(0);
    expect(isMeasured(cell) && cell.logValue).toBeCloseTo(-900, 9);
  });

  it("refuses points that are not finite, and nothing at all", () => {
    expect(() => evaluationReport([gumbelLaw()], [{ quantity: "cdf", at: [Number.NaN] }])).toThrow(
      /at: expected finite/,
    );
    expect(() => evaluationReport([gumbelLaw()], [{ quantity: "cdf", at: [] }])).toThrow(
      /at least one quantity/,
    );
  });
});

describe("eigenvalueReport", () => {
  const input = { eigenvalues: [6, 3, 1, 1, 0.9, 0.9, 0.8, 0.8], n: 100, p: 8 };

  it("carries statistic and p-value of the test, with an error that covers the rounding of the eigenvalue", () => {
    const result = largestRootTest(input, { components: 3 });
    const given = eigenvalueReport(result, { eigenvaluesGiven: true, figures: false });
    const computed = eigenvalueReport(result, { figures: false });
    const cellOf = (report: ReportDocument, column: string) => {
      const table = tableOf(report, "roots");
      const cell = table.rows[0]?.[table.columns.findIndex((candidate) => candidate.key === column)] ?? null;
      if (!isMeasured(cell)) throw new Error(`no measured cell in ${column}`);
      return cell;
    };
    expect(cellOf(given, "statistic").value).toBe(result.steps[0]?.statistic);
    expect(cellOf(given, "p_value").value).toBe(result.steps[0]?.pValue);
    expect(cellOf(given, "eigenvalue").error).toBe(0);
    expect(cellOf(computed, "eigenvalue").error).toBeGreaterThan(0);

    // Shift the largest eigenvalue by its stated error: statistic and p-value stay inside theirs.
    const shift = cellOf(computed, "eigenvalue").error as number;
    const shifted = largestRootTest(
      { ...input, eigenvalues: [6 + shift, ...input.eigenvalues.slice(1)] },
      { components: 1 },
    );
    const statistic = cellOf(computed, "statistic");
    expect(Math.abs((shifted.steps[0]?.statistic as number) - statistic.value)).toBeLessThanOrEqual(
      statistic.error as number,
    );
    const p = cellOf(computed, "p_value");
    expect(Math.abs((shifted.steps[0]?.pValue as number) - p.value)).toBeLessThanOrEqual(p.error as number);
    expect(p.error as number).toBeLessThan(1e-9 * p.value);
  });

  it("says how many stand out, and when there may be more", () => {
    const some = eigenvalueReport(largestRootTest(input, { components: 4 }), { figures: false });
    expect(answers(some)[0]).toMatch(/^2 components stand out .* \(4 leading roots tested in sequence/);
    const all = eigenvalueReport(largestRootTest(input, { components: 1 }), { figures: false });
    expect(answers(all)[0]).toMatch(/^1 component stands out .*there may be more/);
    const flat = { ...input, eigenvalues: [1.3, 1.2, 1.1, 1, 1, 0.9, 0.8, 0.7] };
    expect(answers(eigenvalueReport(largestRootTest(flat), { figures: false }))[0]).toMatch(
      /^No component stands out/,
    );
  });

  it("draws density and tail with the roots, and passes the assumptions on", () => {
    const result = largestRootTest(input, { components: 4 });
    const report = eigenvalueReport(result);
    const figures = report.blocks.filter((block) => block.kind === "figure");
    expect(figures.map((figure) => figure.id)).toEqual(["density-F1", "tail-F1"]);
    const notes = report.blocks.flatMap((block) => (block.kind === "note" ? [block.text] : []));
    for (const assumption of result.assumptions) expect(notes).toContain(assumption);
  });
});

describe("sampleReport", () => {
  const law = gumbelLaw();
  const sample = law.sample(200, seededGenerator(8));

  it("answers in words and holds both tables", () => {
    const report = sampleReport(sampleTest(sample, law), law);
    expect(answers(report)[0]).toMatch(/^The sample of 200 agrees with Gumbel at level 0\.05/);
    expect(tableOf(report, "distances").rows).toHaveLength(2);
    expect(tableOf(report, "moments").rows).toHaveLength(4);
    const shifted = sampleReport(
      sampleTest(
        sample.map((x) => x + 1),
        law,
      ),
      law,
    );
    expect(answers(shifted)[0]).toMatch(/departs from Gumbel at level 0\.05 by both distances/);
  });

  it("refuses a law other than the one tested", () => {
    expect(() => sampleReport(sampleTest(sample, law), gumbelLaw({ symbol: "Other" }))).toThrow(
      InvalidArgumentError,
    );
  });
});
