import { describe, expect, it } from "vitest";
import { normalFrom } from "../../../tests/helpers/normal.ts";
import { evenTimes, walk } from "../../../tests/helpers/simulated-tracks.ts";
import { seededRandom } from "../../quantities/index.ts";
import type { Track } from "./track.ts";
import { overallVelocity, velocitiesOf } from "./windows.ts";

function trackAt(t: Float64Array, x: (t: number) => number, y: (t: number) => number): Track {
  return { t, x: t.map(x), y: t.map(y), statedVariance: 0, duration: (t.at(-1) as number) - (t[0] as number) };
}

describe("velocities over windows", () => {
  // First-derivative weights of second order, Savitzky and Golay 1964, Anal. Chem. 36, 1627: k / Σk². The gain is the
  // standard deviation of the derivative for positions of standard deviation 1 and unit steps.
  it.each([
    [3, [-1, 0, 1], 2, Math.SQRT1_2],
    [5, [-2, -1, 0, 1, 2], 10, 0.316227766],
    [7, [-3, -2, -1, 0, 1, 2, 3], 28, 0.188982237],
  ])("of %d points are the Savitzky–Golay derivative", (points, weights, over, gain) => {
    const random = seededRandom(points);
    const t = evenTimes(24, 1);
    const track = trackAt(
      t,
      () => random() * 10,
      () => random() * 10,
    );
    const m = (points - 1) / 2;
    const v = velocitiesOf(track, 2 * m);
    expect(v.t).toEqual(Array.from({ length: 25 - 2 * m }, (_, i) => i + m));
    v.t.forEach((at, i) => {
      const slope = (values: Float64Array) =>
        weights.reduce((sum, w, k) => sum + (w * (values[at - m + k] as number)) / over, 0);
      expect(v.vx[i]).toBeCloseTo(slope(track.x), 9);
      expect(v.vy[i]).toBeCloseTo(slope(track.y), 9);
      expect(Math.sqrt(v.noise[i]?.position as number)).toBeCloseTo(gain, 8);
    });
  });

  it("of a straight line at uneven times are its slope exactly", () => {
    const t = Float64Array.of(0, 0.03, 0.07, 0.08, 0.15, 0.17, 0.22, 0.3, 0.31, 0.36);
    const track = trackAt(
      t,
      (s) => 5 + 40 * s,
      (s) => 2 - 13 * s,
    );
    const v = velocitiesOf(track, 0.14);
    expect(v.t.length).toBeGreaterThan(3);
    for (const vx of v.vx) expect(vx).toBeCloseTo(40, 9);
    for (const vy of v.vy) expect(vy).toBeCloseTo(-13, 9);
    const whole = overallVelocity(track);
    expect(whole.vx).toBeCloseTo(40, 9);
    expect(whole.vy).toBeCloseTo(-13, 9);
  });

  it("scatter as their stated noise, at even and uneven times", () => {
    const random = seededRandom(40);
    const normal = normalFrom(random);
    const [D, sigma] = [0.8, 0.15];
    let now = 0;
    const uneven = Float64Array.from({ length: 9 }, () => {
      now += 0.02 + 0.03 * random();
      return now;
    });
    for (const times of [evenTimes(8 / 30, 30), uneven]) {
      const scatter: number[] = [];
      let stated = 0;
      for (let k = 0; k < 4000; k++) {
        const v = overallVelocity(walk({ speed: 0, diffusion: D, sigma }, times, normal));
        stated = v.position * sigma * sigma + v.diffusion * D;
        scatter.push(v.vx * v.vx, v.vy * v.vy);
      }
      const variance = scatter.reduce((a, b) => a + b, 0) / scatter.length;
      // A variance from 8000 normal numbers is known to √(2 / 8000) = 1.6 %; 3 standard errors.
      expect(Math.abs(variance / stated - 1)).toBeLessThan(3 * Math.sqrt(2 / scatter.length));
    }
  });

  it("take in the next points where frames are far apart, but none beyond a whole window", () => {
    const t = Float64Array.of(0, 0.1, 0.2, 0.35, 0.4, 0.9, 1, 1.1);
    const v = velocitiesOf(
      trackAt(
        t,
        (s) => 7 * s,
        () => 0,
      ),
      0.12,
    );
    // About 0.2 s the next on the right is 0.15 s away, about 0.4 and 0.9 s the next is half a second away.
    expect(v.t).toEqual([0.1, 1]);
    for (const vx of v.vx) expect(vx).toBeCloseTo(7, 9);
  });

  it("have none where the window isn't full", () => {
    const t = evenTimes(2, 10);
    const still = () => 0;
    expect(velocitiesOf(trackAt(t, still, still), 3).t).toEqual([]);
    expect(velocitiesOf(trackAt(t, still, still), 2).t).toEqual([1]);
    expect(velocitiesOf(trackAt(t, still, still), 0.08).t).toEqual([]);
  });
});
