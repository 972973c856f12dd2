import { zipSync } from "fflate";
import { type ResultFile, resultFiles } from "../../src/report/index.ts";
import { failureOf } from "../contract/failure.ts";
import type { WorkerSidePort } from "../contract/port.ts";
import type { ResultsNews, ResultsOrder } from "../contract/results.ts";
import { transferablesOf } from "../contract/transferables.ts";

/** Makes the thread behind `port` a results worker: a measured trial in, the files of its result folder out. */
export function serveResults(port: WorkerSidePort): void {
  const say = (news: ResultsNews, transfer: Transferable[] = []) => port.postMessage(news, transfer);
  port.onmessage = ({ data }: MessageEvent<ResultsOrder>) => {
    try {
      const made = resultFiles(data.measured);
      const files = data.as === "zip" ? [{ name: "result.zip", bytes: zipOf(made) }] : made;
      say({ type: "made", files }, transferablesOf(files));
    } catch (error) {
      say({ type: "failed", failure: failureOf(error) });
    }
  };
  say({ type: "ready" });
}

/** All files in one zip. Every file has the same date, the earliest a zip can hold, so that equal files give equal zips. */
export function zipOf(files: readonly ResultFile[]): Uint8Array {
  const entries = Object.fromEntries(files.map(({ name, bytes }) => [name, bytes]));
  return zipSync(entries, { level: 6, mtime: new Date(1980, 0, 1) });
}
