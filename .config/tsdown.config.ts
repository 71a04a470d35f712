import { defineConfig } from "tsdown";

export default defineConfig({
  cwd: process.cwd(),
  entry: {
    index: "src/index.ts",
    quadrature: "src/quadrature/index.ts",
    special: "src/special/index.ts",
    determinant: "src/determinant/index.ts",
    kernels: "src/kernels/index.ts",
    precision: "src/precision/index.ts",
    laws: "src/laws/index.ts",
    assessment: "src/assessment/index.ts",
    report: "src/report/index.ts",
    cli: "src/cli/main.ts",
  },
  format: "esm",
  platform: "neutral",
  // Only the command line touches the machine; a test walks the imports.
  deps: { neverBundle: [/^node:/] },
  target: "es2022",
  outDir: "dist",
  dts: true,
  clean: true,
  sourcemap: false,
  fixedExtension: false,
});
