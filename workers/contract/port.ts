/** The end of a message channel that a worker holds; the global scope of a dedicated worker fits. */
export interface WorkerSidePort {
  postMessage(message: unknown, transfer?: Transferable[]): void;
  onmessage: ((event: MessageEvent) => unknown) | null;
}

/** First message of every worker: it listens now. Work sent earlier could be missed. */
export interface Ready {
  readonly type: "ready";
}
