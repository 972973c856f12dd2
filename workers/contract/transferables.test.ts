import { describe, expect, it } from "vitest";
import { exampleTrial } from "../../tests/helpers/example-trial.ts";
import { transferablesOf } from "./transferables.ts";

describe("transferablesOf", () => {
  it("finds each whole buffer once, however deep", () => {
    const a = new Float64Array(4);
    const b = new Uint8Array(3);
    expect(transferablesOf({ a, inner: [{ b }, { again: a }], text: "x", none: null })).toEqual([a.buffer, b.buffer]);
  });

  it("leaves views of part of a buffer to be copied", () => {
    const whole = new Uint8Array(8);
    expect(transferablesOf({ part: whole.subarray(2, 4), empty: new Uint8Array(0) })).toEqual([]);
  });

  it("lets a measured trial cross whole", () => {
    const measured = exampleTrial();
    const before = measured.paths.x_px.slice();
    const there = structuredClone(measured, { transfer: transferablesOf(measured) });
    expect(measured.paths.x_px).toHaveLength(0);
    expect(measured.view.background).toHaveLength(0);
    expect(Buffer.from(there.paths.x_px.buffer).equals(Buffer.from(before.buffer))).toBe(true);
    expect(there.cells).toEqual(measured.cells);
  });
});
