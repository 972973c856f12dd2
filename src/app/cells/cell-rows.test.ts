import { describe, expect, it } from "vitest";
import { exampleTrial } from "../../../tests/helpers/example-trial.ts";
import { cellRows, followed_s } from "./cell-rows.ts";

const { cells } = exampleTrial();

describe("cellRows", () => {
  it("sorts in both directions with the unknown last", () => {
    for (const falling of [false, true]) {
      const speeds = cellRows(cells, { by: "speed", falling }, null).map((p) => cells[p]!.speed_px_s);
      const known = speeds.filter((speed) => speed !== null);
      expect(known.length).toBeLessThan(speeds.length);
      expect(speeds.slice(0, known.length)).toEqual(known);
      expect(known).toEqual([...known].sort((a, b) => (falling ? b - a : a - b)));
    }
  });

  it("keeps equals in order of their numbers", () => {
    const rows = cellRows(cells, { by: "motile", falling: true }, null);
    const swimming = rows.filter((p) => cells[p]!.motile);
    expect(rows.slice(0, swimming.length)).toEqual([...swimming].sort((a, b) => a - b));
  });

  it("lists only the asked ones", () => {
    expect(cellRows(cells, { by: "cell", falling: true }, [3, 9, 5])).toEqual([9, 5, 3]);
  });

  it("knows how long a cell was followed", () => {
    const rows = cellRows(cells, { by: "followed", falling: true }, null);
    expect(followed_s(cells[rows[0]!]!)).toBe(Math.max(...cells.map(followed_s)));
  });
});
