import { describe, expect, it } from "vitest";
import { type PlacesByFrame, pathAgreement } from "./path-metrics.ts";

function path(from: number, to: number, at: (t: number) => [number, number]): PlacesByFrame {
  return new Map(Array.from({ length: to - from + 1 }, (_, i) => [from + i, at(from + i)] as const));
}

describe("agreement of paths", () => {
  // Two true paths over ten frames. One is found but for its last frame, the other in two pieces, and one path is spurious.
  const truth = [path(0, 9, (t) => [10 + 2 * t, 20]), path(2, 9, (t) => [60 - t, 40])];
  const measured = [
    path(0, 8, (t) => [10.3 + 2 * t, 20.4]),
    path(2, 5, (t) => [60 - t, 41]),
    path(6, 9, (t) => [60 - t, 41]),
    path(0, 2, () => [90, 90]),
  ];

  it("gives the worked values", () => {
    const found = pathAgreement(truth, measured);
    // Counted by hand: 9 + 4 of 18 true positions, 20 measured. Root mean square of nine times 0.5 and four times 1.
    expect([found.truePositives, found.missed, found.spurious]).toEqual([13, 5, 7]);
    expect(found.jaccard).toBeCloseTo(0.52, 12);
    expect(found.identityTruePositives).toBe(13);
    expect(found.identityF1).toBeCloseTo(26 / 38, 12);
    expect(found.rms_px).toBeCloseTo(Math.sqrt((9 * 0.25 + 4) / 13), 12);
  });

  it("is 1 for the truth itself, in any order, and 0 for nothing", () => {
    const same = pathAgreement(truth, [...truth].reverse());
    expect([same.jaccard, same.identityF1, same.rms_px]).toEqual([1, 1, 0]);
    const none = pathAgreement(truth, []);
    expect([none.jaccard, none.identityF1, none.missed]).toEqual([0, 0, 18]);
  });

  it("falls when two cells are taken for one another half-way", () => {
    const a = path(0, 9, (t) => [t, 0]);
    const b = path(0, 9, (t) => [t, 30]);
    const swapped = [path(0, 9, (t) => [t, t < 5 ? 0 : 30]), path(0, 9, (t) => [t, t < 5 ? 30 : 0])];
    const found = pathAgreement([a, b], swapped);
    expect(found.identityF1).toBeCloseTo(0.5, 12);
    expect(found.jaccard).toBeCloseTo(10 / 30, 12);
  });
});
