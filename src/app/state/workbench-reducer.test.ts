import { describe, expect, it } from "vitest";
import { exampleTrial } from "../../../tests/helpers/example-trial.ts";
import { bareTrial } from "../../trial/index.ts";
import type { Problem } from "./problem.ts";
import { type WorkbenchAction, workbenchReducer } from "./workbench-reducer.ts";
import {
  chosenTrial,
  emptyWorkbench,
  isOutdated,
  type TrialSource,
  titleOf,
  type WorkbenchState,
} from "./workbench-state.ts";

const source = (name: string): TrialSource => ({
  name,
  description: bareTrial(`${name}.mp4`),
  recording: new File([], `${name}.mp4`),
  warnings: [],
});
const problem: Problem = { title: "x could not be opened", what: "w", where: "", remedy: "r", detail: "" };
const as = bareTrial("a.mp4");
const progress = { stage: "finding cells", done: 3, total: 10 };

function stateAfter(...actions: WorkbenchAction[]): WorkbenchState {
  return actions.reduce(workbenchReducer, emptyWorkbench);
}
const two: WorkbenchAction = { type: "opened", sources: [source("a"), source("b")], problems: [] };

describe("workbenchReducer", () => {
  it("opens trials beside those that are open and puts the first new one on the bench", () => {
    const state = stateAfter(two, { type: "opened", sources: [source("c")], problems: [] });
    expect(state.trials.map((trial) => trial.name)).toEqual(["a", "b", "c"]);
    expect(new Set(state.trials.map((trial) => trial.id)).size).toBe(3);
    expect(chosenTrial(state)?.name).toBe("c");
  });

  it("keeps what is open when something else can't be opened", () => {
    const state = stateAfter(two, { type: "opened", sources: [], problems: [problem] });
    expect(state.trials).toHaveLength(2);
    expect(chosenTrial(state)?.name).toBe("a");
    expect(state.problems.map((it) => it.problem)).toEqual([problem]);
    expect(workbenchReducer(state, { type: "dismissed", id: state.problems[0]!.id }).problems).toEqual([]);
  });

  it("takes a trial from waiting through running to measured", () => {
    const waiting = stateAfter(two, { type: "measure", ids: [1, 2] });
    expect(waiting.trials.map((trial) => trial.work.state)).toEqual(["waiting", "waiting"]);
    const running = workbenchReducer(waiting, { type: "progressed", id: 1, progress, left_s: 4 });
    expect(running.trials[0]!.work).toEqual({ state: "running", progress, left_s: 4 });
    expect(workbenchReducer(running, { type: "measure", ids: [1] }).trials[0]!.work.state).toBe("running");
    const measured = exampleTrial();
    const done = workbenchReducer(running, { type: "measured", id: 1, measured, as });
    expect(done.trials[0]).toMatchObject({ work: { state: "idle" }, saved: false });
    expect(done.trials[0]!.measured).toBe(measured);
    expect(workbenchReducer(done, { type: "saved", id: 1 }).trials[0]!.saved).toBe(true);
  });

  it("keeps the earlier measurement when a later one fails or is stopped", () => {
    const measured = exampleTrial();
    const had = stateAfter(two, { type: "measured", id: 1, measured, as }, { type: "measure", ids: [1] });
    const failed = workbenchReducer(had, { type: "failed", id: 1, problem });
    expect(failed.trials[0]).toMatchObject({ work: { state: "idle" }, problem });
    expect(failed.trials[0]!.measured).toBe(measured);
    const stopped = workbenchReducer(had, { type: "stopped", id: 1 });
    expect(stopped.trials[0]).toMatchObject({ work: { state: "idle" }, problem: null });
    expect(stopped.trials[0]!.measured).toBe(measured);
  });

  it("knows when the description was changed after measuring", () => {
    const measured = exampleTrial();
    const state = stateAfter(two, { type: "described", id: 1, description: as });
    expect(isOutdated(state.trials[0]!)).toBe(false);
    const done = workbenchReducer(state, { type: "measured", id: 1, measured, as });
    expect(isOutdated(done.trials[0]!)).toBe(false);
    const changed = workbenchReducer(done, { type: "described", id: 1, description: { ...as, captureFps: 240 } });
    expect(isOutdated(changed.trials[0]!)).toBe(true);
    expect(changed.trials[0]!.measured).toBe(measured);
  });

  it("puts the neighbour on the bench when the trial on it is closed", () => {
    const state = stateAfter(two, { type: "chosen", id: 2 }, { type: "closed", id: 2 });
    expect(chosenTrial(state)?.name).toBe("a");
    expect(workbenchReducer(state, { type: "closed", id: 1 }).chosen).toBeNull();
  });

  it("calls a trial by its own name, else by where it came from", () => {
    expect(titleOf(source("a"))).toBe("a");
    expect(titleOf({ ...source("a"), description: { ...bareTrial("a.mp4"), trial: "T07" } })).toBe("T07");
  });
});
