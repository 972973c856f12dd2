import { describe, expect, it } from "vitest";
import { isHidden, mayHidePictures } from "./hidden-pictures.ts";

describe("hidden pictures", () => {
  it("are in VP8 and VP9 only", () => {
    expect(["vp8", "vp9", "avc", "hevc", "av1", null].filter(mayHidePictures)).toEqual(["vp8", "vp9"]);
  });

  // VP9: frame_marker 10, profile low and high bit, show_existing_frame, frame_type, show_frame, error_resilient_mode.
  it.each([
    ["a shown key frame", 0b10_0_0_0_0_1_0, false],
    ["a shown inter frame", 0b10_0_0_0_1_1_0, false],
    ["a hidden inter frame", 0b10_0_0_0_1_0_0, true],
    ["a hidden inter frame of profile 2", 0b10_0_1_0_1_0_0, true],
    ["an earlier frame shown now", 0b10_0_0_1_0_0_0, false],
    ["a shown frame of profile 3", 0b10_1_1_0_0_1_1, false],
    ["a hidden frame of profile 3", 0b10_1_1_0_0_1_0, true],
  ])("of VP9: %s", (_what, first, hidden) => {
    expect(isHidden("vp9", Uint8Array.of(first, 0, 0))).toBe(hidden);
  });

  it("are no longer hidden within a superframe, which ends with a shown one", () => {
    expect(isHidden("vp9", Uint8Array.of(0b10_0_0_0_1_0_0, 0, 0b110_01_001))).toBe(false);
  });

  it("of VP8 are told by the fifth bit", () => {
    expect(isHidden("vp8", Uint8Array.of(0b0001_0000, 0))).toBe(false);
    expect(isHidden("vp8", Uint8Array.of(0b0000_0001, 0))).toBe(true);
  });
});
