import { describe, expect, it } from "vitest";
import { assayFootage } from "../../tests/helpers/assay-footage.ts";
import { type Assay, type AssayOptions, planAssay } from "../assay/index.ts";
import type { Footage } from "../footage/index.ts";
import { type Context, type MeasuredTrial, rowsOf, Stopped } from "../quantities/index.ts";
import { bareTrial, type TrialDescription } from "../trial/index.ts";
import { defaultMeasureSettings, measureTrial } from "./index.ts";

const um_per_px = 0.45;

const small: AssayOptions = {
  seed: 11,
  picture: { width_px: 480, height_px: 360, um_per_px },
  time: { seconds: 3.2, fps: 30 },
  sample: { depth_um: 14, flow_um_s: [3, -2] },
  swimmers: { cells: 14, speed_um_s: 35 },
  dead: { cells: 6 },
  stuck: { cells: 2 },
  debris: { pieces: 8 },
  field: { steps: [{ t_s: 0, magnitude_mT: 0.1, angle_deg: 0 }] },
};

const scaled: TrialDescription = {
  ...bareTrial("clip.mp4"),
  scale: { from: "numbers", um_per_px, uncertainty_um_per_px: 0.002 },
};

function measure(footage: Footage, trial = scaled, context: Context = {}): Promise<MeasuredTrial> {
  const ports = {
    footage,
    recording: { name: "clip.mp4", sha256: "0".repeat(64) },
    tool: { name: "test", version: "0" },
  };
  return measureTrial(trial, ports, defaultMeasureSettings, context);
}

const codes = (measured: MeasuredTrial) => measured.warnings.map((w) => w.code);

/** For each cell that counts, the true cell that most of its path lies on, within 3 px. */
function matched(measured: MeasuredTrial, assay: Assay) {
  const truth = assay.truth();
  const byFrame = new Map<number, (typeof truth.rows)[number][]>();
  for (const row of truth.rows) {
    if (row.kind === "debris") continue;
    const rows = byFrame.get(row.frame);
    if (rows) rows.push(row);
    else byFrame.set(row.frame, [row]);
  }
  const { paths } = measured;
  return measured.cells
    .filter((c) => c.kept)
    .flatMap((cell) => {
      const [a, b] = rowsOf(paths, cell.cell - 1);
      const votes = new Map<number, number[]>();
      for (let i = a; i < b; i++) {
        for (const r of byFrame.get(paths.frame[i] as number) ?? []) {
          if (Math.hypot(r.x_px - (paths.x_px[i] as number), r.y_px - (paths.y_px[i] as number)) > 3) continue;
          votes.set(r.cell, [...(votes.get(r.cell) ?? []), Math.hypot(r.vx_um_s, r.vy_um_s)]);
        }
      }
      const [best] = [...votes.values()].sort((p, q) => q.length - p.length);
      if (!best || best.length < 0.8 * (b - a)) return [];
      return [
        { measured: (cell.speed_px_s as number) * um_per_px, truth: best.reduce((s, v) => s + v, 0) / best.length },
      ];
    });
}

describe("measuring a trial", () => {
  const assay = planAssay(small);

  it("finds the speed of its cells and the flow, the same every time", async () => {
    const footage = assayFootage(assay);
    const first = await measure(footage);
    const pairs = matched(first, assay);
    expect(pairs.length).toBeGreaterThan(12);
    expect(pairs.length / first.speed!.n_cells).toBeGreaterThan(0.9);
    const mean = (of: "measured" | "truth") => pairs.reduce((sum, p) => sum + p[of], 0) / pairs.length;
    expect(Math.abs(mean("measured") / mean("truth") - 1)).toBeLessThan(0.03);
    expect(first.speed?.mean_um_s?.value).toBeCloseTo((first.speed?.mean_px_s?.value as number) * um_per_px, 9);
    // True flow in pixels, y up; wider than the interval by as much again, for one clip.
    const { velocity_px_s, ci95_px_s } = first.drift!;
    for (const axis of [0, 1] as const) {
      const half = (ci95_px_s[axis][1] - ci95_px_s[axis][0]) / 2;
      expect(Math.abs(velocity_px_s[axis] - ([3, -2][axis] as number) / um_per_px)).toBeLessThan(2 * half);
    }
    expect(first.source.frames).toBe(assay.frames);
    expect(first.source.fps_median).toBeCloseTo(30, 6);
    expect(first.quality).toHaveLength(12);

    expect(await measure(footage)).toEqual(first);
  });

  it("finds nothing motile among dead cells, and says so", async () => {
    const dead = planAssay({ ...small, seed: 12, swimmers: { cells: 0 }, dead: { cells: 14 } });
    const measured = await measure(assayFootage(dead));
    expect(measured.speed?.n_judged).toBeGreaterThan(8);
    expect(measured.speed?.n_cells).toBe(0);
    expect(measured.speed?.motile_fraction).toBe(0);
    expect(measured.speed?.mean_px_s).toBeNull();
    expect(codes(measured)).toContain("nothing-swims");
  });

  it("gives only pixels without a scale, and warns", async () => {
    const brief = planAssay({ ...small, time: { seconds: 1.5, fps: 30 } });
    const measured = await measure(assayFootage(brief), bareTrial("clip.mp4"));
    expect(measured.scale).toBeNull();
    expect(measured.speed?.mean_px_s).not.toBeNull();
    expect(measured.speed?.mean_um_s).toBeNull();
    expect(codes(measured)).toContain("no-scale");
  });

  it("warns of what of the trial isn't used", async () => {
    const brief = planAssay({ ...small, time: { seconds: 0.5, fps: 30 } });
    const trial: TrialDescription = {
      ...scaled,
      subject: "both",
      scale: { from: "micrometer", file: "scale.png", division_um: 10 },
      field: { from: "steps", steps: [{ t_s: 0, magnitude_mT: 1, angle_deg: 0 }], rotation_hz: 0, ambient_mT: [0, 0] },
    };
    const found = codes(await measure(assayFootage(brief), trial));
    expect(found).toEqual(expect.arrayContaining(["scale-not-measured", "front-not-measured", "field-not-used"]));
    expect(found).not.toContain("no-scale");
  });

  it("leaves frames out that repeat the one before", async () => {
    const repeating = planAssay({ ...small, seed: 13, time: { seconds: 2, fps: 30, repeated: 0.15 } });
    const measured = await measure(assayFootage(repeating));
    const shown = new Uint8Array(repeating.width * repeating.height);
    const before = shown.slice();
    let repeats = 0;
    for (let f = 0; f < repeating.frames; f++) {
      repeating.render(f, shown);
      const same = f > 0 && shown.every((v, i) => v === before[i]);
      before.set(shown);
      const sighted = measured.sightings.frame.includes(f);
      expect(sighted).toBe(!same);
      if (same) repeats++;
    }
    expect(repeats).toBeGreaterThan(3);
    const check = measured.quality.find((q) => q.check === "repeated_frames");
    expect(check?.figure).toBeCloseTo(repeats / repeating.frames, 9);
    const pairs = matched(measured, repeating);
    const mean = (of: "measured" | "truth") => pairs.reduce((sum, p) => sum + p[of], 0) / pairs.length;
    expect(Math.abs(mean("measured") / mean("truth") - 1)).toBeLessThan(0.05);
  });

  it.each([0, 1])("refuses a recording of %d frames", async (frames) => {
    await expect(measure(assayFootage(assay, { frames }))).rejects.toMatchObject({
      name: "InputError",
      code: "too-few-frames",
      where: "clip.mp4",
    });
  });

  it("measures two frames, with no cell followed", async () => {
    const measured = await measure(assayFootage(assay, { frames: 2 }));
    expect(measured.speed?.n_cells).toBe(0);
    expect(codes(measured)).toContain("no-cells");
  });

  it("stops when asked, in the middle", async () => {
    const signal = { aborted: false };
    let told = 0;
    const progress = () => {
      if (++told === 3) signal.aborted = true;
    };
    await expect(measure(assayFootage(assay), scaled, { signal, progress })).rejects.toBeInstanceOf(Stopped);
    expect(told).toBeLessThanOrEqual(4);
  });
});
