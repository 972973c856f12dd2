import type { Progress } from "./context.ts";

/** Watches the progress of a run and says how long its present stage will still take. */
export interface TimeLeft {
  /** Seconds the stage has left, by its own pace so far; null while nothing can be said. `now_s` never goes back. */
  after(progress: Progress, now_s: number): number | null;
}

/** A stage must have run this long before its pace means anything, seconds. */
const shortest_s = 1;

/**
 * Time left in the present stage: what is left to do over the pace of the stage. Stages differ in pace, so that each
 * starts anew.
 */
export function timeLeft(): TimeLeft {
  let stage: string | null = null;
  let start = { done: 0, now_s: 0 };
  return {
    after({ stage: present, done, total }, now_s) {
      if (present !== stage) {
        stage = present;
        start = { done, now_s };
      }
      const spent_s = now_s - start.now_s;
      const did = done - start.done;
      if (total === null || did <= 0 || spent_s < shortest_s) return null;
      return (Math.max(0, total - done) * spent_s) / did;
    },
  };
}
