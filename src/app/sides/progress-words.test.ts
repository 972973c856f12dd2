import { describe, expect, it } from "vitest";
import { leftWords, progressWords } from "./progress-words.ts";

describe("progressWords", () => {
  it("says the stage and how far it is", () => {
    expect(progressWords({ stage: "finding cells", done: 220, total: 600 })).toBe("Finding cells: 220 of 600");
    expect(progressWords({ stage: "reading", done: 12, total: null })).toBe("Reading: 12");
    expect(progressWords({ stage: "opening", done: 0, total: null })).toBe("Opening …");
  });
});

describe("leftWords", () => {
  it("is coarser the longer it takes", () => {
    expect([null, 1, 12.4, 43, 200].map(leftWords)).toEqual([
      "",
      "almost done with this stage",
      "about 12 s left in this stage",
      "about 45 s left in this stage",
      "about 3 min left in this stage",
    ]);
  });
});
