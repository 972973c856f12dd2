import { describe, expect, it } from "vitest";
import { normalFrom } from "../../../tests/helpers/normal.ts";
import { evenTimes, type Walker, walk } from "../../../tests/helpers/simulated-tracks.ts";
import { seededRandom } from "../../quantities/index.ts";
import { mean, standardDeviation, z975 } from "../../statistics/index.ts";
import { chooseWindow_s, pathSpeed } from "./speed.ts";
import type { Track } from "./track.ts";

/** Path length over time, frame to frame: what is commonly called curvilinear velocity. */
function frameToFrame(track: Track): number {
  let length = 0;
  for (let i = 1; i < track.t.length; i++) {
    const dx = (track.x[i] as number) - (track.x[i - 1] as number);
    const dy = (track.y[i] as number) - (track.y[i - 1] as number);
    length += Math.hypot(dx, dy);
  }
  return length / track.duration;
}

/** Speeds of many simulated tracks, and the share whose 95 % interval holds the truth. Micrometres and seconds. */
function simulate(walker: Walker, times: readonly Float64Array[], interval_s: number, runs: number, seed: number) {
  const normal = normalFrom(seededRandom(seed));
  const noise = { variance: walker.sigma ** 2, coefficient: walker.diffusion };
  const window = chooseWindow_s(walker.speed, { ...noise, steps: 100 }, interval_s, 0.066, 0.25);
  const speeds: number[] = [];
  const raw: number[] = [];
  let held = 0;
  for (let k = 0; k < runs; k++) {
    const track = walk({ ...walker, heading_rad: k }, times[k % times.length] as Float64Array, normal);
    const found = pathSpeed(track, window, noise, 0);
    if (!found) throw new Error("no full window");
    speeds.push(found.speed);
    raw.push(frameToFrame(track));
    if (Math.abs(found.speed - walker.speed) <= z975 * found.standardError) held++;
  }
  return { speeds, raw, coverage: held / runs };
}

const errorOf = (values: readonly number[]) => standardDeviation(values) / Math.sqrt(values.length);

describe("speed along a path", () => {
  // Expected length of a step with normal errors (S. O. Rice 1945, Bell Syst. Tech. J. 24, 46), σ = 0.2 µm, no diffusion:
  // evaluated independently (SciPy).
  it.each([
    [50, 30, 50.725432],
    [50, 60, 52.986959],
    [50, 120, 62.970388],
    [50, 240, 96.242883],
    [20, 240, 86.914146],
  ])("at %d µm/s and %d frames/s is unbiased, where frame-to-frame speed is %d", (speed, fps, biased) => {
    const { speeds, raw } = simulate({ speed, diffusion: 0, sigma: 0.2 }, [evenTimes(1, fps)], 1 / fps, 1000, fps);
    expect(Math.abs(mean(raw) - biased)).toBeLessThan(3 * errorOf(raw));
    // 3 standard errors, and 0.5 % for the terms of higher order that the correction leaves.
    expect(Math.abs(mean(speeds) - speed)).toBeLessThan(3 * errorOf(speeds) + 0.005 * speed);
  });

  it.each([30, 60, 120, 240])("at %d frames/s has intervals that hold the truth as often as they say", (fps) => {
    const walker = { speed: 50, diffusion: 0.245, sigma: 0.2 };
    const { coverage } = simulate(walker, [evenTimes(1, fps)], 1 / fps, 1000, 7 + fps);
    // The binomial standard error at 1000 runs is 0.7 %, so that 3 % is more than 4 of them.
    expect(coverage).toBeGreaterThan(0.92);
    expect(coverage).toBeLessThan(0.98);
  });

  it("is unbiased, with honest intervals, at uneven times with frames missing", () => {
    const random = seededRandom(77);
    const times = Array.from({ length: 50 }, () => {
      const all: number[] = [];
      for (let t = 0; t < 1.2; t += (1 + 0.3 * (random() - 0.5)) / 30)
        if (all.length < 2 || random() > 0.1) all.push(t);
      return Float64Array.from(all);
    });
    const { speeds, coverage } = simulate({ speed: 40, diffusion: 0.245, sigma: 0.1 }, times, 1 / 30, 1000, 78);
    expect(Math.abs(mean(speeds) - 40)).toBeLessThan(3 * errorOf(speeds) + 0.2);
    expect(coverage).toBeGreaterThan(0.92);
    expect(coverage).toBeLessThan(0.98);
  });

  it("of a steadily turning cell is its swimming speed, not its net displacement", () => {
    const walker = { speed: 40, turning_rad_s: Math.PI, diffusion: 0.2, sigma: 0.1 };
    const { speeds } = simulate(walker, [evenTimes(2, 60)], 1 / 60, 300, 79);
    // A chord over the window ±w/2 is short by (Ω w)² / 40 of a fitted slope: 0.3 % at 0.1 s. Net displacement is 0.
    expect(Math.abs(mean(speeds) / 40 - 1)).toBeLessThan(0.01);
  });

  it("straightness is near 1 for a straight swimmer and near 2/π for half a circle", () => {
    const normal = normalFrom(seededRandom(80));
    const noise = { variance: 0.01, coefficient: 0.2 };
    const of = (turning_rad_s: number) =>
      pathSpeed(walk({ speed: 40, turning_rad_s, diffusion: 0.2, sigma: 0.1 }, evenTimes(1, 60), normal), 0.1, noise, 0)
        ?.straightness;
    expect(of(0)).toBeGreaterThan(0.97);
    expect(Math.abs((of(Math.PI) as number) - 2 / Math.PI)).toBeLessThan(0.03);
  });

  it("counts the flow's uncertainty, and is null without a full window", () => {
    const track = walk({ speed: 40, diffusion: 0, sigma: 0 }, evenTimes(1, 30), normalFrom(seededRandom(81)));
    const noise = { variance: 0, coefficient: 0 };
    expect(pathSpeed(track, 0.1, noise, 0)?.standardError).toBe(0);
    expect(pathSpeed(track, 0.1, noise, 4)?.standardError).toBeCloseTo(2, 12);
    expect(pathSpeed(track, 1.5, noise, 0)).toBeNull();
  });
});

describe("window", () => {
  const noise = { variance: 0.04, coefficient: 0.245, steps: 1000 };

  it("is as long as the noise needs, within bounds", () => {
    const fast = chooseWindow_s(100, noise, 1 / 60, 0.066, 0.25);
    const slow = chooseWindow_s(8, noise, 1 / 60, 0.066, 0.25);
    expect(fast).toBeLessThan(slow);
    expect(fast).toBeGreaterThanOrEqual(0.066);
    expect(slow).toBeLessThan(0.25 * 1.03);
  });

  it("holds three points even where frames are slow", () => {
    expect(chooseWindow_s(50, noise, 0.2, 0.066, 0.25)).toBeGreaterThanOrEqual(0.4);
  });
});
