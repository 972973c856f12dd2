import { describe, expect, it } from "vitest";
import { mean, median, quantile, standardDeviation } from "./index.ts";

describe("moments", () => {
  it("mean and standard deviation with n − 1", () => {
    // Sum of squares about the mean 5 is 32: by hand.
    expect(mean([2, 4, 4, 4, 5, 5, 7, 9])).toBe(5);
    expect(standardDeviation([2, 4, 4, 4, 5, 5, 7, 9])).toBeCloseTo(Math.sqrt(32 / 7), 12);
    expect(standardDeviation([3, 3, 3])).toBe(0);
  });

  it("keeps its digits far from zero", () => {
    expect(standardDeviation([1e9 + 4, 1e9 + 7, 1e9 + 13, 1e9 + 16])).toBeCloseTo(Math.sqrt(30), 6);
  });
});

describe("quantiles of type 7", () => {
  it("of 1 … 10 are those of the definition", () => {
    // Hyndman and Fan 1996, definition 7: order statistic 1 + (n − 1) p, interpolated; worked by hand.
    const values = [10, 3, 1, 7, 5, 2, 9, 4, 8, 6];
    expect(quantile(values, 0)).toBe(1);
    expect(quantile(values, 0.25)).toBeCloseTo(3.25, 12);
    expect(quantile(values, 0.5)).toBeCloseTo(5.5, 12);
    expect(quantile(values, 0.9)).toBeCloseTo(9.1, 12);
    expect(quantile(values, 1)).toBe(10);
  });

  it("sorts numbers as numbers, and leaves the input alone", () => {
    const values = [100, 9, -20];
    expect(median(values)).toBe(9);
    expect(values).toEqual([100, 9, -20]);
  });

  it("median of an even number is the mean of the middle two", () => {
    expect(median([4, 1, 9, 2])).toBe(3);
    expect(median([7])).toBe(7);
  });
});
