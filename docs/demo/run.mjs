// The demo: edgelaw on invented data whose truth is known. Leaves HTML reports in demo-report/.
// Run by `npm run demo`, which builds the command line first.
import { spawnSync } from "node:child_process";
import { mkdirSync } from "node:fs";
import { fileURLToPath } from "node:url";

const root = fileURLToPath(new URL("../../", import.meta.url));

function edgelaw(...args) {
  const { status, error } = spawnSync(process.execPath, ["dist/cli.js", ...args], {
    cwd: root,
    stdio: "inherit",
  });
  if (error !== undefined) throw error;
  if (status !== 0) process.exit(status ?? 1);
}

mkdirSync(`${root}demo-report`, { recursive: true });
const real = ["assess", "--data", "docs/demo/array-real.csv"];
const complex = ["assess", "--data", "docs/demo/array-complex.csv", "--field", "complex"];
const noise = ["assess", "--data", "docs/demo/noise-only.csv"];
const peaks = ["assess", "--sample", "docs/demo/peaks.csv", "--law", "F2"];

console.log(
  "An array of 24 sensors listens for a few weak sources in noise (invented data, 180 snapshots).\n",
);
edgelaw(...real);
edgelaw(...real, "--output", "demo-report/report.html");
edgelaw(...complex, "--output", "demo-report/complex.html");
edgelaw(...noise, "--output", "demo-report/noise-only.html");
edgelaw(...peaks, "--output", "demo-report/peaks.html");

console.log(`
The truth that was put into the data (docs/demo/sensor-array.ts):
  array-real.csv, array-complex.csv   3 sources, one strong and two weak
  noise-only.csv                      no source
  peaks.csv                           300 values that follow F2

Reports to open in a browser:
  demo-report/report.html       the real snapshots, the table above with its figures
  demo-report/complex.html      the complex snapshots
  demo-report/noise-only.html   noise alone
  demo-report/peaks.html        a sample against the law F2`);
