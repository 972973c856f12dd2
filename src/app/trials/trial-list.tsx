import type { Dispatch } from "react";
import { findingsOf } from "../findings/findings.ts";
import type { WorkbenchAction } from "../state/workbench-reducer.ts";
import { type OpenTrial, titleOf } from "../state/workbench-state.ts";
import "./trial-list.css";

interface TrialListProps {
  readonly trials: readonly OpenTrial[];
  readonly chosen: number | null;
  readonly dispatch: Dispatch<WorkbenchAction>;
}

/** The open trials, each with where it stands. */
export function TrialList({ trials, chosen, dispatch }: TrialListProps) {
  const unmeasured = trials.filter((trial) => !trial.measured && trial.work.state === "idle");
  return (
    <nav className="trial-list" aria-label="Open trials">
      <ul>
        {trials.map((trial) => (
          <li key={trial.id}>
            <button
              type="button"
              aria-current={trial.id === chosen ? "true" : undefined}
              onClick={() => dispatch({ type: "chosen", id: trial.id })}
            >
              <b>{titleOf(trial)}</b>
              <span>{standing(trial)}</span>
            </button>
          </li>
        ))}
      </ul>
      {unmeasured.length > 1 && (
        <button
          type="button"
          className="first all"
          onClick={() => dispatch({ type: "measure", ids: unmeasured.map((trial) => trial.id) })}
        >
          Measure all {unmeasured.length}
        </button>
      )}
    </nav>
  );
}

/** Where a trial stands, in a few words. */
export function standing({ work, measured, problem, saved }: OpenTrial): string {
  if (work.state === "waiting") return "waiting";
  if (work.state === "running") {
    const { done, total } = work.progress;
    return total ? `${work.progress.stage}, ${Math.floor((100 * done) / total)} %` : work.progress.stage;
  }
  if (problem) return "could not be measured";
  if (!measured) return "not measured";
  const speed = findingsOf(measured)[0];
  return `${speed ? speed.figure : "no cells"}${saved ? "" : ", not saved"}`;
}
