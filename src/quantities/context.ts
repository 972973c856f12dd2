import type { AbortSignalLike } from "./errors.ts";

/** How far a stage has come: `done` of `total` in the stage's own unit. `total` is null when not known. */
export interface Progress {
  readonly stage: string;
  readonly done: number;
  readonly total: number | null;
}

/** What a stage may use that can't change a number: a way to be stopped and a way to say how far it is. */
export interface Context {
  readonly signal?: AbortSignalLike;
  readonly progress?: (progress: Progress) => void;
}
