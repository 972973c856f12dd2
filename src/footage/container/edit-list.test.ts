import { describe, expect, it } from "vitest";
import { type Edit, editRule, libraryShift_s } from "./edit-list.ts";

const clocks = { movieTimescale: 600, mediaTimescale: 90_000 };
const edit = (duration: number, mediaTime: number, rate = 1): Edit => ({ duration, mediaTime, rate });
const kept = (edits: Edit[], ticks: number[]) => {
  const rule = editRule({ edits, ...clocks });
  return ticks.filter((t) => rule.keeps(t));
};

describe("an edit list", () => {
  it("keeps the frames from its start up to, not including, its end", () => {
    // 600 ticks of the movie's clock are one second, 90 000 ticks of the track's.
    expect(kept([edit(600, 3000)], [0, 2999, 3000, 92_999, 93_000, 99_000])).toEqual([3000, 92_999]);
  });

  it("of length 0 keeps everything from its start on", () => {
    expect(kept([edit(0, 3000)], [0, 3000, 9e9])).toEqual([3000, 9e9]);
  });

  it("keeps everything when there is none, or nothing but a delay", () => {
    expect(kept([], [-3000, 0, 5])).toEqual([-3000, 0, 5]);
    expect(kept([edit(300, -1)], [0, 5])).toEqual([0, 5]);
  });

  it("of several pieces keeps all of them and warns", () => {
    const edits = [edit(300, 0), edit(300, 90_000)];
    expect(kept(edits, [0, 44_999, 45_000, 90_000, 134_999, 135_000])).toEqual([0, 44_999, 90_000, 134_999]);
    expect(editRule({ edits, ...clocks }).warnings.map(({ code }) => code)).toEqual(["edited-recording"]);
  });

  it("that plays at another rate hides nothing and warns", () => {
    const edits = [edit(300, 3000, 0.5)];
    expect(kept(edits, [0, 3000])).toEqual([0, 3000]);
    expect(editRule({ edits, ...clocks }).warnings.map(({ code }) => code)).toEqual(["edited-rate"]);
  });
});

describe("the shift of the demuxing library", () => {
  it("is the delay less the start of the first piece that plays at rate 1", () => {
    expect(libraryShift_s({ edits: [], ...clocks })).toBe(0);
    expect(libraryShift_s({ edits: [edit(0, 9000)], ...clocks })).toBeCloseTo(-0.1, 12);
    expect(libraryShift_s({ edits: [edit(300, -1), edit(0, 9000), edit(0, 0)], ...clocks })).toBeCloseTo(0.4, 12);
    expect(libraryShift_s({ edits: [edit(300, -1), edit(0, 9000, 2)], ...clocks })).toBe(0);
  });
});
