/** A progress bar on the standard error for work that takes longer than a second; none without a terminal. */
import { SingleBar } from "cli-progress";
import type { ProgressListener } from "../report/percentiles.ts";
import type { CommandIo } from "./io.ts";

const PATIENCE = 1000;

/** A listener to hand to the work, and an end to call whatever happens. */
export interface Progress {
  readonly listener: ProgressListener;
  end(): void;
}

/** Starts watching; the bar appears with the first report after a second of work. */
export function watchProgress(io: CommandIo): Progress {
  const start = io.milliseconds();
  let bar: SingleBar | undefined;
  return {
    listener(done, total) {
      if (io.progressStream.isTTY !== true) return;
      if (bar === undefined) {
        if (io.milliseconds() - start < PATIENCE || done >= total) return;
        bar = new SingleBar({
          stream: io.progressStream,
          format: "computing [{bar}] {value}/{total}",
          clearOnComplete: true,
          hideCursor: false,
          // The library would otherwise take over the interrupt key and leave a timer running.
          gracefulExit: false,
        });
        bar.start(total, done);
      } else bar.update(done);
    },
    end() {
      bar?.stop();
    },
  };
}
