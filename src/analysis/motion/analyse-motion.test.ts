import { describe, expect, it } from "vitest";
import { normalFrom } from "../../../tests/helpers/normal.ts";
import { evenTimes, pathsOf, type Walker, walk } from "../../../tests/helpers/simulated-tracks.ts";
import { type Scale, seededRandom } from "../../quantities/index.ts";
import { analyseMotion, defaultMotionSettings, type Motion } from "./index.ts";
import { speedFinding } from "./population.ts";

const scale: Scale = { um_per_px: 0.45, uncertainty_um_per_px: 0.0045, from: "trial.json" };
// Pixels of 0.45 µm: a body of 1 µm radius diffuses by 1.2 px²/s.
const dead: Walker = { speed: 0, diffusion: 1.2, sigma: 0.1 };

function measure(walkers: readonly Walker[], seconds: number, seed: number, of: Scale | null = scale): Motion {
  const random = seededRandom(seed);
  const normal = normalFrom(random);
  const tracks = walkers.map((w) =>
    walk({ ...w, heading_rad: 2 * Math.PI * random() }, evenTimes(seconds, 30), normal),
  );
  return analyseMotion(pathsOf(tracks), 1 / 30, of, defaultMotionSettings);
}

const codes = (motion: Motion) => motion.warnings.map((w) => w.code);

describe("motion of a trial's cells", () => {
  it("gives every motile cell its speed relative to the flow, within its error", () => {
    const flow = [12, -7] as const;
    const speeds = Array.from({ length: 30 }, (_, i) => 40 + 3 * i);
    const swimmers = speeds.map((speed): Walker => ({ ...dead, speed, rotation_rad2_s: 0.15, flow }));
    const motion = measure([...swimmers, ...Array<Walker>(10).fill({ ...dead, flow })], 3, 1);
    const pulls = speeds.map((speed, i) => {
      const cell = motion.cells[i];
      if (!cell?.kept) throw new Error(`cell ${i + 1} doesn't count`);
      return ((cell.speed_px_s as number) - speed) / (cell.speedSe_px_s as number);
    });
    // Sum of 30 squared normal numbers: mean 30, standard deviation √60; 3 of them.
    const chi2 = pulls.reduce((sum, p) => sum + p * p, 0);
    expect(Math.abs(chi2 - 30)).toBeLessThan(3 * Math.sqrt(60));
    expect(motion.cells.slice(30).every((c) => c.motile === false && c.reason === "only diffuses")).toBe(true);
    expect(motion.speed.n_cells).toBe(30);
    expect(motion.speed.n_judged).toBe(40);
    expect(motion.speed.motile_fraction).toBe(0.75);
    expect(motion.drift?.from).toBe("diffusing cells");
    // 3 errors of a median of ten tracks' estimates, 17 % each: 3 · 1.25 · 17 / √10 %.
    expect(Math.abs((motion.diffusion_px2_s as number) / 1.2 - 1)).toBeLessThan(0.21);
  });

  it("gives micrometres only with a scale, whose uncertainty widens the interval", () => {
    const swimmers = Array.from({ length: 12 }, (_, i): Walker => ({ ...dead, speed: 60 + i, rotation_rad2_s: 0.5 }));
    const without = measure(swimmers, 3, 2, null).speed;
    const within = measure(swimmers, 3, 2).speed;
    expect(without.mean_um_s).toBeNull();
    expect(without.mean_px_s).toEqual(within.mean_px_s);
    expect(within.mean_um_s?.value).toBeCloseTo(0.45 * (within.mean_px_s?.value as number), 10);
    const ofCells = 0.45 * (within.mean_px_s?.standardError as number);
    const ofScale = 0.0045 * (within.mean_px_s?.value as number);
    expect(within.mean_um_s?.standardError).toBeCloseTo(Math.hypot(ofCells, ofScale), 10);
  });

  it("gives one motile cell no mean, and says so", () => {
    const motion = measure([{ ...dead, speed: 70 }, ...Array<Walker>(8).fill(dead)], 2, 3);
    expect(motion.speed.n_cells).toBe(1);
    expect(motion.speed.mean_px_s).toBeNull();
    expect(motion.speed.mean_um_s).toBeNull();
    expect(motion.speed.sd_px_s).toBeNull();
    expect(motion.cells[0]?.kept).toBe(true);
    expect(codes(motion)).toContain("one-motile-cell");
  });

  it("says when nothing swims, and when nothing was followed", () => {
    const still = measure(Array<Walker>(12).fill(dead), 2, 4);
    expect(still.speed.n_cells).toBe(0);
    expect(still.speed.motile_fraction).toBe(0);
    expect(still.speed.median_px_s).toBeNull();
    expect(codes(still)).toEqual(["nothing-swims"]);
    const none = measure([], 2, 5);
    expect(none.speed.motile_fraction).toBeNull();
    expect(none.drift).toBeNull();
    expect(codes(none)).toEqual(["no-cells"]);
  });

  it("leaves cells followed for less than half a second out of the figures", () => {
    const motion = measure(Array<Walker>(6).fill({ ...dead, speed: 90 }), 0.4, 6);
    expect(motion.cells.every((c) => !c.kept && c.reason === "followed for less than 0.5 s")).toBe(true);
    expect(motion.speed.n_cells).toBe(0);
    expect(codes(motion)).toContain("no-cells");
  });

  it("warns when the flow can't be told", () => {
    const motion = measure(Array<Walker>(4).fill({ ...dead, speed: 80 }), 2, 7);
    expect(motion.drift).toBeNull();
    expect(codes(motion)).toContain("flow-unknown");
  });
});

describe("speed over cells", () => {
  it.each([3, 8, 40])("of %d cells lies within its interval 95 times in 100", (cells) => {
    const runs = 1500;
    const normal = normalFrom(seededRandom(cells));
    let px = 0;
    let um = 0;
    for (let k = 0; k < runs; k++) {
      const speeds = Array.from({ length: cells }, () => 80 + 20 * normal());
      const measured: Scale = { ...scale, um_per_px: 0.45 + 0.02 * normal(), uncertainty_um_per_px: 0.02 };
      const found = speedFinding(speeds, { n: cells, motile: cells }, measured);
      const holds = (interval: readonly [number, number] | undefined, truth: number) =>
        interval !== undefined && interval[0] <= truth && truth <= interval[1];
      if (holds(found.mean_px_s?.ci95, 80)) px++;
      if (holds(found.mean_um_s?.ci95, 36)) um++;
    }
    // Binomial standard error 0.56 %; 3 of them. In micrometres the sum of two errors of different kinds errs on the safe side.
    expect(Math.abs(px / runs - 0.95)).toBeLessThan(0.017);
    expect(um / runs).toBeGreaterThan(0.933);
    expect(um / runs).toBeLessThan(0.985);
  });

  it("of two cells is worked by hand", () => {
    // Mean 50, standard deviation √200, standard error √200 / √2 = 10; t for one degree of freedom 12.7062.
    const found = speedFinding([40, 60], { n: 5, motile: 2 }, null);
    expect(found.mean_px_s?.value).toBe(50);
    expect(found.mean_px_s?.standardError).toBeCloseTo(10, 12);
    expect(found.mean_px_s?.ci95[1]).toBeCloseTo(50 + 127.062, 3);
    expect(found.motile_fraction).toBeCloseTo(0.4, 12);
    expect(found.n_judged).toBe(5);
  });
});
