#!/usr/bin/env node
/** Entry of the command line: hands the process to `run` and its exit code back. */
import { nodeIo } from "./io.ts";
import { run } from "./run.ts";

// A reader that stops early (`edgelaw … | head`) is no failure.
for (const stream of [process.stdout, process.stderr]) {
  stream.on("error", (error: NodeJS.ErrnoException) => {
    if (error.code !== "EPIPE") throw error;
  });
}
process.exitCode = await run(process.argv.slice(2), nodeIo());
