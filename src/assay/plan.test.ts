import { describe, expect, it } from "vitest";
import { InputError } from "../quantities/index.ts";
import type { AssayOptions } from "./options.ts";
import { type Assay, planAssay } from "./plan.ts";
import { assayPresets } from "./presets.ts";
import type { TruthRow } from "./truth.ts";

const small = { width_px: 160, height_px: 120, um_per_px: 0.4 };
const bare: AssayOptions = { picture: small, debris: { pieces: 0 }, stuck: { cells: 0 }, dead: { cells: 0 } };
const brief = { seconds: 1, fps: 30 };

function picture(assay: Assay, frame: number): Uint8Array {
  const out = new Uint8Array(assay.width * assay.height);
  assay.render(frame, out);
  return out;
}

/** What a frame holds, and how it looks with and without. */
interface Look {
  readonly rows: readonly TruthRow[];
  readonly pixels: Uint8Array;
  readonly without: Uint8Array;
}

/** FNV-1a of the bytes (Fowler, Noll and Vo). */
function fingerprint(bytes: Uint8Array): number {
  return bytes.reduce((h, b) => Math.imul(h ^ b, 0x01000193), 0x811c9dc5) >>> 0;
}

/** Centre of how much darker a picture is than the one without cells, near a place. */
function darkCentre(pixels: Uint8Array, without: Uint8Array, width: number, near: { x_px: number; y_px: number }) {
  const reach = 10;
  let sum = 0;
  let x = 0;
  let y = 0;
  for (let j = Math.round(near.y_px) - reach; j <= Math.round(near.y_px) + reach; j++) {
    for (let i = Math.round(near.x_px) - reach; i <= Math.round(near.x_px) + reach; i++) {
      const dark = (without[j * width + i] as number) - (pixels[j * width + i] as number);
      sum += dark;
      x += dark * i;
      y += dark * j;
    }
  }
  return { x_px: x / sum, y_px: y / sum };
}

describe("the same seed", () => {
  const options: AssayOptions = { ...assayPresets["shaky-phone"]?.options, picture: small, time: brief };

  it("makes the same pictures, in any order, and another seed others", () => {
    const once = planAssay(options);
    const again = planAssay(options);
    const forwards = [0, 13, 29].map((i) => picture(once, i));
    const backwards = [29, 13, 0].map((i) => picture(again, i)).reverse();
    expect(backwards).toEqual(forwards);
    expect(picture(planAssay({ ...options, seed: 2 }), 0)).not.toEqual(forwards[0]);
    expect(again.truth()).toEqual(once.truth());
  });

  it("makes these very bytes on every machine", () => {
    expect(fingerprint(picture(planAssay(options), 17))).toBe(3008891752);
  });
});

describe("truth", () => {
  /** Noiseless, few cells, everything in focus: what is drawn can be measured by its centre. */
  const clean: AssayOptions = {
    ...bare,
    time: brief,
    sample: { depth_um: 1 },
    swimmers: { cells: 3, speed_um_s: 30 },
    optics: { contrast: 0.6, ring: 0 },
    sensor: { noise: 0, readNoise: 0 },
  };

  it.each([
    ["a steady phone", {}],
    ["a shaking phone", { phone: { shake_px: 3 } }],
    ["a shaking stage", { phone: { shake_px: 3, shakes: "stage" as const } }],
    ["long exposure", { time: { ...brief, exposure_s: 0.03 }, swimmers: { cells: 3, speed_um_s: 90 } }],
  ])("says where the picture shows each cell: %s", (_, changed) => {
    const assay = planAssay({ ...clean, ...changed });
    const empty = planAssay({ ...clean, ...changed, swimmers: { cells: 0 } });
    const { rows } = assay.truth();
    let compared = 0;
    for (const frame of [0, 10, 20, 29]) {
      const pixels = picture(assay, frame);
      const without = picture(empty, frame);
      const here = rows.filter((r) => r.frame === frame);
      for (const row of here) {
        const roomy = [row.x_px, row.y_px].every((v) => v > 13) && row.x_px < 146 && row.y_px < 106;
        const alone = here.every((r) => r === row || Math.hypot(r.x_px - row.x_px, r.y_px - row.y_px) > 30);
        if (!roomy || !alone) continue;
        const centre = darkCentre(pixels, without, 160, row);
        expect(Math.hypot(centre.x_px - row.x_px, centre.y_px - row.y_px)).toBeLessThan(0.05);
        compared++;
      }
    }
    expect(compared).toBeGreaterThan(2);
  });

  it("keeps shake out of micrometres, y up", () => {
    const assay = planAssay({ ...bare, time: brief, dead: { cells: 0 }, stuck: { cells: 8 }, phone: { shake_px: 2 } });
    const stuck = assay.truth().rows.filter((r) => r.kind === "stuck");
    const one = stuck.filter((r) => r.cell === stuck.find(({ frame }) => frame === 0)?.cell);
    expect(new Set(one.map((r) => r.x_um)).size).toBe(1);
    expect(new Set(one.map((r) => r.x_px)).size).toBeGreaterThan(5);
    const first = one.find((r) => r.frame === 0);
    expect(first?.y_um).toBeCloseTo(-0.4 * (first?.y_px as number), 4);
  });

  it("shakes cells and debris as one", () => {
    const options: AssayOptions = {
      ...clean,
      picture: { ...small, width_px: 320, height_px: 240 },
      swimmers: { cells: 0 },
      stuck: { cells: 6 },
      debris: { pieces: 7, size_um: 0.6, contrast: 0.5 },
      phone: { shake_px: 2, bump_px: 5, shakes: "stage" },
    };
    const assay = planAssay(options);
    const empty = planAssay({ ...options, stuck: { cells: 0 }, debris: { pieces: 0 } });
    const kinds = new Set<string>();
    const { rows } = assay.truth();
    const look = (frame: number): Look => ({
      rows: rows.filter((r) => r.frame === frame),
      pixels: picture(assay, frame),
      without: picture(empty, frame),
    });
    const [first, later] = [look(0), look(20)];
    const moved: number[][] = [];
    for (const row of first.rows) {
      const then = later.rows.find((r) => r.cell === row.cell);
      const roomy = row.x_px > 25 && row.y_px > 25 && row.x_px < 294 && row.y_px < 214;
      const alone = first.rows.every((r) => r === row || Math.hypot(r.x_px - row.x_px, r.y_px - row.y_px) > 26);
      if (!then || !roomy || !alone) continue;
      const drawn = [first, later].map((seen, i) => darkCentre(seen.pixels, seen.without, 320, i === 0 ? row : then));
      const [dx, dy] = [then.x_px - row.x_px, then.y_px - row.y_px];
      expect(Math.hypot(dx, dy)).toBeGreaterThan(1);
      expect(Math.abs((drawn[1]?.x_px as number) - (drawn[0]?.x_px as number) - dx)).toBeLessThan(0.15);
      expect(Math.abs((drawn[1]?.y_px as number) - (drawn[0]?.y_px as number) - dy)).toBeLessThan(0.15);
      moved.push([dx, dy]);
      kinds.add(row.kind);
    }
    expect([...kinds].sort()).toEqual(["debris", "stuck"]);
    for (const [dx, dy] of moved) {
      expect(dx).toBeCloseTo(moved[0]?.[0] as number, 3);
      expect(dy).toBeCloseTo(moved[0]?.[1] as number, 3);
    }
  });

  it("counts a cell visible only where it stands out of the noise", () => {
    const visible = (contrast: number) => {
      const { rows } = planAssay({ ...bare, time: brief, swimmers: { cells: 20 }, optics: { contrast } }).truth();
      const swimmers = rows.filter((r) => r.kind === "swimmer");
      for (const r of swimmers) expect(r.visible).toBe(r.signalToNoise >= 3);
      return swimmers.filter((r) => r.visible).length / swimmers.length;
    };
    expect(visible(0.3)).toBeGreaterThan(0.95);
    expect(visible(0.03)).toBeLessThan(0.5);
  });

  it("gives the trial's mean speed over cells seen for half a second or more", () => {
    const { cells, trial } = planAssay({ ...bare, time: { ...brief, seconds: 2 }, swimmers: { cells: 20 } }).truth();
    const counted = cells.filter((c) => c.kind === "swimmer" && c.visible_s >= 0.5);
    expect(counted.length).toBeGreaterThan(5);
    expect(trial.n_cells).toBe(counted.length);
    const mean = counted.reduce((sum, c) => sum + (c.speed_um_s as number), 0) / counted.length;
    expect(trial.mean_speed_um_s).toBeCloseTo(mean, 9);
    for (const c of counted) expect(c.speed_um_s as number).toBeLessThanOrEqual((c.speed3d_um_s as number) + 1e-9);
    expect(planAssay({ ...bare, time: brief, swimmers: { cells: 0 } }).truth().trial.mean_speed_um_s).toBeNull();
  });

  it("takes a cell that comes back into view after half a second or more for another", () => {
    // A small eyepiece and a reversal: cells swim out and, turned round, in again.
    const assay = planAssay({
      ...bare,
      time: { seconds: 6, fps: 30 },
      swimmers: { cells: 15, speed_um_s: 40 },
      light: { eyepiece: 0.6 },
      field: {
        steps: [
          { t_s: 0, magnitude_mT: 0.4, angle_deg: 0 },
          { t_s: 2, magnitude_mT: 0.4, angle_deg: 180 },
        ],
      },
    });
    const { rows, cells } = assay.truth();
    let out = 0;
    for (const { cell, first_frame, last_frame } of cells) {
      const times = rows.filter((r) => r.cell === cell).map((r) => r.t_s);
      expect(times.length).toBeGreaterThan(0);
      expect(times[0]).toBe(assay.times_s[first_frame]);
      expect(times.at(-1)).toBe(assay.times_s[last_frame]);
      times.slice(1).forEach((t, i) => {
        expect(t - (times[i] as number)).toBeLessThanOrEqual(0.5 + 1e-9);
        if (t - (times[i] as number) > 1.5 / 30) out++;
      });
    }
    expect(new Set(cells.map((c) => c.cell)).size).toBe(cells.length);
    // Some blink at the rim and stay the same; the box alone would hold fewer cells than came and went.
    expect(out).toBeGreaterThan(0);
    expect(cells.length).toBeGreaterThan(40);
  });

  it("leaves out what lies outside the eyepiece", () => {
    const assay = planAssay({ ...bare, time: brief, swimmers: { cells: 40 }, light: { eyepiece: 0.7 } });
    const reach = assay.truth().rows.map((r) => Math.hypot(r.x_px - 79.5, r.y_px - 59.5));
    expect(Math.max(...reach)).toBeLessThan(0.7 * 60 + 4);
    const pixels = picture(assay, 0);
    expect(pixels[0]).toBeLessThan(15);
    expect(pixels[60 * 160 + 80]).toBeGreaterThan(120);
  });
});

describe("repeated frames", () => {
  it("show the very picture again and are named", () => {
    const assay = planAssay({ ...bare, time: { seconds: 2, fps: 30, repeated: 0.2 } });
    const { repeatedFrames, rows } = assay.truth();
    expect(repeatedFrames.length).toBeGreaterThan(3);
    for (const i of repeatedFrames) expect(picture(assay, i)).toEqual(picture(assay, i - 1));
    const at = (frame: number) => rows.filter((r) => r.frame === frame).map((r) => [r.cell, r.x_px, r.y_px]);
    expect(at(repeatedFrames[0] as number)).toEqual(at((repeatedFrames[0] as number) - 1));
  });
});

describe("presets", () => {
  it.each(Object.keys(assayPresets))("%s can be made as it is described", (name) => {
    const options = assayPresets[name]?.options as AssayOptions;
    const assay = planAssay({ ...options, time: { ...options.time, seconds: 0.3 }, picture: small });
    const pixels = picture(assay, assay.frames - 1);
    expect(new Set(pixels).size).toBeGreaterThan(5);
  });
});

describe("options", () => {
  it.each<[string, object]>([
    ["swimmers.cells", { swimmers: { cells: -1 } }],
    ["time.secons", { time: { secons: 3 } }],
    ["swimers", { swimers: { cells: 3 } }],
    ["optics.polarity", { optics: { polarity: "odd" } }],
    ["picture", { picture: { width_px: 641 } }],
    ["seed", { seed: 1.5 }],
    ["field.steps", { field: { steps: [{ t_s: 0, magnitude_mT: -1, angle_deg: 0 }] } }],
    ["time.seconds", { time: 8 }],
  ])("refuse what can't be, naming %s", (where, options) => {
    try {
      planAssay(options as AssayOptions);
    } catch (error) {
      expect(error).toBeInstanceOf(InputError);
      expect((error as InputError).where).toContain(where.split(".")[0]);
      return;
    }
    throw new Error("was let through");
  });
});
