import { useCallback, useEffect, useReducer } from "react";
import { Bench } from "./bench/bench.tsx";
import { Announcer } from "./chrome/announcer.tsx";
import { Catcher } from "./chrome/catcher.tsx";
import { Needle } from "./chrome/needle.tsx";
import { ProblemNote } from "./chrome/problem-note.tsx";
import { demoTrial } from "./opening/demo.ts";
import type { FolderFile } from "./opening/folder-file.ts";
import { OpenButtons } from "./opening/open-buttons.tsx";
import { trialsIn } from "./opening/trials-in.ts";
import { useDrop } from "./opening/use-drop.ts";
import { problemOf } from "./state/problem.ts";
import { useMeasuring } from "./state/use-measuring.ts";
import { workbenchReducer } from "./state/workbench-reducer.ts";
import { chosenTrial, emptyWorkbench, titleOf } from "./state/workbench-state.ts";
import { TrialList } from "./trials/trial-list.tsx";
import { Welcome } from "./welcome.tsx";
import "./workbench.css";

/** The whole page. */
export function Workbench() {
  const [state, dispatch] = useReducer(workbenchReducer, emptyWorkbench);
  const stop = useMeasuring(state.trials, dispatch);
  const open = useCallback(async (files: readonly FolderFile[] | Promise<readonly FolderFile[]>) => {
    try {
      const { sources, problems } = await trialsIn(await files);
      dispatch({ type: "opened", sources, problems });
    } catch (error) {
      dispatch({ type: "went wrong", problem: problemOf("The files could not be read", error) });
    }
  }, []);
  const openDemo = useCallback(async () => {
    try {
      dispatch({ type: "opened", sources: [await demoTrial()], problems: [] });
    } catch (error) {
      dispatch({ type: "went wrong", problem: problemOf("The demo could not be opened", error) });
    }
  }, []);
  const over = useDrop(open);
  const atStake = state.trials.some(({ work, measured, saved }) => work.state !== "idle" || (measured && !saved));
  useLeaveWarning(atStake);
  const trial = chosenTrial(state);

  return (
    <div className="workbench">
      <header className="masthead">
        <p className="mark">
          <Needle angle_deg={28} size={26} />
          Lodewake
        </p>
        {trial && <OpenButtons open={open} openDemo={openDemo} />}
      </header>
      {state.problems.length > 0 && (
        <div className="problems">
          {state.problems.map(({ id, problem }) => (
            <ProblemNote key={id} problem={problem} dismiss={() => dispatch({ type: "dismissed", id })} />
          ))}
        </div>
      )}
      <div className="below">
        {trial && state.trials.length > 1 && (
          <TrialList trials={state.trials} chosen={state.chosen} dispatch={dispatch} />
        )}
        {trial ? (
          <Catcher key={trial.id}>
            <Bench
              trial={trial}
              measure={() => dispatch({ type: "measure", ids: [trial.id] })}
              stop={() => stop(trial.id)}
              close={() => {
                const lost = trial.measured && !trial.saved;
                if (lost && !window.confirm(`The results of ${titleOf(trial)} are not saved. Close it all the same?`))
                  return;
                dispatch({ type: "closed", id: trial.id });
              }}
              describe={(description) => dispatch({ type: "described", id: trial.id, description })}
              saved={() => dispatch({ type: "saved", id: trial.id })}
              failedToSave={(problem) => dispatch({ type: "went wrong", problem })}
            />
          </Catcher>
        ) : (
          <Welcome open={open} openDemo={openDemo} />
        )}
      </div>
      {over && <div className="drop-note">Drop a trial folder or a recording</div>}
      <Announcer trials={state.trials} />
    </div>
  );
}

/** Asks before the page is left while something would be lost. */
function useLeaveWarning(atStake: boolean): void {
  useEffect(() => {
    if (!atStake) return;
    const ask = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener("beforeunload", ask);
    return () => window.removeEventListener("beforeunload", ask);
  }, [atStake]);
}
