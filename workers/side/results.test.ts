import { unzipSync } from "fflate";
import { describe, expect, it } from "vitest";
import { type ResultFile, resultFiles } from "../../src/report/index.ts";
import { exampleTrial } from "../../tests/helpers/example-trial.ts";
import type { WorkerSidePort } from "../contract/port.ts";
import type { ResultsNews, ResultsOrder } from "../contract/results.ts";
import { serveResults, zipOf } from "./results.ts";

/** A worker's side of a channel whose messages are kept. */
function keptPort(): WorkerSidePort & { news: ResultsNews[]; take(order: ResultsOrder): void } {
  const news: ResultsNews[] = [];
  return {
    news,
    onmessage: null,
    postMessage: (message) => news.push(message as ResultsNews),
    take(order) {
      this.onmessage?.({ data: order } as MessageEvent);
    },
  };
}

function expectSame(files: readonly ResultFile[], expected: readonly ResultFile[]): void {
  expect(files.map((file) => file.name)).toEqual(expected.map((file) => file.name));
  for (const [i, { bytes }] of files.entries()) expect(Buffer.from(bytes).equals(expected[i]!.bytes)).toBe(true);
}

describe("serveResults", () => {
  it("says that it is ready, then gives the files that the report gives", () => {
    const port = keptPort();
    serveResults(port);
    expect(port.news).toEqual([{ type: "ready" }]);
    port.take({ measured: exampleTrial(), as: "files" });
    const made = port.news[1];
    if (made?.type !== "made") throw new Error("no files were made");
    expectSame(made.files, resultFiles(exampleTrial()));
  });

  it("zips them, always to the same bytes", () => {
    const files = resultFiles(exampleTrial());
    const zip = zipOf(files);
    expect(Buffer.from(zipOf(files)).equals(zip)).toBe(true);
    expectSame(
      Object.entries(unzipSync(zip)).map(([name, bytes]) => ({ name, bytes })),
      files,
    );
  });

  it("reports a measurement that can't be written as a fault", () => {
    const port = keptPort();
    serveResults(port);
    const measured = exampleTrial();
    port.take({ measured: { ...measured, speed: { ...measured.speed!, median_px_s: Number.NaN } }, as: "files" });
    expect(port.news[1]).toMatchObject({ type: "failed", failure: { kind: "fault" } });
  });
});
