/**
 * The examples in README.md and docs/guide.md run, and print what they say: a comment `// 0.123…` behind an expression
 * holds the first digits of its value.
 */
import { readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import ts from "typescript";
import { describe, expect, it } from "vitest";
import * as assessment from "../src/assessment/index.ts";
import * as common from "../src/index.ts";
import * as precision from "../src/precision/index.ts";

const modules: Readonly<Record<string, object>> = {
  edgelaw: common,
  "edgelaw/assessment": assessment,
  "edgelaw/precision": precision,
};
const csvText = "1,2,3\n2,1,4\n0,3,1\n5,2,2\n1,1,0\n";

function blocks(path: string): string[] {
  const text = readFileSync(fileURLToPath(new URL(`../${path}`, import.meta.url)), "utf8");
  return [...text.matchAll(/```ts\n([\s\S]*?)```/g)].map((match) => match[1]);
}

/** Names an example brings in, and its code without imports, every claimed value handed to `claim`. */
function prepare(code: string): { names: string[]; body: string } {
  const names: string[] = [];
  const withoutImports = code.replace(
    /import \{([^}]*)\} from "([^"]+)";\n/g,
    (_, list: string, from: string) => {
      for (const name of list.split(",").map((word) => word.trim())) {
        if (name === "") continue; // a trailing comma
        expect(Object.keys(modules[from]), `${name} from ${from}`).toContain(name);
        names.push(name);
      }
      return "";
    },
  );
  const texts = withoutImports.replace(
    /^([\w"[].*); \/\/ ("[^"]+")$/gm,
    (_, expression: string, text: string) => `claimText(${expression}, ${text});`,
  );
  const body = texts.replace(
    /^([\w"[].*); \/\/ ([−-]?\d+\.\d+)(…?)(e[−-]?\d+)?.*$/gm,
    (_, expression: string, digits: string, _more: string, exponent = "") =>
      `claim(${expression}, ${JSON.stringify(`${digits}|${exponent}`.replaceAll("−", "-"))});`,
  );
  return { names, body };
}

describe.each(["README.md", "docs/guide.md"])("%s", (path) => {
  it("has examples that run and hold", () => {
    const all: Record<string, unknown> = { ...common, ...assessment, ...precision, csvText };
    let claims = 0;
    const claim = (value: unknown, text: string): void => {
      claims++;
      const [digits, exponent] = text.split("|");
      const claimed = Number(digits + exponent);
      const places = digits.split(".")[1]?.length ?? 0;
      const unit = 10 ** (Number(exponent.slice(1) || 0) - places);
      expect(Math.abs((value as number) - claimed), `${text}: ${value}`).toBeLessThanOrEqual(unit);
    };
    const claimText = (value: unknown, text: string): void => {
      claims++;
      expect(value).toBe(text);
    };
    // Later blocks of a page use names of earlier ones: one scope for the page.
    const prepared = blocks(path).map(prepare);
    expect(prepared.length).toBeGreaterThan(0);
    const source = prepared.map(({ body }) => body).join("\n");
    const script = ts.transpileModule(source, {
      compilerOptions: { target: ts.ScriptTarget.ES2022 },
    }).outputText;
    const names = Object.keys(all);
    new Function(...names, "claim", "claimText", script)(...names.map((name) => all[name]), claim, claimText);
    expect(claims).toBeGreaterThan(2);
  });
});
