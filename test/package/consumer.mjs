/**
 * Uses the packed package as a stranger would: packs it, unpacks the tarball into an empty folder, type-checks a small
 * consumer with NodeNext resolution, runs it, imports every subpath and starts the command.
 */
import { execFileSync } from "node:child_process";
import {
  existsSync,
  mkdirSync,
  mkdtempSync,
  readFileSync,
  rmSync,
  symlinkSync,
  writeFileSync,
} from "node:fs";
import { tmpdir } from "node:os";
import { dirname, join, resolve } from "node:path";
import { fileURLToPath } from "node:url";

const root = resolve(dirname(fileURLToPath(import.meta.url)), "..", "..");
const manifest = JSON.parse(readFileSync(join(root, "package.json"), "utf8"));
const folder = mkdtempSync(join(tmpdir(), "edgelaw-consumer-"));
const run = (command, args, cwd = folder) => execFileSync(command, args, { cwd, encoding: "utf8" });

try {
  const [{ filename, files }] = JSON.parse(
    run("npm", ["pack", "--json", "--pack-destination", folder], root),
  );
  const stray = files
    .map((file) => file.path)
    .filter((path) => !/^(dist\/|README\.md|LICENSE|package\.json|docs\/changelog\.md)/.test(path));
  if (stray.length > 0) throw new Error(`files that should not be in the package: ${stray.join(", ")}`);
  const home = join(folder, "node_modules", "edgelaw");
  mkdirSync(home, { recursive: true });
  run("tar", ["-xzf", join(folder, filename), "-C", home, "--strip-components=1"]);
  // Its dependencies, as installed here; the consumer's own resolution finds them beside the package.
  for (const name of Object.keys(manifest.dependencies)) {
    const link = join(folder, "node_modules", name);
    mkdirSync(dirname(link), { recursive: true });
    if (!existsSync(link)) symlinkSync(join(root, "node_modules", name), link, "dir");
  }
  writeFileSync(join(folder, "package.json"), JSON.stringify({ type: "module", private: true }));
  writeFileSync(
    join(folder, "tsconfig.json"),
    JSON.stringify({
      compilerOptions: {
        target: "ES2022",
        module: "NodeNext",
        moduleResolution: "NodeNext",
        strict: true,
        outDir: "out",
        types: [],
      },
      include: ["consumer.ts"],
    }),
  );
  writeFileSync(
    join(folder, "consumer.ts"),
    `import { airyKernel, type Estimate, fredholmDeterminant, gaussLegendre, halfLine, type Law, tracyWidom } from "edgelaw";
import { rootConstants } from "edgelaw/assessment";
import { airyAi } from "edgelaw/special";
const law: Law = tracyWidom(4, { scaling: "unscaled" });
const tail: Estimate = law.estimate("survival", 1);
const d = fredholmDeterminant(airyKernel(), halfLine(-2), { relTol: 1e-12 });
// @ts-expect-error β = 3 is not a law
const wrong = (): Law => tracyWidom(3);
if (Math.abs(d.value - 0.413224142505122) > 1e-14) throw new Error("F2(-2)");
if (!(tail.error > 0) || gaussLegendre(3).nodes.length !== 3 || !(airyAi(0) > 0.35)) throw new Error("values");
if (!(rootConstants(10, 10, false, "classical").centre > 37) || typeof wrong !== "function") throw new Error("constants");
`,
  );
  run(process.execPath, [join(root, "node_modules", "typescript", "bin", "tsc"), "-p", "."]);
  run(process.execPath, ["out/consumer.js"]);
  for (const subpath of Object.keys(manifest.exports)) {
    if (subpath === "./package.json") continue;
    const name = subpath === "." ? "edgelaw" : `edgelaw${subpath.slice(1)}`;
    const count = run(process.execPath, [
      "--input-type=module",
      "-e",
      `import * as it from ${JSON.stringify(name)}; console.log(Object.keys(it).length)`,
    ]);
    if (!(Number(count) > 0)) throw new Error(`${name} exports nothing`);
    console.log(`${name}: ${count.trim()} exports`);
  }
  const version = run(process.execPath, [join(home, manifest.bin.edgelaw), "--version"]).trim();
  if (version !== manifest.version) throw new Error(`edgelaw --version printed ${version}`);
  const help = run(process.execPath, [join(home, manifest.bin.edgelaw), "--help"]);
  if (!help.includes("percentiles")) throw new Error("edgelaw --help says nothing");
  console.log(`edgelaw --version: ${version}`);
} finally {
  rmSync(folder, { recursive: true, force: true });
}
