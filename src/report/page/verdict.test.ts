import { describe, expect, it } from "vitest";
import { emptyScene, exampleTrial, nothingSwims, withoutScale } from "../../../tests/helpers/example-trial.ts";
import { verdict } from "./verdict.ts";

const plain = (measured: Parameters<typeof verdict>[0]) =>
  verdict(measured)
    .text.replace(/<\/?b>/g, "")
    .replaceAll("\u00a0", " ");

describe("verdict", () => {
  it("leads with the mean, its interval and n", () => {
    expect(plain(exampleTrial())).toMatch(
      /^61 motile cells swam at 33\.5 µm\/s on average \(95 % interval 31\.0 to 36\.1 µm\/s\)\.$/,
    );
    expect(plain(withoutScale())).toMatch(/^61 motile cells swam at 67\.9 px\/s on average/);
  });

  it("says plainly that nothing swims", () => {
    expect(plain(nothingSwims())).toBe(
      "No motile cells: none of the 91 cells that could be judged moved more than diffusion and flow explain. The motile share is 0 to 4.1 % (95 % interval).",
    );
  });

  it("tells no cells from cells that can't be judged", () => {
    expect(plain(emptyScene())).toBe("No cells were found.");
    const cells = exampleTrial().cells.map((cell) => ({ ...cell, motile: null, kept: false, reason: "too short" }));
    expect(plain(exampleTrial({ cells, speed: null }))).toBe(
      "No cell could be judged: 96 paths are too short to tell swimming from diffusion.",
    );
  });

  it("gives one cell no interval, and motile cells without a mean no speed", () => {
    const { speed } = exampleTrial();
    const mean = { value: 30, standardError: 1, ci95: [28, 32] as const, n: 1 };
    expect(plain(exampleTrial({ speed: { ...speed!, mean_um_s: mean, n_cells: 1 } }))).toBe(
      "1 motile cell swam at 30 µm/s; an interval needs more cells.",
    );
    expect(plain(exampleTrial({ speed: { ...speed!, mean_um_s: null, n_cells: 0 } }))).toBe(
      "67 cells are motile, too few or followed too briefly for a mean speed.",
    );
  });
});
