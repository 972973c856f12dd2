import { describe, expect, it } from "vitest";
import { emptyScene, exampleTrial, nothingSwims } from "../../tests/helpers/example-trial.ts";
import { summaryOf } from "./summary.ts";

describe("summaryOf", () => {
  it("has the blocks of the contract in their order", () => {
    expect(Object.keys(summaryOf(exampleTrial()))).toEqual([
      "schema",
      "trial",
      "strain",
      "culture",
      "condition",
      "source",
      "settings",
      "tool",
      "scale",
      "cells",
      "speed",
      "alignment",
      "turns",
      "rotation",
      "drift",
      "front",
      "quality",
      "warnings",
    ]);
  });

  it("scales figures, and rounds them to eight digits but not the settings", () => {
    const third = 1 / 3;
    const example = exampleTrial({ settings: { threshold: third } });
    const speed = { ...example.speed!, median_px_s: third, sd_px_s: 2 * third };
    const summary = summaryOf({
      ...example,
      speed,
      scale: { um_per_px: 0.5, uncertainty_um_per_px: 0.01, from: "trial.json" },
    });
    expect(summary.speed).toMatchObject({ median_px_s: 0.33333333, median_um_s: 0.16666667, sd_um_s: 0.33333333 });
    expect(summary.settings).toEqual({ threshold: third });
    expect(summary.drift).toMatchObject({
      velocity_um_s: [1.55, -0.7],
      ci95_um_s: [
        [1.3, 1.8],
        [-0.95, -0.45],
      ],
    });
  });

  it("keys checks by name and counts cells by kind and reason", () => {
    const { quality, cells } = summaryOf(exampleTrial());
    expect(quality).toMatchObject({
      crowding: { figure: 0.41, unit: "", verdict: "poor" },
      repeated_frames: { figure: null },
    });
    expect(cells).toEqual({
      n_paths: 96,
      n_motile: 67,
      n_not_motile: 24,
      n_undecided: 5,
      n_kept: 61,
      not_kept: [
        { reason: "not motile", n_cells: 24 },
        { reason: "followed for less than 0.5 s", n_cells: 6 },
        { reason: "path too short to judge", n_cells: 5 },
      ],
    });
  });

  it("says of a trial in which nothing swims that none is motile, not that speed is unknown", () => {
    const { speed } = summaryOf(nothingSwims());
    expect(speed).toMatchObject({ mean_um_s: null, ci95_um_s: null, n_cells: 0, motile_fraction: 0, n_judged: 91 });
  });

  it("has no speed and no drift when no cell was found", () => {
    expect(summaryOf(emptyScene())).toMatchObject({ speed: null, drift: null, cells: { n_paths: 0, not_kept: [] } });
  });
});
