import { describe, expect, it } from "vitest";
import { defaultSettings } from "./options.ts";
import { handling } from "./shake.ts";

const { phone, sensor } = defaultSettings;
const moments_s = Array.from({ length: 6000 }, (_, i) => i / 100);

describe("a hand-held phone", () => {
  it("shakes by the asked root mean square along each axis, from where it began", () => {
    const hand = handling(4, 60, { ...phone, shake_px: 1.5 }, sensor);
    expect(hand.shift_px(0)).toEqual([0, 0]);
    for (const axis of [0, 1] as const) {
      const at = moments_s.map((t) => hand.shift_px(t)[axis]);
      const mean = at.reduce((sum, v) => sum + v, 0) / at.length;
      const rms = Math.sqrt(at.reduce((sum, v) => sum + (v - mean) ** 2, 0) / at.length);
      expect(Math.abs(rms / 1.5 - 1)).toBeLessThan(0.1);
    }
  });

  it("stays within the reach it names, knock to either side included", () => {
    for (const bump_px of [8, -8]) {
      const hand = handling(9, 60, { ...phone, shake_px: 2, bump_px }, sensor);
      const furthest = Math.max(...moments_s.map((t) => Math.max(...hand.shift_px(t).map(Math.abs))));
      expect(furthest).toBeLessThanOrEqual(hand.reach_px);
      expect(furthest).toBeGreaterThan(6);
    }
  });

  it("is knocked once, rings, and stays displaced", () => {
    const hand = handling(1, 10, { ...phone, bump_px: 10 }, sensor);
    expect(hand.shift_px(5.99)[0]).toBe(0);
    expect(hand.shift_px(6)[0]).toBe(10);
    expect(hand.shift_px(6.1)[0]).toBeLessThan(2);
    expect(hand.shift_px(9.9)).toEqual([expect.closeTo(4, 3), expect.closeTo(2, 3)]);
  });

  it("lets the exposure drift and step", () => {
    const hand = handling(1, 10, phone, { ...sensor, gainDrift: 0.04, gainStep: 0.1 });
    expect(hand.gain(0)).toBe(1);
    expect(hand.gain(2.5)).toBeCloseTo(1.04, 12);
    expect(hand.gain(7.5)).toBeCloseTo(0.96 * 1.1, 12);
  });
});
