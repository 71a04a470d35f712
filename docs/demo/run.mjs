// The demo: edgelaw on invented data whose truth is known. Leaves HTML reports in demo-report/.
// Run by `npm run demo`, which builds the command line first.
import { spawnSync } from "node:child_process";
import { mkdirSync } from "node:fs";
import { fileURLToPath } from "node:url";

const root = fileURLToPath(new URL("../../", import.meta.url));

/** Runs the command line and returns what it printed. */
function edgelaw(...args) {
  const { status, error, stdout } = spawnSync(process.execPath, ["dist/cli.js", ...args], {
    cwd: root,
    encoding: "utf8",
    stdio: ["ignore", "pipe", "inherit"],
  });
  if (error !== undefined) throw error;
  if (status !== 0) process.exit(status ?? 1);
  return stdout;
}

mkdirSync(`${root}demo-report`, { recursive: true });
const level = ["--level", "0.01"];
const real = ["assess", "--data", "docs/demo/array-real.csv", ...level];
const complex = ["assess", "--data", "docs/demo/array-complex.csv", ...level];
const noise = ["assess", "--data", "docs/demo/noise-only.csv", ...level];
const peaks = ["assess", "--sample", "docs/demo/peaks.csv", "--law", "F2", ...level];

console.log("An array of 24 sensors listens for a few weak sources in noise (invented data, 180 snapshots).");
console.log(`$ edgelaw ${real.join(" ")}\n`);
// The table; the assumptions and the provenance beneath it are in the report.
console.log(edgelaw(...real).split("\nWhat this rests on\n")[0]);
edgelaw(...real, "--output", "demo-report/report.html");
edgelaw(...complex, "--output", "demo-report/complex.html");
edgelaw(...noise, "--output", "demo-report/noise-only.html");
edgelaw(...peaks, "--output", "demo-report/peaks.html");

console.log(`The truth that was put into the data (docs/demo/sensor-array.ts):
  array-real.csv, array-complex.csv   3 sources, one strong and two weak
  noise-only.csv                      no source
  peaks.csv                           300 largest eigenvalues of Gaussian matrices, nearly F2

Reports to open in a browser:
  demo-report/report.html       the real snapshots, the table above with its figures
  demo-report/complex.html      the complex snapshots
  demo-report/noise-only.html   noise alone
  demo-report/peaks.html        a sample against the law F2`);
