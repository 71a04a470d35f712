/**
 * The rooms and their direction: what may import what, which files may touch the outside world, what lies at the top.
 */
import { readdirSync, readFileSync, statSync } from "node:fs";
import { dirname, join, relative, resolve } from "node:path";
import { fileURLToPath } from "node:url";
import ts from "typescript";
import { describe, expect, it } from "vitest";

const ROOT = resolve(dirname(fileURLToPath(import.meta.url)), "..");
/** Rooms from the ground up: a room imports only from itself and from rooms earlier in the list. */
const ROOMS = [
  "core",
  "parallel",
  "special",
  "linalg",
  "quadrature",
  "approximation",
  "determinant",
  "kernels",
  "precision",
  "laws",
  "exclusion",
  "expansions",
  "assessment",
  "report",
  "cli",
];
const BUILTIN = /^(node:|fs$|path$|os$|process$|url$|child_process$|worker_threads$)/;

interface Reference {
  readonly specifier: string;
  readonly line: number;
}

/** Every module a source text refers to: static, type-only, re-export, dynamic, import types. */
function references(file: string, text: string): Reference[] {
  const source = ts.createSourceFile(file, text, ts.ScriptTarget.Latest, true);
  const found: Reference[] = [];
  const add = (node: ts.Node, specifier: string): void => {
    found.push({ specifier, line: source.getLineAndCharacterOfPosition(node.getStart()).line + 1 });
  };
  const visit = (node: ts.Node): void => {
    if ((ts.isImportDeclaration(node) || ts.isExportDeclaration(node)) && node.moduleSpecifier) {
      if (ts.isStringLiteral(node.moduleSpecifier)) add(node, node.moduleSpecifier.text);
    } else if (ts.isImportTypeNode(node) && ts.isLiteralTypeNode(node.argument)) {
      if (ts.isStringLiteral(node.argument.literal)) add(node, node.argument.literal.text);
    } else if (ts.isCallExpression(node) && node.expression.kind === ts.SyntaxKind.ImportKeyword) {
      const [argument] = node.arguments;
      add(node, argument && ts.isStringLiteral(argument) ? argument.text : "(computed)");
    }
    ts.forEachChild(node, visit);
  };
  visit(source);
  return found;
}

/** What is wrong with one file of src, as sentences. */
function violations(path: string, text: string, dependencies: readonly string[]): string[] {
  const parts = path.split("/"); // src/<room>/<file> or src/index.ts
  const room = parts.length > 2 ? parts[1] : undefined;
  const isBarrel = parts[parts.length - 1] === "index.ts";
  const out: string[] = [];
  if (room !== undefined && !ROOMS.includes(room)) out.push(`${path}: no room is called ${room}`);
  if (room === undefined && path !== "src/index.ts")
    out.push(`${path}: only the barrel lies outside the rooms`);
  for (const { specifier, line } of references(path, text)) {
    const where = `${path}:${line}: ${specifier}`;
    if (specifier === "(computed)") out.push(`${where}: a computed import cannot be checked`);
    else if (BUILTIN.test(specifier)) {
      if (room !== "cli") out.push(`${where}: only cli touches the machine`);
    } else if (specifier.startsWith(".")) {
      const target = relative(".", join(dirname(path), specifier));
      const targetRoom = target.split("/")[1];
      if (!target.startsWith("src/")) out.push(`${where}: leaves src`);
      else if (!target.endsWith(".ts")) out.push(`${where}: a file is imported by its full name`);
      else if (target.endsWith("/index.ts")) out.push(`${where}: import the file, not the barrel`);
      else if (room !== undefined && ROOMS.indexOf(targetRoom) > ROOMS.indexOf(room)) {
        out.push(`${where}: ${room} lies below ${targetRoom}`);
      }
    } else {
      const name = specifier.startsWith("@")
        ? specifier.split("/").slice(0, 2).join("/")
        : specifier.split("/")[0];
      if (!dependencies.includes(name)) out.push(`${where}: not among the dependencies`);
    }
  }
  const code = ts.createSourceFile(path, text, ts.ScriptTarget.Latest, true);
  const visit = (node: ts.Node): void => {
    if (ts.isIdentifier(node) && !isPropertyName(node)) {
      const outside = ["process", "Date", "console", "performance"];
      if (outside.includes(node.text) && room !== "cli") out.push(`${path}: ${node.text} belongs to cli`);
    }
    if (ts.isPropertyAccessExpression(node) && node.getText() === "Math.random")
      out.push(`${path}: Math.random`);
    ts.forEachChild(node, visit);
  };
  visit(code);
  if (isBarrel && room === "cli") out.push(`${path}: cli has no barrel`);
  return out;
}

function isPropertyName(node: ts.Identifier): boolean {
  const { parent } = node;
  return (
    (ts.isPropertyAccessExpression(parent) && parent.name === node) ||
    ((ts.isPropertySignature(parent) || ts.isPropertyAssignment(parent)) && parent.name === node)
  );
}

function filesBelow(folder: string): string[] {
  return readdirSync(join(ROOT, folder)).flatMap((name) => {
    const path = `${folder}/${name}`;
    return statSync(join(ROOT, path)).isDirectory() ? filesBelow(path) : [path];
  });
}

const manifest = JSON.parse(readFileSync(join(ROOT, "package.json"), "utf8"));
const dependencies = Object.keys(manifest.dependencies);

describe("architecture", () => {
  const sources = filesBelow("src").filter((path) => path.endsWith(".ts"));

  it("finds the sources", () => {
    expect(sources.length).toBeGreaterThan(30);
  });

  it("imports only upwards, files not barrels, and touches the machine only in cli", () => {
    const found = sources.flatMap((path) =>
      violations(path, readFileSync(join(ROOT, path), "utf8"), dependencies),
    );
    expect(found).toEqual([]);
  });

  it("catches what it is meant to catch", () => {
    const bad = (path: string, text: string): string => violations(path, text, ["ml-matrix"]).join("\n");
    expect(bad("src/linalg/a.ts", 'import { x } from "../laws/b.ts";')).toContain("linalg lies below laws");
    expect(bad("src/linalg/a.ts", 'import type { X } from "../laws/b.ts";')).toContain("lies below");
    expect(bad("src/linalg/a.ts", 'type X = import("../laws/b.ts").X;')).toContain("lies below");
    expect(bad("src/linalg/a.ts", 'export { x } from "../cli/b.ts";')).toContain("lies below");
    expect(bad("src/linalg/a.ts", 'const x = await import("../cli/b.ts");')).toContain("lies below");
    expect(bad("src/cli/a.ts", 'import { x } from "../laws/index.ts";')).toContain("not the barrel");
    expect(bad("src/laws/a.ts", 'import { readFileSync } from "node:fs";')).toContain("only cli");
    expect(bad("src/laws/a.ts", 'import { x } from "lodash";')).toContain("dependencies");
    expect(bad("src/laws/a.ts", 'import { x } from "../../test/b.ts";')).toContain("leaves src");
    expect(bad("src/laws/a.ts", "const x = Math.random();")).toContain("Math.random");
    expect(bad("src/laws/a.ts", "const x = new Date();")).toContain("Date");
    expect(bad("src/odd/a.ts", "export {};")).toContain("no room");
    expect(
      bad("src/laws/a.ts", 'import { Matrix } from "ml-matrix"; import { x } from "../core/c.ts";'),
    ).toBe("");
  });

  it("pins every dependency exactly", () => {
    const all = { ...manifest.dependencies, ...manifest.devDependencies };
    for (const [name, version] of Object.entries(all)) expect(version, name).toMatch(/^\d+\.\d+\.\d+$/);
  });

  it("keeps the top level to the design card", () => {
    const allowed = [
      "README.md",
      "DEVELOPERS.md",
      "LICENSE",
      "package.json",
      "package-lock.json",
      "tsconfig.json",
      "src",
      "bench",
      "test",
      "docs",
    ];
    const made = ["node_modules", "dist", "demo-report"];
    const found = readdirSync(ROOT).filter((name) => !name.startsWith(".") && !made.includes(name));
    expect(found.filter((name) => !allowed.includes(name))).toEqual([]);
    expect(allowed.filter((name) => !found.includes(name))).toEqual([]);
  });

  it("declares a subpath for every public room", () => {
    const subpaths = Object.keys(manifest.exports).filter((key) => key !== "./package.json");
    const rooms = sources.filter((path) => path.endsWith("/index.ts") && path !== "src/index.ts");
    expect(subpaths.sort()).toEqual([".", ...rooms.map((path) => `./${path.split("/")[1]}`)].sort());
  });
});
