import { describe, expect, it } from "vitest";
import { binned } from "./binned.ts";

describe("binned", () => {
  it("keeps every frame when there is room", () => {
    expect(binned([3, 5], [0, 1], 10)).toEqual([
      { t_s: 0, mean: 3 },
      { t_s: 1, mean: 5 },
    ]);
  });

  it("takes the mean of frames in a row when there isn't", () => {
    expect(binned([3, 5, 1, 1, 9], [0, 1, 2, 3, 4], 3)).toEqual([
      { t_s: 0.5, mean: 4 },
      { t_s: 2.5, mean: 1 },
      { t_s: 4, mean: 9 },
    ]);
  });
});
