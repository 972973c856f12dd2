import { describe, expect, it } from "vitest";
import { captureTimes } from "./capture.ts";
import { type AssaySettings, defaultSettings } from "./options.ts";

const time = (changed: Partial<AssaySettings["time"]>) => ({ ...defaultSettings.time, ...changed });
const intervals = (times_s: Float64Array) => Array.from(times_s.slice(1), (t, i) => t - (times_s[i] as number));

describe("capture times", () => {
  it("are even when nothing disturbs them, and end before the clip does", () => {
    const { times_s, constantRate, frames, containerTimes_s } = captureTimes(1, time({ seconds: 2, fps: 30 }));
    expect(frames).toBe(60);
    expect(constantRate).toBe(true);
    expect(Array.from(times_s)).toEqual(Array.from({ length: 60 }, (_, i) => i / 30));
    expect(containerTimes_s).toEqual(times_s);
  });

  it("wander and jitter by what is asked, in whole milliseconds, always forward", () => {
    const { times_s, constantRate } = captureTimes(3, time({ seconds: 60, fps: 30, jitter: 0.05, wander: 0.2 }));
    expect(constantRate).toBe(false);
    for (const t of times_s) expect(Math.abs(t * 1000 - Math.round(t * 1000))).toBeLessThan(1e-6);
    const relative = intervals(times_s).map((d) => d * 30 - 1);
    expect(Math.min(...relative)).toBeGreaterThan(-0.5);
    // A swing of amplitude a has variance a²/2; rounding to 1 ms adds (0.03)²/6 of the interval squared.
    const spread = Math.sqrt(relative.reduce((sum, d) => sum + d * d, 0) / relative.length);
    expect(Math.abs(spread - Math.sqrt(0.2 ** 2 / 2 + 0.05 ** 2 + 0.03 ** 2 / 6))).toBeLessThan(0.01);
  });

  it("leave a gap where a frame was dropped", () => {
    const { times_s, frames } = captureTimes(2, time({ seconds: 60, fps: 30, dropped: 0.1 }));
    expect(frames).toBeGreaterThan(1800 * 0.87);
    expect(frames).toBeLessThan(1800 * 0.93);
    const gaps = intervals(times_s).filter((d) => d > 1.5 / 30);
    expect(gaps.length).toBeGreaterThan(120);
    expect(Math.max(...gaps) * 30).toBeGreaterThan(1.9);
  });

  it("show an earlier picture again where a frame was repeated", () => {
    const { shows, frames } = captureTimes(2, time({ seconds: 60, fps: 30, repeated: 0.1 }));
    const repeated = Array.from(shows.keys()).filter((i) => shows[i] !== i);
    expect(Math.abs(repeated.length / frames - 0.1)).toBeLessThan(4 * Math.sqrt(0.09 / frames));
    for (const i of repeated) expect(shows[i]).toBe(shows[i - 1]);
  });

  it("are stretched in the container of slow motion", () => {
    const { times_s, containerTimes_s } = captureTimes(1, time({ seconds: 1, fps: 120, container_fps: 30 }));
    expect(times_s.length).toBe(120);
    expect(times_s[60]).toBeCloseTo(0.5, 12);
    expect(containerTimes_s[60]).toBeCloseTo(2, 12);
  });
});
