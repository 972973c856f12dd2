import { Stopped } from "../../src/quantities/index.ts";
import { errorOf, type Failure } from "../contract/failure.ts";
import type { Ready } from "../contract/port.ts";

/** Work under way in a worker of its own. */
export interface Run<Answer> {
  /** Rejects with InputError, Stopped, or Error when the tool failed or the worker died. */
  readonly answer: Promise<Answer>;
  /** Ends the worker at once, whatever it is doing; the answer rejects with Stopped. */
  stop(): void;
}

/** The part of a Worker that is used here. */
export interface WorkerLike {
  postMessage(message: unknown, transfer?: Transferable[]): void;
  terminate(): void;
  onmessage: ((event: MessageEvent) => unknown) | null;
  onmessageerror: ((event: MessageEvent) => unknown) | null;
  onerror: ((event: ErrorEvent) => unknown) | null;
}

/** What a worker with one order may say, besides its answer. */
type News<Answer> = Ready | { readonly type: "failed"; readonly failure: Failure } | Answer;

/**
 * Gives one order to a fresh worker once it listens, and ends the worker when it has answered. A worker runs one
 * order only: a decoder in WebAssembly can't hear a request to stop, so that stopping means ending the thread.
 *
 * @param take Looks at each message but ready and failed; returns the answer in it, or null when it isn't one.
 */
export function oneAnswer<Message extends { readonly type: string }, Answer>(
  worker: WorkerLike,
  order: unknown,
  take: (news: Message) => Answer | null,
): Run<Answer> {
  const { promise, resolve, reject } = withResolvers<Answer>();
  const end = (settle: () => void) => {
    worker.onmessage = worker.onerror = worker.onmessageerror = null;
    worker.terminate();
    settle();
  };
  worker.onmessage = ({ data }: MessageEvent<News<Message>>) => {
    if (isFailed(data)) return end(() => reject(errorOf(data.failure)));
    if (data.type === "ready") return worker.postMessage(order);
    const answer = take(data as Message);
    if (answer !== null) end(() => resolve(answer));
  };
  worker.onerror = (event) => {
    event.preventDefault?.();
    end(() => reject(new Error(`The worker broke down: ${event.message || "it could not be loaded"}.`)));
  };
  worker.onmessageerror = () => end(() => reject(new Error("A message of the worker could not be read.")));
  return { answer: promise, stop: () => end(() => reject(new Stopped())) };
}

function isFailed(news: { readonly type: string }): news is { readonly type: "failed"; readonly failure: Failure } {
  return news.type === "failed";
}

function withResolvers<T>() {
  let resolve!: (value: T) => void;
  let reject!: (reason: unknown) => void;
  const promise = new Promise<T>((yes, no) => {
    resolve = yes;
    reject = no;
  });
  return { promise, resolve, reject };
}
