import { describe, expect, it } from "vitest";
import { medianInterval, rateChanges, risingTimes } from "./intervals.ts";

function timesOf(intervals: number[]): number[] {
  const times = [0];
  for (const step of intervals) times.push(times.at(-1)! + step);
  return times;
}

describe("frame times", () => {
  it("are sorted, and equal ones counted once", () => {
    expect([...risingTimes([5, 1, 3, 3, 1])]).toEqual([1, 3, 5]);
    expect([...risingTimes([])]).toEqual([]);
  });

  it("have a middle interval that a gap doesn't move", () => {
    expect(medianInterval(timesOf([10, 10, 50, 10, 11]))).toBe(10);
    expect(medianInterval(timesOf([10, 12]))).toBe(11);
    expect(medianInterval([4])).toBeNull();
  });
});

describe("a rate that changes along the recording", () => {
  const steady = Array(120).fill(33);

  it("is told from jitter and dropped frames", () => {
    expect(rateChanges(timesOf(steady))).toEqual([]);
    expect(rateChanges(timesOf(steady.map((step, i) => step + (i % 2 ? 14 : -14))))).toEqual([]);
    expect(rateChanges(timesOf(steady.map((step, i) => (i % 10 === 0 ? 2 * step : step))))).toEqual([]);
  });

  it("is warned of, with its factor", () => {
    const ramp = [...steady, ...Array(120).fill(132), ...steady];
    expect(rateChanges(timesOf(ramp))).toMatchObject([
      { code: "rate-changes", message: expect.stringContaining("factor of 4.0") },
    ]);
  });
});
