import { Icon } from "../chrome/icon.tsx";
import { ProblemNote } from "../chrome/problem-note.tsx";
import { SaveButtons } from "../saving/save-buttons.tsx";
import type { Problem } from "../state/problem.ts";
import type { OpenTrial } from "../state/workbench-state.ts";
import { isOutdated, titleOf } from "../state/workbench-state.ts";
import { WorkLine } from "./work-line.tsx";

export interface TrialHeadProps {
  readonly trial: OpenTrial;
  readonly measure: () => void;
  readonly stop: () => void;
  readonly close: () => void;
  readonly saved: () => void;
  readonly failedToSave: (problem: Problem) => void;
}

/** Which trial is on the bench, and what can be done with it. */
export function TrialHead({ trial, measure, stop, close, saved, failedToSave }: TrialHeadProps) {
  const { strain, culture, condition, recording } = trial.description;
  const about = [strain, culture, condition, recording].filter((it) => it !== null && it !== titleOf(trial));
  const busy = trial.work.state !== "idle";
  return (
    <header className="trial-head">
      <button
        type="button"
        className="quiet square"
        aria-label="Close this trial"
        title="Close this trial"
        onClick={close}
      >
        <Icon name="close" />
      </button>
      <h2>{titleOf(trial)}</h2>
      <p>{about.join(" · ")}</p>
      {trial.problem && <ProblemNote problem={trial.problem} />}
      {busy ? (
        <WorkLine work={trial.work} stop={stop} />
      ) : (
        <div className="actions">
          {(!trial.measured || isOutdated(trial)) && (
            <button type="button" className="first" onClick={measure}>
              {trial.measured || trial.problem ? "Measure again" : "Measure"}
            </button>
          )}
          {trial.measured && (
            <SaveButtons measured={trial.measured} name={titleOf(trial)} saved={saved} failed={failedToSave} />
          )}
          {trial.measured && !isOutdated(trial) && (
            <button type="button" className="quiet" aria-label="Measure again" title="Measure again" onClick={measure}>
              <Icon name="again" />
            </button>
          )}
        </div>
      )}
      {isOutdated(trial) && !busy && (
        <p className="outdated">Scale or rate was changed since. What is shown was measured before.</p>
      )}
    </header>
  );
}
