import { describe, expect, it } from "vitest";
import { firstLook, type Viewing, viewingReducer } from "./viewing.ts";

const ten: Viewing = viewingReducer(firstLook, { type: "counted", frames: 10 });

describe("viewingReducer", () => {
  it("stays inside the recording", () => {
    expect(viewingReducer(ten, { type: "stepped", by: -10 }).frame).toBe(0);
    expect(viewingReducer(ten, { type: "stepped", by: 100 }).frame).toBe(9);
    expect(viewingReducer(ten, { type: "went", frame: 3.4 }).frame).toBe(3);
    expect(viewingReducer({ ...ten, frame: 9 }, { type: "counted", frames: 4 }).frame).toBe(3);
  });

  it("pauses when a frame is chosen by hand, and at the last frame", () => {
    const playing = viewingReducer(ten, { type: "play toggled" });
    expect(playing.playing).toBe(true);
    expect(viewingReducer(playing, { type: "stepped", by: 1 })).toMatchObject({ playing: false, frame: 1 });
    expect(viewingReducer(playing, { type: "played", frame: 5 })).toMatchObject({ playing: true, frame: 5 });
    expect(viewingReducer(playing, { type: "played", frame: 9 })).toMatchObject({ playing: false, frame: 9 });
  });

  it("plays from the start again at the end, and not at all with a single frame", () => {
    const end = viewingReducer(ten, { type: "went", frame: 9 });
    expect(viewingReducer(end, { type: "play toggled" })).toMatchObject({ playing: true, frame: 0 });
    const one = viewingReducer(firstLook, { type: "counted", frames: 1 });
    expect(viewingReducer(one, { type: "play toggled" }).playing).toBe(false);
  });

  it("goes to a cell's first frame when its row is chosen, and stays when it is chosen in the picture", () => {
    expect(viewingReducer(ten, { type: "cell chosen", cell: 4, frame: 6 })).toMatchObject({ cell: 4, frame: 6 });
    expect(viewingReducer({ ...ten, frame: 2 }, { type: "cell chosen", cell: 4 })).toMatchObject({ cell: 4, frame: 2 });
  });

  it("shows the evidence of one finding at a time", () => {
    const shown = viewingReducer(ten, { type: "evidence toggled", finding: "speed" });
    expect(shown.evidence).toBe("speed");
    expect(viewingReducer(shown, { type: "evidence toggled", finding: "drift" }).evidence).toBe("drift");
    expect(viewingReducer(shown, { type: "evidence toggled", finding: "speed" }).evidence).toBeNull();
  });

  it("turns the order around when the same column is sorted again", () => {
    const by = viewingReducer(ten, { type: "sorted", by: "speed" });
    expect(by.sort).toEqual({ by: "speed", falling: true });
    expect(viewingReducer(by, { type: "sorted", by: "speed" }).sort.falling).toBe(false);
    expect(viewingReducer(by, { type: "sorted", by: "cell" }).sort).toEqual({ by: "cell", falling: false });
  });
});
