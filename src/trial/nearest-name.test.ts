import { describe, expect, it } from "vitest";
import { levenshtein, nearNames } from "./nearest-name.ts";

describe("levenshtein", () => {
  it.each([
    ["kitten", "sitting", 3],
    ["", "abc", 3],
    ["abc", "abc", 0],
    ["flaw", "lawn", 2],
  ])("of %s and %s is %i (textbook pairs, from memory)", (a, b, distance) => {
    expect(levenshtein(a, b)).toBe(distance);
    expect(levenshtein(b, a)).toBe(distance);
  });
});

describe("nearNames", () => {
  it("puts the nearest first and leaves strangers out", () => {
    expect(nearNames("um-per-px", ["division_um", "um_per_px", "micrometer"])).toEqual(["um_per_px"]);
    expect(nearNames("swim1.mp4", ["swim3.mp4", "swim1.MP4", "beads.avi"])).toEqual(["swim1.MP4", "swim3.mp4"]);
    expect(nearNames("a", ["xyz"])).toEqual([]);
  });
});
