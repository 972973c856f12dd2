import { describe, expect, it } from "vitest";
import { type PlacesByFrame, pathAgreement } from "../../tests/helpers/path-metrics.ts";
import { openView, simulateField, tableOf } from "../../tests/helpers/simulated-field.ts";
import { evenTimes } from "../../tests/helpers/simulated-tracks.ts";
import { type Paths, rowsOf, seededRandom } from "../quantities/index.ts";
import { defaultTrackingSettings, trackCells } from "./index.ts";

function placesOf(paths: Paths): PlacesByFrame[] {
  return Array.from({ length: paths.count }, (_, p) => {
    const [a, b] = rowsOf(paths, p);
    const rows = Array.from({ length: b - a }, (_, i) => a + i);
    return new Map(
      rows.map((r) => [paths.frame[r] as number, [paths.x_px[r] as number, paths.y_px[r] as number] as const]),
    );
  });
}

const usual = {
  cells: 40,
  width: 1280,
  height: 720,
  speed: 90,
  rotation_rad2_s: 0.3,
  diffusion: 1.2,
  noise: 0.2,
  misses: 0.02,
  falsePerFrame: 0.1,
};

describe("paths against the truth", () => {
  it("finds the few swimmers among many dead cells", () => {
    const times = evenTimes(4, 30);
    const dead = simulateField({ ...usual, cells: 100, speed: 0 }, times, seededRandom(91));
    const swimmers = simulateField({ ...usual, cells: 3, speed: 120, falsePerFrame: 0 }, times, seededRandom(92));
    const view = openView(usual.width, usual.height);
    const sightings = tableOf([...dead.sightings, ...swimmers.sightings]);
    const { paths } = trackCells(sightings, times, view, defaultTrackingSettings, {});
    const { missed, truePositives } = pathAgreement(swimmers.truth, placesOf(paths));
    // 2 % are missed, and the crossing of a dead cell may cost some more.
    expect(truePositives / (truePositives + missed)).toBeGreaterThan(0.93);
  });

  // The bounds are what is asked of the program. Positions missed (2 %) and paths of fewer than four sightings cost 2 to 3 %.
  it.each([
    ["forty swimmers", usual, 30, 0.95],
    ["forty dead cells", { ...usual, speed: 0 }, 30, 0.95],
    ["forty swimmers at 15 frames/s", usual, 15, 0.95],
    ["fast swimmers", { ...usual, cells: 25, speed: 350 }, 60, 0.95],
    ["a crowd", { ...usual, cells: 150 }, 30, 0.93],
  ])("%s", (_, options, fps, least) => {
    const times = evenTimes(4, fps);
    const { sightings, truth } = simulateField(options, times, seededRandom(fps + options.cells));
    const view = openView(options.width, options.height);
    const { paths } = trackCells(tableOf(sightings), times, view, defaultTrackingSettings, {});
    const { jaccard, identityF1, rms_px } = pathAgreement(truth, placesOf(paths));
    expect(jaccard).toBeGreaterThanOrEqual(least);
    expect(identityF1).toBeGreaterThanOrEqual(least);
    // Both axes' noise: 0.2 √2, known to 1 % from thousands of positions; wrong pairings would add.
    expect(rms_px).toBeLessThan(0.2 * Math.SQRT2 * 1.05);
  });
});
