import type { MeasuredTrial, Progress, Warning } from "../../src/quantities/index.ts";
import type { TrialDescription } from "../../src/trial/index.ts";
import type { Failure } from "./failure.ts";
import type { Ready } from "./port.ts";

/** The one order a measuring worker takes: measure this recording as this trial describes it. */
export interface MeasureOrder {
  readonly recording: File;
  readonly trial: TrialDescription;
  readonly tool: { readonly name: string; readonly version: string };
  /** What reading the trial's description already warned of; it goes in front of the measurement's own warnings. */
  readonly warnings: readonly Warning[];
}

/** What a measuring worker says: ready once, progress many times, then one of measured and failed. */
export type MeasureNews =
  | Ready
  | { readonly type: "progress"; readonly progress: Progress }
  | { readonly type: "measured"; readonly measured: MeasuredTrial }
  | { readonly type: "failed"; readonly failure: Failure };
