// Writes the demo's data files anew: node docs/demo/generate.mjs
import { writeFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { runnerImport } from "vite";

const { module } = await runnerImport(fileURLToPath(new URL("sensor-array.ts", import.meta.url)));
for (const [name, text] of Object.entries(module.demoFiles())) {
  writeFileSync(new URL(name, import.meta.url), text);
  console.log(`${name}: ${text.length} bytes`);
}
