import { defineConfig } from "tsdown";

export default defineConfig({
  cwd: process.cwd(),
  entry: { run: "bench/run.ts" },
  format: "esm",
  platform: "node",
  target: "es2022",
  outDir: "node_modules/.cache/edgelaw-bench",
  dts: false,
  fixedExtension: true,
  clean: true,
});
