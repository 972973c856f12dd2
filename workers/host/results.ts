import type { ResultFile } from "../../src/report/index.ts";
import type { ResultsNews, ResultsOrder } from "../contract/results.ts";
import { oneAnswer, type Run } from "./one-answer.ts";

/** Makes the result files of a measured trial in a worker of its own: the page stays quick, and loads none of it. */
export function startMakingResults(order: ResultsOrder): Run<readonly ResultFile[]> {
  const worker = new Worker(new URL("../results.worker.ts", import.meta.url), { type: "module", name: "results" });
  return oneAnswer(worker, order, (news: ResultsNews) => (news.type === "made" ? news.files : null));
}
