import { describe, expect, it } from "vitest";
import { freeName, resultName } from "./save.ts";

describe("resultName", () => {
  it("is a name every file system takes", () => {
    expect(resultName("T07")).toBe("T07-result");
    expect(resultName("swim 2.mp4")).toBe("swim-2-result");
    expect(resultName("Δmam/22 °C")).toBe("Δmam-22-C-result");
    expect(resultName("../..")).toBe("trial-result");
  });
});

describe("freeName", () => {
  it("never takes a name that is there", () => {
    expect(freeName("T07-result", new Set())).toBe("T07-result");
    expect(freeName("T07-result", new Set(["t07-result", "t07-result-2"]))).toBe("T07-result-3");
  });
});
