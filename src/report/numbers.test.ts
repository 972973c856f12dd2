import { describe, expect, it } from "vitest";
import { fixed, readable, readableAlone, rounded, withUncertainty } from "./numbers.ts";

describe("numbers as written", () => {
  it.each([
    [1.23456, 3, "1.235"],
    [-0.00001, 3, "0.000"],
    [0, 4, "0.0000"],
    [1234567.5, 0, "1234568"],
    [null, 3, ""],
  ])("fixed(%s, %i) is %j", (value, decimals, text) => {
    expect(fixed(value, decimals)).toBe(text);
  });

  it("rounds to eight significant digits and has no minus zero", () => {
    expect(rounded(33.523456789123)).toBe(33.523457);
    expect(rounded(1.23456789e-17)).toBe(1.2345679e-17);
    expect(Object.is(rounded(-0), 0)).toBe(true);
  });

  it.each([Number.NaN, Number.POSITIVE_INFINITY])("refuses %s", (value) => {
    expect(() => fixed(value, 3)).toThrow("never written");
    expect(() => rounded(value)).toThrow("never written");
    expect(() => readableAlone(value)).toThrow("never written");
  });

  it.each([
    [33.5219, 2.54, "33.5"],
    [33.5219, 0.31, "33.52"],
    [-0.6932, 0.25, "\u22120.69"],
    [1234.5, 310, "1235"],
    [0.494, null, "0.494"],
  ])("reads %f ± %s as %s", (value, half, text) => {
    expect(readable(value, half)).toBe(text);
  });

  it.each([
    [0.8, "0.8"],
    [60, "60"],
    [29.97003, "29.97"],
    [100.04, "100"],
    [0.0340001, "0.034"],
    [1.5e-7, "1.5e\u22127"],
    [2e9, "2e+9"],
  ])("reads %f alone as %s", (value, text) => {
    expect(readableAlone(value)).toBe(text);
  });

  it("writes a value with its uncertainty, and without when there is none", () => {
    expect(withUncertainty(0.494, 0.001)).toBe("0.4940 ± 0.0010");
    expect(withUncertainty(0.494, 0)).toBe("0.494");
  });
});
