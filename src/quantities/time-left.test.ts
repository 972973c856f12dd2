import { describe, expect, it } from "vitest";
import { timeLeft } from "./time-left.ts";

const at = (done: number, total: number | null = 100, stage = "finding cells") => ({ stage, done, total });

describe("timeLeft", () => {
  it("is what is left over the pace so far", () => {
    const left = timeLeft();
    left.after(at(0), 10);
    expect(left.after(at(25), 15)).toBe(15);
    expect(left.after(at(100), 30)).toBe(0);
  });

  it("says nothing too early, without a total, or before anything is done", () => {
    const left = timeLeft();
    left.after(at(0), 0);
    expect(left.after(at(10), 0.5)).toBeNull();
    expect(left.after(at(0), 5)).toBeNull();
    expect(left.after(at(10, null), 5)).toBeNull();
  });

  it("starts anew with each stage", () => {
    const left = timeLeft();
    left.after(at(0), 0);
    left.after(at(100), 100);
    left.after(at(0, 50, "following cells"), 100);
    expect(left.after(at(10, 50, "following cells"), 102)).toBe(8);
  });
});
