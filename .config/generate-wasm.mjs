/**
 * Compiles the AssemblyScript sources into the base64 text of src/core/web-assembly-module.ts. With --check nothing
 * is written: the exit code says whether the file is what the sources give, byte for byte.
 */
import { readFileSync, writeFileSync } from "node:fs";
import asc from "assemblyscript/asc";

const SOURCES = ["src/linalg/assembly/structured-symmetric.ts", "src/special/assembly/airy-pair.ts"];
const TARGET = "src/core/web-assembly-module.ts";
const PAGES = "64"; // as many as core/web-assembly.ts says

let binary;
const { error, stderr } = await asc.main(
  [
    ...SOURCES,
    "--outFile",
    "module.wasm",
    "-O3",
    "--noAssert",
    "--runtime",
    "stub",
    "--enable",
    "simd",
    "--initialMemory",
    PAGES,
    "--maximumMemory",
    PAGES,
  ],
  {
    writeFile: (_name, contents) => {
      binary = contents;
    },
  },
);
if (error) {
  console.error(stderr.toString());
  throw error;
}
const text = `/** Made by \`npm run generate:wasm\` from ${SOURCES.join(" and ")}; not to be edited. */
export const WEB_ASSEMBLY_MODULE =
  "${Buffer.from(binary).toString("base64")}";
`;
if (process.argv.includes("--check")) {
  if (readFileSync(TARGET, "utf8") !== text) {
    console.error(`${TARGET} is not what the sources give: npm run generate:wasm`);
    process.exit(1);
  }
} else writeFileSync(TARGET, text);
console.log(`${binary.length} bytes`);
