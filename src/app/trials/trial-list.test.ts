import { describe, expect, it } from "vitest";
import { emptyScene, exampleTrial } from "../../../tests/helpers/example-trial.ts";
import { bareTrial } from "../../trial/index.ts";
import { workbenchReducer } from "../state/workbench-reducer.ts";
import { emptyWorkbench, type OpenTrial } from "../state/workbench-state.ts";
import { standing } from "./trial-list.tsx";

const description = bareTrial("a.mp4");
const source = { name: "a", description, recording: new File([], "a.mp4"), warnings: [] };
const opened = workbenchReducer(emptyWorkbench, { type: "opened", sources: [source], problems: [] }).trials[0]!;
const with_ = (changes: Partial<OpenTrial>) => standing({ ...opened, ...changes });

describe("standing", () => {
  it("follows a trial from opened to saved", () => {
    expect(with_({})).toBe("not measured");
    expect(with_({ work: { state: "waiting" } })).toBe("waiting");
    const progress = { stage: "finding cells", done: 219, total: 600 };
    expect(with_({ work: { state: "running", progress, left_s: null } })).toBe("finding cells, 36 %");
    expect(with_({ measured: exampleTrial() })).toMatch(/^[\d.]+ µm\/s, not saved$/);
    expect(with_({ measured: exampleTrial(), saved: true })).toMatch(/µm\/s$/);
    expect(with_({ measured: emptyScene(), saved: true })).toBe("no cells");
  });
});
