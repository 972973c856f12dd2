import { describe, expect, it } from "vitest";
import { fieldProgram } from "./field.ts";
import { sphereDrag } from "./medium.ts";
import { type Motion, move } from "./motion.ts";
import type { AssayOptions, AssaySettings } from "./options.ts";
import { type Body, type Box, boxOf, energyRatio, populate } from "./population.ts";
import { resolveOptions } from "./resolve.ts";

const alone: AssayOptions = { dead: { cells: 0 }, stuck: { cells: 0 }, debris: { pieces: 0 } };
const evenTimes = (frames: number, fps: number) => Float64Array.from({ length: frames }, (_, i) => i / fps);

function moveAll(options: AssayOptions, times_s: Float64Array, exposure_s = 0): { motions: Motion[]; box: Box } {
  const settings = resolveOptions({ ...alone, ...options });
  const box = boxOf(settings);
  const motions = populate(settings, box).map((b) => moveOne(b, box, settings, times_s, exposure_s));
  return { motions, box };
}

function moveOne(body: Body, box: Box, settings: AssaySettings, times_s: Float64Array, exposure_s: number): Motion {
  return move(body, box, fieldProgram(settings.field), times_s, exposure_s, settings);
}

/** Steps along x and y from one frame to a later one, of motions that stayed on the same side of the box. */
function steps(motions: readonly Motion[], from: number, to: number): { dx: number[]; dy: number[] } {
  const stayed = motions.filter((m) => m.visit[from] === m.visit[to]);
  return {
    dx: stayed.map((m) => (m.x_um[to] as number) - (m.x_um[from] as number)),
    dy: stayed.map((m) => (m.y_um[to] as number) - (m.y_um[from] as number)),
  };
}

const mean = (values: readonly number[]) => values.reduce((sum, v) => sum + v, 0) / values.length;
const meanSquare = (values: readonly number[]) => mean(values.map((v) => v * v));

describe("dead cells", () => {
  const { motions, box } = moveAll({ swimmers: { cells: 0 }, dead: { cells: 1500 } }, evenTimes(61, 30));
  const diffusion = sphereDrag(1, 22).diffusion_um2_s;

  it.each([1, 6, 30, 60])("spread as 4 D t after %d frames", (lag) => {
    const { dx, dy } = steps(motions, 0, lag);
    const spread = meanSquare(dx) + meanSquare(dy);
    // The mean of 2n squared normals has a relative standard error of 1/√n.
    expect(Math.abs(spread / ((4 * diffusion * lag) / 30) - 1)).toBeLessThan(4 / Math.sqrt(dx.length));
  });

  it("go nowhere on average, and stay spread evenly between floor and lid", () => {
    const { dx } = steps(motions, 0, 60);
    expect(Math.abs(mean(dx))).toBeLessThan(4 * Math.sqrt(meanSquare(dx) / dx.length));
    const heights = motions.map((m) => (m.z_um[60] as number) / box.depth_um);
    expect(Math.min(...heights)).toBeGreaterThanOrEqual(0);
    expect(Math.max(...heights)).toBeLessThanOrEqual(1);
    expect(Math.abs(mean(heights) - 0.5)).toBeLessThan(4 / Math.sqrt(12 * heights.length));
  });
});

describe("flow", () => {
  it("carries what only diffuses, and leaves stuck cells", () => {
    const sample = { flow_um_s: [9, -5] as const };
    const times = evenTimes(31, 30);
    const { motions } = moveAll({ swimmers: { cells: 0 }, dead: { cells: 600 }, sample }, times);
    const { dx, dy } = steps(motions, 0, 30);
    expect(Math.abs(mean(dx) - 9)).toBeLessThan(4 * Math.sqrt(0.46 / dx.length));
    expect(Math.abs(mean(dy) + 5)).toBeLessThan(4 * Math.sqrt(0.46 / dy.length));
    const stuck = moveAll({ swimmers: { cells: 0 }, stuck: { cells: 5 }, sample }, times).motions;
    for (const m of stuck) expect([m.x_um[30], m.y_um[30], m.z_um[30]]).toEqual([m.x_um[0], m.y_um[0], m.z_um[0]]);
  });
});

describe("swimmers", () => {
  const noField = { steps: [], ambient_mT: [0, 0] as const };

  it("lose their direction at the thermal rate without a field", () => {
    const { motions } = moveAll({ swimmers: { cells: 1200 }, field: noField }, evenTimes(61, 30));
    const rate = sphereDrag(1, 22).rotationalDiffusion_per_s;
    for (const lag of [15, 60]) {
      // Two of three components, which are alike on average: ⟨n₁n₁' + n₂n₂'⟩ = 2/3 exp(-2 D_r t).
      const kept = motions.map(
        (m) => (m.nx[0] as number) * (m.nx[lag] as number) + (m.ny[0] as number) * (m.ny[lag] as number),
      );
      const error = Math.sqrt((meanSquare(kept) - mean(kept) ** 2) / kept.length);
      expect(Math.abs(mean(kept) - (2 / 3) * Math.exp((-2 * rate * lag) / 30))).toBeLessThan(4 * error);
    }
  });

  it("lose it faster by as much as they are restless", () => {
    const swimmers = { cells: 1200, restlessness: 4 };
    const { motions } = moveAll({ swimmers, field: noField }, evenTimes(31, 30));
    const kept = motions.map(
      (m) => (m.nx[0] as number) * (m.nx[30] as number) + (m.ny[0] as number) * (m.ny[30] as number),
    );
    const error = Math.sqrt((meanSquare(kept) - mean(kept) ** 2) / kept.length);
    const rate = 4 * sphereDrag(1, 22).rotationalDiffusion_per_s;
    expect(Math.abs(mean(kept) - (2 / 3) * Math.exp(-2 * rate))).toBeLessThan(4 * error);
  });

  it("point along a steady field by coth x - 1/x, south-seekers against it", () => {
    const field = { steps: [{ t_s: 0, magnitude_mT: 0.05, angle_deg: 90 }] };
    const swimmers = { cells: 800, momentCv: 0 };
    const x = energyRatio(4e-16, 0.05, resolveOptions({}));
    for (const south of [0, 1]) {
      const { motions } = moveAll({ swimmers: { ...swimmers, southFraction: south }, field }, evenTimes(31, 30));
      const along = motions.map((m) => m.ny[30] as number);
      const error = Math.sqrt((meanSquare(along) - mean(along) ** 2) / along.length);
      const langevin = 1 / Math.tanh(x) - 1 / x;
      expect(Math.abs(mean(along) - (1 - 2 * south) * langevin)).toBeLessThan(4 * error);
    }
  });

  it("go at their own speed, lognormal over cells with the mean and spread asked for", () => {
    const { motions } = moveAll({ swimmers: { cells: 2500, speed_um_s: 40, speedCv: 0.25 } }, evenTimes(2, 30));
    const speeds = motions.map((m) => m.body.speed_um_s);
    expect(Math.abs(mean(speeds) / 40 - 1)).toBeLessThan((4 * 0.25) / Math.sqrt(speeds.length));
    const spread = Math.sqrt(meanSquare(speeds) - mean(speeds) ** 2);
    expect(Math.abs(spread / 10 - 1)).toBeLessThan(0.08);
  });

  it("turn after a reversal at m B / f_r: the mean course swings as the torque says", () => {
    // Far above thermal energy the course is v tanh(ω(t - t₀)) with a t₀ of each cell's own; so is its slope against
    // itself, d(cos)/dt = ω(1 - cos²), which needs no t₀.
    const field = {
      steps: [
        { t_s: 0, magnitude_mT: 2, angle_deg: 0 },
        { t_s: 0.1, magnitude_mT: 2, angle_deg: 180 },
      ],
    };
    const swimmers = { cells: 150, momentCv: 0 };
    const fps = 400;
    const { motions } = moveAll({ swimmers, field }, evenTimes(fps, fps));
    const rate = (4e-16 * 2e-3) / sphereDrag(1, 22).rotational_N_m_s;
    const ratios: number[] = [];
    for (const m of motions) {
      for (let i = 41; i < fps - 1; i++) {
        const before = -(m.nx[i] as number);
        const after = -(m.nx[i + 1] as number);
        if (Math.abs(before) < 0.5) ratios.push((Math.atanh(after) - Math.atanh(before)) * fps);
      }
    }
    expect(ratios.length).toBeGreaterThan(500);
    expect(Math.abs(mean(ratios) / rate - 1)).toBeLessThan(0.03);
  });

  it("move by what they travel: exposure smear is speed × exposure", () => {
    const field = { steps: [{ t_s: 0, magnitude_mT: 5, angle_deg: 30 }] };
    const { motions } = moveAll({ swimmers: { cells: 100, momentCv: 0 }, field }, evenTimes(5, 30), 0.02);
    const along = motions.map((m) => Math.hypot(m.dx_um[3] as number, m.dy_um[3] as number) / m.body.speed_um_s);
    expect(mean(along)).toBeGreaterThan(0.0195);
    expect(mean(along)).toBeLessThan(0.0205);
    // 30° counter-clockwise from image right is up and right.
    const angles = motions.map((m) => Math.atan2(m.dy_um[3] as number, m.dx_um[3] as number));
    expect(mean(angles)).toBeCloseTo(Math.PI / 6, 1);
  });

  it("stay between floor and lid", () => {
    const { motions, box } = moveAll({ swimmers: { cells: 100 }, field: noField }, evenTimes(90, 30));
    for (const m of motions) {
      expect(Math.min(...m.z_um)).toBeGreaterThanOrEqual(0);
      expect(Math.max(...m.z_um)).toBeLessThanOrEqual(box.depth_um);
    }
  });
});
