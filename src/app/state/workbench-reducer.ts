import type { MeasuredTrial, Progress } from "../../quantities/index.ts";
import type { TrialDescription } from "../../trial/index.ts";
import type { Problem } from "./problem.ts";
import type { OpenTrial, TrialSource, WorkbenchState } from "./workbench-state.ts";

export type WorkbenchAction =
  | { readonly type: "opened"; readonly sources: readonly TrialSource[]; readonly problems: readonly Problem[] }
  | { readonly type: "chosen"; readonly id: number }
  | { readonly type: "closed"; readonly id: number }
  /** Someone stated scale or rate by hand. */
  | { readonly type: "described"; readonly id: number; readonly description: TrialDescription }
  | { readonly type: "measure"; readonly ids: readonly number[] }
  | {
      readonly type: "progressed";
      readonly id: number;
      readonly progress: Progress;
      readonly left_s: number | null;
    }
  | {
      readonly type: "measured";
      readonly id: number;
      readonly measured: MeasuredTrial;
      /** The description it went by. */
      readonly as: TrialDescription;
    }
  | { readonly type: "failed"; readonly id: number; readonly problem: Problem }
  | { readonly type: "stopped"; readonly id: number }
  | { readonly type: "saved"; readonly id: number }
  | { readonly type: "went wrong"; readonly problem: Problem }
  | { readonly type: "dismissed"; readonly id: number };

/** What becomes of the workbench. Pure. A measurement that was had is never lost to a later failure or stop. */
export function workbenchReducer(state: WorkbenchState, action: WorkbenchAction): WorkbenchState {
  switch (action.type) {
    case "opened":
      return opened(state, action.sources, action.problems);
    case "chosen":
      return { ...state, chosen: action.id };
    case "closed":
      return closed(state, action.id);
    case "described":
      return changed(state, [action.id], (trial) => ({ ...trial, description: action.description }));
    case "measure":
      return changed(state, action.ids, (trial) =>
        trial.work.state === "idle" ? { ...trial, work: { state: "waiting" } } : trial,
      );
    case "progressed":
      return changed(state, [action.id], (trial) => ({
        ...trial,
        problem: null,
        work: { state: "running", progress: action.progress, left_s: action.left_s },
      }));
    case "measured":
      return changed(state, [action.id], (trial) => ({
        ...trial,
        work: { state: "idle" },
        measured: action.measured,
        measuredAs: action.as,
        saved: false,
        problem: null,
      }));
    case "failed":
      return changed(state, [action.id], (trial) => ({ ...trial, work: { state: "idle" }, problem: action.problem }));
    case "stopped":
      return changed(state, [action.id], (trial) => ({ ...trial, work: { state: "idle" } }));
    case "saved":
      return changed(state, [action.id], (trial) => ({ ...trial, saved: true }));
    case "went wrong":
      return withProblems(state, [action.problem]);
    case "dismissed":
      return { ...state, problems: state.problems.filter(({ id }) => id !== action.id) };
  }
}

function opened(state: WorkbenchState, sources: readonly TrialSource[], problems: readonly Problem[]): WorkbenchState {
  const fresh = sources.map(
    (source, i): OpenTrial => ({
      ...source,
      id: state.nextId + i,
      work: { state: "idle" },
      measured: null,
      saved: false,
      measuredAs: null,
      problem: null,
    }),
  );
  const next = {
    ...state,
    trials: [...state.trials, ...fresh],
    chosen: fresh[0]?.id ?? state.chosen,
    nextId: state.nextId + fresh.length,
  };
  return withProblems(next, problems);
}

function closed(state: WorkbenchState, id: number): WorkbenchState {
  const at = state.trials.findIndex((trial) => trial.id === id);
  const trials = state.trials.filter((trial) => trial.id !== id);
  if (state.chosen !== id) return { ...state, trials };
  return { ...state, trials, chosen: (trials[at] ?? trials.at(-1))?.id ?? null };
}

function withProblems(state: WorkbenchState, problems: readonly Problem[]): WorkbenchState {
  const numbered = problems.map((problem, i) => ({ id: state.nextId + i, problem }));
  return { ...state, problems: [...state.problems, ...numbered], nextId: state.nextId + problems.length };
}

function changed(
  state: WorkbenchState,
  ids: readonly number[],
  change: (trial: OpenTrial) => OpenTrial,
): WorkbenchState {
  return { ...state, trials: state.trials.map((trial) => (ids.includes(trial.id) ? change(trial) : trial)) };
}
