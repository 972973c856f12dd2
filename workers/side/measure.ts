import { openInBrowser } from "../../src/footage/browser/index.ts";
import { defaultMeasureSettings, measureTrial } from "../../src/pipeline/index.ts";
import type { MeasuredTrial, Progress } from "../../src/quantities/index.ts";
import { failureOf } from "../contract/failure.ts";
import type { MeasureNews, MeasureOrder } from "../contract/measure.ts";
import type { WorkerSidePort } from "../contract/port.ts";
import { transferablesOf } from "../contract/transferables.ts";
import { sha256Of } from "./sha256.ts";

/** Least time between two progress messages of one stage, milliseconds: a page can't show more. */
const quiet_ms = 80;

/** Makes the thread behind `port` a measuring worker: it takes one order, reports progress, and answers once. */
export function serveMeasure(port: WorkerSidePort): void {
  const say = (news: MeasureNews, transfer: Transferable[] = []) => port.postMessage(news, transfer);
  port.onmessage = async ({ data }: MessageEvent<MeasureOrder>) => {
    try {
      const measured = await measure(
        data,
        spaced((progress) => say({ type: "progress", progress })),
      );
      say({ type: "measured", measured }, transferablesOf(measured));
    } catch (error) {
      say({ type: "failed", failure: failureOf(error) });
    }
  };
  say({ type: "ready" });
}

async function measure(order: MeasureOrder, progress: (progress: Progress) => void): Promise<MeasuredTrial> {
  const { recording, trial, tool, warnings } = order;
  progress({ stage: "opening", done: 0, total: null });
  const sha256 = await sha256Of(recording);
  const footage = await openInBrowser(recording, trial.captureFps === null ? {} : { captureFps: trial.captureFps });
  try {
    const ports = { footage, recording: { name: trial.recording, sha256 }, tool };
    const measured = await measureTrial(trial, ports, defaultMeasureSettings, { progress });
    return warnings.length === 0 ? measured : { ...measured, warnings: [...warnings, ...measured.warnings] };
  } finally {
    footage.close();
  }
}

/** Passes on a progress when its stage is new, when it is the last of its stage, or when it is time again. */
function spaced(pass: (progress: Progress) => void): (progress: Progress) => void {
  let stage = "";
  let last_ms = 0;
  return (progress) => {
    const now_ms = performance.now();
    if (progress.stage === stage && progress.done !== progress.total && now_ms - last_ms < quiet_ms) return;
    stage = progress.stage;
    last_ms = now_ms;
    pass(progress);
  };
}
