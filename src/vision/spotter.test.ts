import { describe, expect, it } from "vitest";
import { type Assay, type AssayOptions, planAssay } from "../assay/index.ts";
import { type Sightings, SightingsBuilder } from "../quantities/index.ts";
import { defaultVisionSettings, type FrameNote, learnScene, type Scene, Spotter, Survey } from "./index.ts";

const small: AssayOptions = {
  picture: { width_px: 480, height_px: 360, um_per_px: 0.45 },
  time: { seconds: 3, fps: 30 },
  sample: { depth_um: 12 },
  swimmers: { cells: 0 },
  dead: { cells: 0 },
  stuck: { cells: 0 },
  debris: { pieces: 0 },
  field: { steps: [{ t_s: 0, magnitude_mT: 0.4, angle_deg: 0 }] },
};

interface Looked {
  readonly assay: Assay;
  readonly scene: Scene;
  readonly sightings: Sightings;
  readonly notes: readonly FrameNote[];
}

function look(options: AssayOptions): Looked {
  const assay = planAssay({ ...small, ...options });
  const { width, height } = assay;
  const frames = Array.from(assay.times_s, (t_s, index) => {
    const luma = new Uint8Array(width * height);
    assay.render(index, luma);
    return { index, t_s, width, height, luma };
  });
  const survey = new Survey(defaultVisionSettings.surveySpan_s);
  for (const frame of frames) survey.take(frame);
  const { scene, whitener } = learnScene(survey, defaultVisionSettings);
  const spotter = new Spotter(scene, whitener);
  const into = new SightingsBuilder();
  const notes = frames.map((frame) => spotter.spot(frame, into));
  return { assay, scene, sightings: into.seal(), notes };
}

/** Sightings near a visible cell of the truth, those near none, and visible cells sighted by none. */
function compare({ assay, sightings }: Looked, kinds: readonly string[]) {
  const { rows } = assay.truth();
  const wanted = rows.filter((r) => kinds.includes(r.kind) && r.visible && r.signalToNoise > 6);
  let found = 0;
  let squares = 0;
  for (const r of wanted) {
    let least = 9;
    for (let i = 0; i < sightings.count; i++) {
      if (sightings.frame[i] !== r.frame) continue;
      least = Math.min(
        least,
        ((sightings.x_px[i] as number) - r.x_px) ** 2 + ((sightings.y_px[i] as number) - r.y_px) ** 2,
      );
    }
    if (least < 9) {
      found++;
      squares += least;
    }
  }
  return { wanted: wanted.length, found, rms: Math.sqrt(squares / found) };
}

describe("finding cells", () => {
  it("sights cells that only diffuse, and neither debris nor stuck cells", () => {
    const looked = look({ seed: 3, dead: { cells: 8 }, stuck: { cells: 6 }, debris: { pieces: 12 } });
    const dead = compare(looked, ["dead"]);
    expect(dead.wanted).toBeGreaterThan(300);
    expect(dead.found / dead.wanted).toBeGreaterThan(0.97);
    const still = compare(looked, ["stuck"]);
    expect(still.wanted).toBeGreaterThan(300);
    // A diffusing cell passes over a still one now and then.
    expect(still.found / still.wanted).toBeLessThan(0.1);
    expect(looked.scene.stillSpots.length).toBeGreaterThanOrEqual(6);
    expect(looked.scene.steady).toBe(true);
  });

  it.each(["dark", "bright"] as const)("finds out by itself that cells are %s", (polarity) => {
    const optics = polarity === "bright" ? { polarity, contrast: 0.9 } : { polarity };
    const looked = look({
      seed: 4,
      swimmers: { cells: 12 },
      optics,
      light: { level: polarity === "bright" ? 70 : 165 },
    });
    expect(looked.scene.kind.sign).toBe(polarity === "bright" ? 1 : -1);
    const swimmers = compare(looked, ["swimmer"]);
    expect(swimmers.wanted).toBeGreaterThan(500);
    expect(swimmers.found / swimmers.wanted).toBeGreaterThan(0.96);
    // At ten times the noise the bound is 0.08 px along each axis, more for blurred cells and for such as touch.
    expect(swimmers.rms).toBeLessThan(0.35);
    const signs = looked.sightings.contrast.every((c) => Math.sign(c) === looked.scene.kind.sign);
    expect(signs).toBe(true);
  });

  it("keeps to the false alarms allowed where there is nothing", () => {
    const looked = look({ seed: 5 });
    // Allowed: 0.1 a frame, 9 in 90 frames; the formula may be off by half as much again: 14, and 3 standard deviations.
    expect(looked.sightings.count).toBeLessThanOrEqual(14 + 3 * Math.sqrt(14));
  });

  it("takes shake and exposure out", () => {
    const phone = { shake_px: 1, bump_px: 4 };
    const looked = look({
      seed: 6,
      swimmers: { cells: 8 },
      debris: { pieces: 16 },
      phone,
      sensor: { gainDrift: 0.03, noise: 2 },
    });
    const { rows } = looked.assay.truth();
    const still = rows.filter((r) => r.kind === "debris" && r.cell === rows.find((q) => q.kind === "debris")?.cell);
    expect(still.length).toBe(looked.assay.frames);
    const off = (axis: "x" | "y") => {
      const wander = still.map(
        (r) => (axis === "x" ? r.x_px : r.y_px) - (looked.notes[r.frame]?.shift[axis] as number),
      );
      const mean = wander.reduce((a, b) => a + b, 0) / wander.length;
      return Math.max(...wander.map((w) => Math.abs(w - mean)));
    };
    // What the scene's own texture is asked to tell a shift to, as a standard deviation: 0.12 px; 3 of them at worst.
    expect(off("x")).toBeLessThan(0.36);
    expect(off("y")).toBeLessThan(0.36);
  });
});
