import type { MeasuredTrial, Progress, Warning } from "../../quantities/index.ts";
import type { TrialDescription } from "../../trial/index.ts";
import type { Problem } from "./problem.ts";

/** A trial as it was opened: what its folder says, and the recording. */
export interface TrialSource {
  /** Folder or file it came from, for people. */
  readonly name: string;
  readonly description: TrialDescription;
  readonly recording: File;
  /** What reading the description warned of. */
  readonly warnings: readonly Warning[];
}

/** What is being done with a trial. */
export type Work =
  | { readonly state: "idle" }
  | { readonly state: "waiting" }
  | { readonly state: "running"; readonly progress: Progress; readonly left_s: number | null };

export interface OpenTrial extends TrialSource {
  readonly id: number;
  readonly work: Work;
  /** The last measurement that ended; kept when a later one fails. */
  readonly measured: MeasuredTrial | null;
  readonly saved: boolean;
  /** The description that the measurement went by; null before the first. */
  readonly measuredAs: TrialDescription | null;
  /** Why the last attempt gave nothing; null when it did, or was stopped. */
  readonly problem: Problem | null;
}

export interface WorkbenchState {
  readonly trials: readonly OpenTrial[];
  /** The trial on the bench; null when none is open. */
  readonly chosen: number | null;
  /** What could not be opened or saved, newest last. */
  readonly problems: readonly { readonly id: number; readonly problem: Problem }[];
  readonly nextId: number;
}

export const emptyWorkbench: WorkbenchState = { trials: [], chosen: null, problems: [], nextId: 1 };

/** The trial on the bench. */
export function chosenTrial(state: WorkbenchState): OpenTrial | null {
  return state.trials.find((trial) => trial.id === state.chosen) ?? null;
}

/** True when the description was changed since the measurement that is shown. */
export function isOutdated(trial: OpenTrial): boolean {
  return trial.measured !== null && trial.measuredAs !== trial.description;
}

/** How the trial is called: as its description names it, else by its folder or file. */
export function titleOf(trial: TrialSource): string {
  return trial.description.trial ?? trial.name;
}
