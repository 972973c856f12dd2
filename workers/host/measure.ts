import type { MeasuredTrial, Progress } from "../../src/quantities/index.ts";
import type { MeasureNews, MeasureOrder } from "../contract/measure.ts";
import { oneAnswer, type Run } from "./one-answer.ts";

/** Measures one recording in a worker of its own. */
export function startMeasuring(order: MeasureOrder, progress: (progress: Progress) => void): Run<MeasuredTrial> {
  const worker = new Worker(new URL("../measure.worker.ts", import.meta.url), { type: "module", name: "measure" });
  return oneAnswer(worker, order, (news: MeasureNews) => {
    if (news.type === "progress") progress(news.progress);
    return news.type === "measured" ? news.measured : null;
  });
}
