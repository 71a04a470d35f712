/** A progress bar on the standard error for work that takes longer than a second; none without a terminal. */
import { SingleBar } from "cli-progress";
import type { ProgressListener } from "../report/percentiles.ts";
import type { CommandIo } from "./io.ts";

const PATIENCE = 1000;

/** A listener to hand to the work, and an end to call whatever happens. */
export interface Progress {
  readonly listener: ProgressListener;
  /** Shows the bar at once when the next step, which can't report from inside, will take over a second. */
  announce(expectedSeconds: number, done: number, total: number): void;
  end(): void;
}

/** Starts watching; the bar appears with the first report after a second of work, or when it is announced. */
export function watchProgress(io: CommandIo): Progress {
  const start = io.milliseconds();
  let bar: SingleBar | undefined;
  const show = (done: number, total: number): void => {
    bar = new SingleBar({
      stream: io.progressStream,
      format: "computing [{bar}] {value}/{total}",
      clearOnComplete: true,
      hideCursor: false,
      // The library would otherwise take over the interrupt key and leave a timer running.
      gracefulExit: false,
    });
    bar.start(total, done);
  };
  return {
    listener(done, total) {
      if (io.progressStream.isTTY !== true) return;
      if (bar !== undefined) bar.update(done);
      else if (io.milliseconds() - start >= PATIENCE && done < total) show(done, total);
    },
    announce(expectedSeconds, done, total) {
      if (io.progressStream.isTTY !== true || bar !== undefined) return;
      if (expectedSeconds * 1000 >= PATIENCE) show(done, total);
    },
    end() {
      bar?.stop();
    },
  };
}
