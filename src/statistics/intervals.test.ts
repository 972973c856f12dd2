import { describe, expect, it } from "vitest";
import { t975, wilsonInterval, z975 } from "./index.ts";

describe("97.5 % point of Student's t", () => {
  // Printed tables of the t distribution (Fisher and Yates, Statistical Tables, table III), from memory: three decimals.
  it.each([
    [1, 12.706],
    [2, 4.303],
    [3, 3.182],
    [4, 2.776],
    [5, 2.571],
    [8, 2.306],
    [10, 2.228],
    [20, 2.086],
    [30, 2.042],
    [60, 2.0],
    [120, 1.98],
  ])("for %d degrees of freedom is %d", (freedom, printed) => {
    expect(Math.abs(t975(freedom) - printed)).toBeLessThan(0.0005);
  });

  it("has closed forms for 1 and 2 degrees, and falls to the normal's", () => {
    // tan(π(p − ½)) and (2p − 1)√(2 / (1 − (2p − 1)²)) with p = 0.975: elementary.
    expect(t975(1)).toBeCloseTo(Math.tan(Math.PI * 0.475), 8);
    expect(t975(2)).toBeCloseTo(0.95 * Math.sqrt(2 / (1 - 0.95 ** 2)), 8);
    expect(t975(1e7)).toBeCloseTo(z975, 5);
    expect(z975).toBeCloseTo(1.96, 3);
  });
});

describe("Wilson's interval", () => {
  // Newcombe 1998, Statistics in Medicine 17, 857, table I, method 3 (score without continuity correction), from memory: four decimals.
  it.each([
    [81, 263, 0.2553, 0.3662],
    [15, 148, 0.0624, 0.1605],
    [0, 20, 0, 0.1611],
    [1, 29, 0.0061, 0.1718],
  ])("of %d in %d is %d to %d", (successes, n, low, high) => {
    const interval = wilsonInterval(successes, n);
    expect(Math.abs(interval[0] - low)).toBeLessThan(0.00006);
    expect(Math.abs(interval[1] - high)).toBeLessThan(0.00006);
  });

  it("at 0 and at n has a width, ends at 0 and at 1, and mirrors", () => {
    // At 0 of n Wilson's upper end is z² / (n + z²): elementary.
    for (const n of [1, 5, 200]) {
      const none = wilsonInterval(0, n);
      const all = wilsonInterval(n, n);
      expect(none[0]).toBe(0);
      expect(none[1]).toBeCloseTo(z975 ** 2 / (n + z975 ** 2), 12);
      expect(all[1]).toBe(1);
      expect(all[0]).toBeCloseTo(1 - none[1], 12);
    }
  });
});
