import { type Dispatch, useEffect, useRef } from "react";
import { version } from "../../../package.json";
import { type Run, startMeasuring } from "../../../workers/index.ts";
import { type MeasuredTrial, Stopped, timeLeft } from "../../quantities/index.ts";
import { problemOf } from "./problem.ts";
import type { WorkbenchAction } from "./workbench-reducer.ts";
import { type OpenTrial, titleOf } from "./workbench-state.ts";

const tool = { name: "lodewake", version };

/**
 * Measures the trials that wait, one after the other.
 * @returns what stops a trial that is measured or waits
 */
export function useMeasuring(trials: readonly OpenTrial[], dispatch: Dispatch<WorkbenchAction>): (id: number) => void {
  const running = useRef<{ readonly id: number; readonly run: Run<MeasuredTrial> } | null>(null);

  useEffect(() => {
    // A trial that was closed takes its measurement with it.
    const present = running.current;
    if (present && !trials.some((trial) => trial.id === present.id)) present.run.stop();
    const next = trials.find((trial) => trial.work.state === "waiting");
    if (running.current || !next) return;
    const run = start(next, dispatch);
    running.current = { id: next.id, run };
    const { id, description } = next;
    run.answer
      .then(
        (measured): WorkbenchAction => ({ type: "measured", id, measured, as: description }),
        (error): WorkbenchAction =>
          error instanceof Stopped
            ? { type: "stopped", id }
            : { type: "failed", id, problem: problemOf(`${titleOf(next)} could not be measured`, error) },
      )
      .then((outcome) => {
        running.current = null;
        dispatch(outcome);
      });
  }, [trials, dispatch]);

  return (id) => {
    if (running.current?.id === id) running.current.run.stop();
    else dispatch({ type: "stopped", id });
  };
}

function start({ id, recording, description, warnings }: OpenTrial, dispatch: Dispatch<WorkbenchAction>) {
  const left = timeLeft();
  const opening = { stage: "opening", done: 0, total: null };
  dispatch({ type: "progressed", id, progress: opening, left_s: null });
  return startMeasuring({ recording, trial: description, tool, warnings }, (progress) =>
    dispatch({ type: "progressed", id, progress, left_s: left.after(progress, performance.now() / 1000) }),
  );
}
