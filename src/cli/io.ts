import type { Progress } from "../quantities/index.ts";

/** Where a command writes: results to standard output, everything else to standard error. */
export interface Io {
  /** A line of the result. */
  out(text: string): void;
  /** A line for whoever watches: warnings, notes. Left out with `--json`. */
  note(text: string): void;
  progress(progress: Progress): void;
}
