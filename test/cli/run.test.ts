/** The command line end to end on a machine in memory: outputs, formats, bad input, exit codes. */
import { parse } from "csv-parse/sync";
import { describe, expect, it } from "vitest";
import { REPORT_FORMATS } from "../../src/report/render.ts";
import type { MeasuredJson, ReportJson } from "../../src/report/render-json.ts";
import { runInMemory } from "./memory-io.ts";

function readJson(text: string): ReportJson {
  return JSON.parse(text) as ReportJson;
}

describe("help", () => {
  it.each([["--help"], ["help"], ["percentiles", "--help"], ["evaluate", "--help"], ["assess", "--help"]])(
    "%s %s explains itself and ends with 0",
    async (...argv) => {
      const { code, out, err } = await runInMemory(argv.filter((part) => part !== undefined));
      expect(code).toBe(0);
      expect(err).toBe("");
      expect(out).toContain("Usage: edgelaw");
      expect(out).toMatch(/Examples:|Start here:/);
      for (const line of out.split("\n")) expect(line.length, line).toBeLessThanOrEqual(120);
    },
  );

  it.each(["percentiles", "evaluate"])("%s explains the scalings of F4", async (command) => {
    const { out } = await runInMemory([command, "--help"]);
    expect(out).toContain("-2.30688");
    expect(out).toContain("-3.26243");
    expect(out).toContain("-2.05520");
  });

  it("without a command prints the help as an error", async () => {
    const { code, err } = await runInMemory([]);
    expect(code).toBe(1);
    expect(err).toContain("Usage: edgelaw");
  });

  it("prints its version", async () => {
    const { code, out } = await runInMemory(["--version"]);
    expect(code).toBe(0);
    expect(out).toMatch(/^\d+\.\d+\.\d+\n$/);
  });
});

describe("percentiles", () => {
  it("prints the table of Johnstone (Ann. Statist. 29 (2001) 295, table 1; from memory) the other way round", async () => {
    const { code, out } = await runInMemory(["percentiles", "--laws", "F1", "--format", "json"]);
    expect(code).toBe(0);
    const rows = readJson(out).tables["percentiles"]?.rows ?? [];
    const printed = new Map([
      [0.01, -3.9],
      [0.05, -3.18],
      [0.1, -2.78],
      [0.3, -1.91],
      [0.5, -1.27],
      [0.7, -0.59],
      [0.9, 0.45],
      [0.95, 0.98],
      [0.99, 2.02],
    ]);
    expect(rows).toHaveLength(printed.size);
    for (const row of rows) {
      const cell = row["F1"] as MeasuredJson;
      expect(
        Math.abs((cell.value as number) - (printed.get(row["lower_probability"] as number) as number)),
      ).toBeLessThan(0.0056);
      expect(cell.error as number).toBeLessThan(1e-12);
      expect(cell.converged).toBe(true);
    }
  });

  it.each([...REPORT_FORMATS])("writes %s", async (format) => {
    const { code, out, err } = await runInMemory(["percentiles", "--levels", "0.95", "--format", format]);
    expect(code).toBe(0);
    expect(err).toBe("");
    // Recomputed with 30 digits: F1 at 0.95 is 0.97931605…
    expect(out).toContain("0.97931605");
    expect(out).toContain("standard");
  });

  it.each([
    ["standard", -3.2906171449 / Math.SQRT2],
    ["unscaled", -3.2906171449],
    ["stochastic-airy", -3.2906171449 / 2 ** (2 / 3)],
  ])("knows F4 in the scaling %s", async (scaling, median) => {
    const { code, out } = await runInMemory([
      "percentiles",
      "--laws",
      "F4",
      "--levels",
      "0.5",
      "--beta4-scaling",
      scaling,
      "--format",
      "csv",
    ]);
    expect(code).toBe(0);
    const [record] = parse(out, { columns: true }) as Record<string, string>[];
    const column = Object.keys(record ?? {})[1] as string;
    expect(Math.abs(Number(record?.[column]) - median)).toBeLessThan(2e-7);
    expect(record?.[`${column}_provenance`]).toMatch(/mean −[23]/);
  });

  it("reaches far into the upper tail", async () => {
    const { code, out } = await runInMemory([
      "percentiles",
      "--laws",
      "F2",
      "--upper-levels",
      "1e-300",
      "--format",
      "json",
    ]);
    expect(code).toBe(0);
    const cell = readJson(out).tables["percentiles"]?.rows[0]?.["F2"] as MeasuredJson;
    expect(cell.value as number).toBeGreaterThan(60);
    expect(cell.value as number).toBeLessThan(70);
  });

  it("mixes levels from both sides", async () => {
    const { out } = await runInMemory([
      "percentiles",
      "--laws",
      "F1",
      "--levels",
      "0.95",
      "--upper-levels",
      "0.05",
      "--format",
      "csv",
    ]);
    const records = parse(out, { columns: true }) as Record<string, string>[];
    expect(records).toHaveLength(2);
    expect(Math.abs(Number(records[0]?.["F1"]) - Number(records[1]?.["F1"]))).toBeLessThan(1e-12);
    expect(records[0]?.["upper_probability"]).toBe("");
  });
});

describe("evaluate", () => {
  it("takes negative points and gives each number its error", async () => {
    const { code, out } = await runInMemory([
      "evaluate",
      "--laws",
      "F2",
      "--at",
      "-3.5,-2",
      "--quantities",
      "cdf",
      "--format",
      "csv",
    ]);
    expect(code).toBe(0);
    const records = parse(out, { columns: true }) as Record<string, string>[];
    expect(records.map((record) => record["at"])).toEqual(["-3.5", "-2"]);
    // F2(−2) with 20 digits, from 50-digit arithmetic.
    const error = Math.abs(Number(records[1]?.["value"]) - 0.41322414250512257);
    expect(error).toBeLessThanOrEqual(Number(records[1]?.["value_error"]));
    expect(Number(records[1]?.["value_error"])).toBeLessThan(1e-14);
  });

  it("takes the = form, ranges and several laws", async () => {
    const { code, out } = await runInMemory(["evaluate", "--laws=F1,F2", "--at=-1:1:1", "--format=csv"]);
    expect(code).toBe(0);
    expect(parse(out, { columns: true })).toHaveLength(2 * 3 * 3);
  });

  it("inverts what it evaluates", async () => {
    const { out } = await runInMemory([
      "evaluate",
      "--laws",
      "F1",
      "--levels",
      "0.3",
      "--upper-levels",
      "1e-20",
      "--format",
      "csv",
    ]);
    const records = parse(out, { columns: true }) as Record<string, string>[];
    const back = await runInMemory([
      "evaluate",
      "--laws",
      "F1",
      "--at",
      records.map((record) => record["value"]).join(","),
      "--quantities",
      "cdf,survival",
      "--format",
      "csv",
    ]);
    const values = (parse(back.out, { columns: true }) as Record<string, string>[]).map((record) =>
      Number(record["value"]),
    );
    expect(values[0]).toBeCloseTo(0.3, 12);
    expect(Math.abs((values[3] as number) / 1e-20 - 1)).toBeLessThan(1e-11);
  });

  it("never prints a tail probability as 0", async () => {
    const { code, out } = await runInMemory([
      "evaluate",
      "--laws",
      "F2",
      "--at",
      "150",
      "--quantities",
      "survival",
    ]);
    expect(code).toBe(0);
    expect(out).toMatch(/P\(X > x\) +150 +\d\.\d+e-1\d\d\d /);
  });

  it("ends with 2 when a tolerance is missed, and prints the result with its error all the same", async () => {
    const argv = [
      "evaluate",
      "--laws",
      "F2",
      "--at",
      "-2",
      "--quantities",
      "cdf",
      "--absolute-tolerance",
      "1e-30",
    ];
    const { code, out, err } = await runInMemory(argv);
    expect(code).toBe(2);
    expect(out).toContain("0.4132241425 †");
    expect(err).toMatch(/a tolerance was missed/);
    const kept = await runInMemory([...argv.slice(0, -1), "1e-9"]);
    expect(kept.code).toBe(0);
  });
});

describe("output", () => {
  it("goes to a file, in the format of its ending", async () => {
    const { code, out, written } = await runInMemory([
      "percentiles",
      "--laws",
      "F2",
      "--levels",
      "0.5",
      "--output",
      "a/t.html",
    ]);
    expect(code).toBe(0);
    expect(out).toBe("");
    expect([...written.keys()]).toEqual(["a/t.html"]);
    expect(written.get("a/t.html")).toMatch(/^<!doctype html>/);
  });

  it("goes to the standard output for -", async () => {
    const { out, written } = await runInMemory([
      "percentiles",
      "--laws",
      "F2",
      "--levels",
      "0.5",
      "--output",
      "-",
    ]);
    expect(out).toContain("Percentiles of F2");
    expect(written.size).toBe(0);
  });

  it("has a date only when asked", async () => {
    const argv = ["percentiles", "--laws", "F2", "--levels", "0.5"];
    expect((await runInMemory(argv)).out).not.toContain("2026-12-01T");
    expect((await runInMemory([...argv, "--stamp"])).out).toContain("2026-12-01T12:00:00.000Z");
  });

  it("shows as many digits as asked, and no more than the error supports", async () => {
    const argv = ["evaluate", "--laws", "F2", "--at", "-2", "--quantities", "cdf", "--digits"];
    expect((await runInMemory([...argv, "4"])).out).toMatch(/-2 +0\.4132 /);
    expect((await runInMemory([...argv, "17"])).out).toMatch(/-2 +0\.413224142505\d{1,4} /);
  });
});

describe("progress bar", () => {
  const argv = ["evaluate", "--laws", "F2", "--at", "-2:2:0.5", "--quantities", "cdf"];

  it("appears on a terminal after a second of work", async () => {
    const slow = await runInMemory(argv, { terminal: true, tick: 400 });
    expect(slow.code).toBe(0);
    expect(slow.bar).toContain("computing [");
    expect(slow.out).not.toContain("computing [");
  });

  it("stays away without a terminal, and from quick work", async () => {
    expect((await runInMemory(argv, { terminal: false, tick: 400 })).bar).toBe("");
    expect((await runInMemory(argv, { terminal: true, tick: 1 })).bar).toBe("");
  });
});

describe("bad input", () => {
  const cases: [string, string[], RegExp][] = [
    ["unknown law", ["percentiles", "--laws", "F3"], /--laws: expected one of F1, F2, F4, received "F3"/],
    [
      "beta = 3 as a law",
      ["evaluate", "--laws", "3", "--at", "1"],
      /--laws: expected one of F1, F2, F4, received "3"/,
    ],
    ["law twice", ["percentiles", "--laws", "F1,F1"], /--laws: expected each choice once/],
    ["no law", ["evaluate", "--at", "1"], /--laws: expected some of F1, F2, F4/],
    ["empty laws", ["percentiles", "--laws", ""], /--laws: expected/],
    [
      "level 0",
      ["percentiles", "--levels", "0"],
      /--levels: expected a probability strictly between 0 and 1, received "0"/,
    ],
    ["level 1", ["percentiles", "--levels", "0.5,1"], /--levels: .*received "1"/],
    [
      "level in per cent",
      ["percentiles", "--levels", "95%"],
      /--levels: expected a decimal number, received "95%"/,
    ],
    ["level 1.5 from above", ["percentiles", "--upper-levels", "1.5"], /--upper-levels: .*received "1.5"/],
    [
      "unknown format",
      ["percentiles", "--format", "pdf"],
      /--format: expected one of text, markdown, csv, json, html, received "pdf"/,
    ],
    ["unknown option", ["percentiles", "--level", "0.5"], /unknown option '--level'/],
    ["unknown command", ["percentile"], /unknown command 'percentile'/],
    ["surplus argument", ["percentiles", "F1"], /too many arguments/],
    ["option without value", ["percentiles", "--laws"], /'--laws <list>' argument missing/],
    [
      "swallowed option",
      ["percentiles", "--output", "--format"],
      /--output: expected a value, received "--format"/,
    ],
    [
      "unknown scaling",
      ["percentiles", "--beta4-scaling", "edge"],
      /--beta4-scaling: expected one of standard, unscaled, stochastic-airy/,
    ],
    [
      "scaling without F4",
      ["percentiles", "--laws", "F1", "--beta4-scaling", "unscaled"],
      /--beta4-scaling: expected the law F4/,
    ],
    [
      "format twice",
      ["percentiles", "--format", "csv", "--format", "json"],
      /--format: expected to be given once/,
    ],
    ["table without csv", ["percentiles", "--table", "percentiles"], /--table: expected format csv/],
    [
      "unknown table",
      ["percentiles", "--table", "x", "--format", "csv"],
      /table: expected one of percentiles, received "x"/,
    ],
    [
      "digits 0",
      ["percentiles", "--digits", "0"],
      /--digits: expected an integer from 1 to 17, received "0"/,
    ],
    [
      "tolerance 0",
      ["percentiles", "--absolute-tolerance", "0"],
      /--absolute-tolerance: expected a number greater than 0/,
    ],
    [
      "negative tolerance",
      ["percentiles", "--relative-tolerance", "-1e-9"],
      /--relative-tolerance: .*received "-1e-9"/,
    ],
    ["nothing to evaluate", ["evaluate", "--laws", "F1"], /--at: expected points/],
    [
      "quantities without points",
      ["evaluate", "--laws", "F1", "--levels", "0.5", "--quantities", "cdf"],
      /--quantities: expected points/,
    ],
    [
      "unknown quantity",
      ["evaluate", "--laws", "F1", "--at", "1", "--quantities", "hazard"],
      /--quantities: expected one of cdf/,
    ],
    [
      "point not a number",
      ["evaluate", "--laws", "F1", "--at", "-1,two"],
      /--at: expected a decimal number, received "two"/,
    ],
    ["point NaN", ["evaluate", "--laws", "F1", "--at", "NaN"], /--at: expected a decimal number/],
  ];

  it.each(cases)("%s", async (_, argv, message) => {
    const { code, out, err, written } = await runInMemory(argv);
    expect(code).toBe(1);
    expect(err).toMatch(message);
    expect(err).not.toMatch(/\n\s+at /);
    expect(out).toBe("");
    expect(written.size).toBe(0);
  });

  it("an unwritable output stops before the work", async () => {
    const { code, err, written } = await runInMemory(["percentiles", "--output", "x.csv"], {
      readOnly: ["x.csv"],
    });
    expect(code).toBe(1);
    expect(err).toMatch(/--output: expected a writable file, received "x.csv"/);
    expect(written.size).toBe(0);
  });
});
