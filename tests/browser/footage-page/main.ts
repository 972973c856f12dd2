import type { Outcome, Task } from "./reader.worker.ts";

/** Hands the picked recording and a task to a fresh worker and waits for what it answers. */
function run(task: Omit<Task, "file">): Promise<Outcome> {
  const file = document.querySelector<HTMLInputElement>("#recording")?.files?.[0];
  if (!file) throw new Error("no recording was picked");
  const worker = new Worker(new URL("./reader.worker.ts", import.meta.url), { type: "module" });
  return new Promise<Outcome>((resolve, reject) => {
    worker.onmessage = ({ data }: MessageEvent<Outcome>) => resolve(data);
    worker.onerror = ({ message }) => reject(new Error(message));
    worker.postMessage({ ...task, file } satisfies Task);
  }).finally(() => worker.terminate());
}

declare global {
  interface Window {
    run: typeof run;
  }
}

window.run = run;
