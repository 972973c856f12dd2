import { describe, expect, it } from "vitest";
import { exampleTrial } from "../../../tests/helpers/example-trial.ts";
import { rowsOf } from "../../quantities/index.ts";
import { firstRowFrom, isUnderWay, pathNear, sightingCounts, sightingsAt } from "./rows-at.ts";

const { paths, sightings, frameTimes_s } = exampleTrial();

describe("rows of a frame", () => {
  it("finds the sightings of every frame", () => {
    const counts = sightingCounts(sightings, frameTimes_s.length);
    for (const frame of [0, 1, 299, 599]) {
      const [first, end] = sightingsAt(sightings, frame);
      expect(end - first).toBe(counts[frame]);
      expect(Array.from(sightings.frame.subarray(first, end)).every((f) => f === frame)).toBe(true);
      expect(sightings.frame[first - 1] ?? -1).toBeLessThan(frame);
    }
    expect(counts.reduce((a, b) => a + b, 0)).toBe(sightings.count);
  });

  it("finds where a path is in a frame", () => {
    const [first, end] = rowsOf(paths, 3);
    expect(firstRowFrom(paths, 3, paths.frame[first]! + 5)).toBe(first + 5);
    expect(firstRowFrom(paths, 3, 0)).toBe(first);
    expect(firstRowFrom(paths, 3, 9999)).toBe(end);
    expect(isUnderWay(paths, 3, paths.frame[first]!)).toBe(true);
    expect(isUnderWay(paths, 3, paths.frame[first]! - 1)).toBe(false);
    expect(isUnderWay(paths, 3, paths.frame[end - 1]! + 1)).toBe(false);
  });

  it("finds the path under a pointer, and none in empty water", () => {
    const [first] = rowsOf(paths, 3);
    const [x, y] = [paths.x_px[first + 2]!, paths.y_px[first + 2]!];
    expect(pathNear(paths, paths.frame[first + 2]!, x + 0.2, y, 8)).toBe(3);
    expect(pathNear(paths, paths.frame[first + 2]!, -500, y, 8)).toBeNull();
  });
});
