import { describe, expect, it } from "vitest";
import { frameAt, nearestFrame } from "./frame-at.ts";

const times = [0, 0.1, 0.15, 0.4];

describe("frameAt", () => {
  it("is the frame on show at a time, with uneven frame times", () => {
    expect([-1, 0, 0.09, 0.1, 0.2, 0.39, 0.4, 9].map((t) => frameAt(times, t))).toEqual([0, 0, 0, 1, 2, 2, 3, 3]);
  });

  it("is 0 with no frames", () => {
    expect(frameAt([], 1)).toBe(0);
  });
});

describe("nearestFrame", () => {
  it("takes the nearer of two", () => {
    expect([0.04, 0.06, 0.27, 0.29, 9].map((t) => nearestFrame(times, t))).toEqual([0, 1, 2, 3, 3]);
  });
});
