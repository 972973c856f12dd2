import { describe, expect, it } from "vitest";
import { InputError, Stopped } from "../../src/quantities/index.ts";
import { failureOf } from "../contract/failure.ts";
import { oneAnswer, type WorkerLike } from "./one-answer.ts";

class FakeWorker implements WorkerLike {
  onmessage: WorkerLike["onmessage"] = null;
  onmessageerror: WorkerLike["onmessageerror"] = null;
  onerror: WorkerLike["onerror"] = null;
  readonly heard: unknown[] = [];
  ended = false;
  postMessage(message: unknown): void {
    this.heard.push(message);
  }
  terminate(): void {
    this.ended = true;
  }
  say(data: unknown): void {
    this.onmessage?.({ data } as MessageEvent);
  }
}

type Said = { type: "half" } | { type: "whole"; value: number };
const take = (news: Said) => (news.type === "whole" ? news.value : null);

describe("oneAnswer", () => {
  it("sends the order only when the worker listens, and ends the worker with the answer", async () => {
    const worker = new FakeWorker();
    const { answer } = oneAnswer(worker, "order", take);
    expect(worker.heard).toEqual([]);
    worker.say({ type: "ready" });
    expect(worker.heard).toEqual(["order"]);
    worker.say({ type: "half" });
    expect(worker.ended).toBe(false);
    worker.say({ type: "whole", value: 7 });
    expect(await answer).toBe(7);
    expect(worker.ended).toBe(true);
  });

  it("rejects with what went wrong in the worker", async () => {
    const worker = new FakeWorker();
    const { answer } = oneAnswer(worker, "order", take);
    worker.say({ type: "failed", failure: failureOf(new InputError("x", "What.", "where", "Remedy.")) });
    await expect(answer).rejects.toMatchObject({ name: "InputError", remedy: "Remedy." });
    expect(worker.ended).toBe(true);
  });

  it("ends a busy worker on request", async () => {
    const worker = new FakeWorker();
    const { answer, stop } = oneAnswer(worker, "order", take);
    worker.say({ type: "ready" });
    stop();
    await expect(answer).rejects.toBeInstanceOf(Stopped);
    expect(worker.ended).toBe(true);
  });

  it("says so when the worker dies", async () => {
    const worker = new FakeWorker();
    const { answer } = oneAnswer(worker, "order", take);
    worker.onerror?.({ message: "out of memory" } as ErrorEvent);
    await expect(answer).rejects.toThrow("The worker broke down: out of memory.");
  });
});
