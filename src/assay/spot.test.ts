import { describe, expect, it } from "vitest";
import { defaultSettings } from "./options.ts";
import { addGaussian, imaging } from "./spot.ts";

const optics = defaultSettings.optics;
const scale = 0.45;

describe("a cell's spot", () => {
  it("has the length of the rod along its axis and the width across, blurred by the point spread", () => {
    const spot = imaging(optics, scale).spot(0.6, 0.8, 0, 0.3);
    const along = spot.cxx * 0.36 + 2 * spot.cxy * 0.48 + spot.cyy * 0.64;
    const across = spot.cxx * 0.64 - 2 * spot.cxy * 0.48 + spot.cyy * 0.36;
    // Variance of a uniform rod: length²/12.
    expect(along * scale ** 2).toBeCloseTo(3 ** 2 / 12 + 0.45 ** 2, 12);
    expect(across * scale ** 2).toBeCloseTo(1 ** 2 / 12 + 0.45 ** 2, 12);
  });

  it("looks round and darker when the rod points at the viewer", () => {
    const { spot } = imaging(optics, scale);
    const end = spot(0, 0, 0, 0.3);
    expect(end.cxx).toBeCloseTo(end.cyy, 12);
    expect(end.peak).toBeGreaterThan(spot(1, 0, 0, 0.3).peak);
  });

  it("dims by the asked contrast in focus, dark or bright", () => {
    expect(Math.exp(-imaging(optics, scale).spot(1, 0, 0, 0.3).peak)).toBeCloseTo(0.7, 12);
    const bright = imaging({ ...optics, polarity: "bright" }, scale);
    expect(Math.exp(-bright.spot(1, 0, 0, 0.9).peak)).toBeCloseTo(1.9, 12);
  });

  it("keeps the sum of its core's absorbance out of focus, and grows a ring", () => {
    const { spot } = imaging(optics, scale);
    const amount = (s: ReturnType<typeof spot>) => s.peak * Math.sqrt(s.cxx * s.cyy - s.cxy ** 2);
    const sharp = spot(0.8, 0.6, 0, 0.3);
    const soft = spot(0.8, 0.6, 12, 0.3);
    expect(amount(soft)).toBeCloseTo(amount(sharp), 12);
    expect(soft.peak).toBeLessThan(0.8 * sharp.peak);
    expect(sharp.halo).toBe(0);
    expect(soft.halo).toBeGreaterThan(0.15);
    expect(imaging({ ...optics, polarity: "phase" }, scale).spot(1, 0, 0, 0.3).halo).toBe(0.4);
  });
});

describe("drawing a Gaussian", () => {
  const shape = { cxx: 5, cxy: 1.5, cyy: 3 };
  const width = 64;
  const height = 48;

  it("puts its centre, its spread and its sum where they belong", () => {
    const layer = new Float32Array(width * height);
    addGaussian(layer, width, height, 30.3, 20.8, shape, 0.5);
    let sum = 0;
    let x = 0;
    let y = 0;
    layer.forEach((v, k) => {
      sum += v;
      x += v * (k % width);
      y += v * Math.floor(k / width);
    });
    let xy = 0;
    layer.forEach((v, k) => {
      xy += (v * ((k % width) - x / sum) * (Math.floor(k / width) - y / sum)) / sum;
    });
    expect(x / sum).toBeCloseTo(30.3, 2);
    expect(y / sum).toBeCloseTo(20.8, 2);
    expect(xy).toBeCloseTo(1.5, 1);
    expect(sum / (0.5 * 2 * Math.PI * Math.sqrt(15 - 2.25))).toBeCloseTo(1, 2);
  });

  it("touches no pixel outside the window it names, and is cut at the edges", () => {
    const layer = new Float32Array(width * height);
    const { x0, x1, y0, y1 } = addGaussian(layer, width, height, 1.2, height - 2, shape, 1);
    expect(x0).toBe(0);
    expect(y1).toBe(height);
    layer.forEach((v, k) => {
      const inside = k % width >= x0 && k % width < x1 && k / width >= y0 && k / width < y1;
      if (!inside) expect(v).toBe(0);
    });
  });
});
