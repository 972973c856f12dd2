import { describe, expect, it } from "vitest";
import { normalFrom } from "../../tests/helpers/normal.ts";
import { spot, spotPicture } from "../../tests/helpers/spot-picture.ts";
import { seededRandom } from "../quantities/index.ts";
import { axesOf, measureSpot, positionErrors } from "./spot-shape.ts";

// Cramér–Rao bound of a Gaussian spot's place in white noise, √(2/π) / SNR per axis with the SNR of the peak pixel, whatever
// the width; along the axes of an elongated spot times √(s∥/s⊥) and √(s⊥/s∥). Derived from the Fisher information and
// computed independently (NumPy, numerical Fisher matrix): 0.159576912 px at SNR 5; 0.260588 and 0.097720502 px for 4 × 1.5 px.

/** Root mean square errors along x and y of many measurements at random places within a pixel. */
function errorsOf(xx: number, yy: number, snr: number, sigma: number, freedom: number, runs: number) {
  const random = seededRandom(41);
  const normal = normalFrom(random);
  let ex = 0;
  let ey = 0;
  let bias = 0;
  let stated = 0;
  for (let k = 0; k < runs; k++) {
    const truth = spot(24 + random() - 0.5, 24 + random() - 0.5, snr, xx, yy);
    const found = measureSpot(spotPicture([truth], 49, normal), 1, 24, 24, sigma, freedom, []);
    if (!found.good) throw new Error("a spot was lost");
    ex += (found.x - truth.x) ** 2 / runs;
    ey += (found.y - truth.y) ** 2 / runs;
    bias += (found.x - truth.x + found.y - truth.y) / (2 * runs);
    stated += positionErrors(found, 1).seX ** 2 / runs;
  }
  return { x: Math.sqrt(ex), y: Math.sqrt(ey), bias, stated: Math.sqrt(stated) };
}

describe("place of a lone spot", () => {
  it.each([
    [5, 0.159576912],
    [10, 0.079788456],
    [20, 0.039894228],
  ])("at a signal over noise of %d errs by %d px, the bound, and says so", (snr, bound) => {
    const { x, y, bias, stated } = errorsOf(2.25, 2.25, snr, 1.5, 0, 400);
    // A root mean square from 400 values is known to 3.5 %: 3 of them, and 5 % above the bound at most for pixels.
    for (const error of [x, y]) {
      expect(error / bound).toBeGreaterThan(1 - 0.106);
      expect(error / bound).toBeLessThan(1.05 + 0.106);
    }
    expect(Math.abs(bias)).toBeLessThan((3 * bound) / Math.sqrt(800));
    expect(stated / bound).toBeGreaterThan(0.93);
    expect(stated / bound).toBeLessThan(1.1);
  });

  it("of an elongated spot has the bound of each axis when its shape is its own", () => {
    // Usual size √(4 · 1.5) px; at twice the signal of the values above, half their error.
    const { x, y } = errorsOf(16, 2.25, 10, Math.sqrt(6), 1, 300);
    expect(x / (0.260588006 / 2)).toBeGreaterThan(0.87);
    expect(x / (0.260588006 / 2)).toBeLessThan(1.2);
    expect(y / (0.097720502 / 2)).toBeGreaterThan(0.87);
    expect(y / (0.097720502 / 2)).toBeLessThan(1.2);
  });

  it("has the bound stated along tilted axes too", () => {
    expect(positionErrors(spot(0, 0, 5, 16, 2.25), 1).seX).toBeCloseTo(0.260588006, 6);
    expect(positionErrors(spot(0, 0, 5, 16, 2.25), 1).seY).toBeCloseTo(0.097720502, 6);
    expect(positionErrors(spot(0, 0, 5, 2.25), 1.4).seX).toBeCloseTo(1.4 * 0.159576912, 6);
  });
});

describe("shape of a spot", () => {
  const silent = () => 0;

  it.each([0, 30, 90, 135])("finds an axis of %d degrees counter-clockwise on screen", (degrees) => {
    const a = (degrees * Math.PI) / 180;
    const [long, short] = [9, 2.25];
    // Rows run down: the axis is (cos a, −sin a) in picture coordinates.
    const xx = long * Math.cos(a) ** 2 + short * Math.sin(a) ** 2;
    const yy = long * Math.sin(a) ** 2 + short * Math.cos(a) ** 2;
    const xy = -(long - short) * Math.cos(a) * Math.sin(a);
    const picture = spotPicture([spot(24.3, 23.8, 30, xx, yy, xy)], 49, silent);
    const axes = axesOf(measureSpot(picture, 1, 24, 24, 2, 1, []));
    // The iteration ends once the place stands still, when the shape is within 5 % of its own.
    expect(Math.abs(axes.major / 3 - 1)).toBeLessThan(0.05);
    expect(Math.abs(axes.minor / 1.5 - 1)).toBeLessThan(0.05);
    expect(Math.abs(Math.sin(axes.axis_rad - a))).toBeLessThan(0.01);
    expect(axes.axis_rad).toBeGreaterThanOrEqual(0);
    expect(axes.axis_rad).toBeLessThan(Math.PI);
  });

  it("reads dark spots as bright ones, and takes a neighbour's light away", () => {
    const neighbour = spot(31, 24, 40, 4);
    const picture = spotPicture([spot(24.4, 24.1, 20, 4), neighbour], 49, silent);
    const dark = { ...picture, z: picture.z.map((v) => -v) };
    const alone = measureSpot(dark, -1, 24, 24, 2, 0, []);
    const helped = measureSpot(dark, -1, 24, 24, 2, 0, [neighbour]);
    expect(Math.abs(helped.x - 24.4)).toBeLessThan(0.005);
    expect(Math.abs(helped.peak - 20)).toBeLessThan(0.1);
    expect(Math.abs(alone.x - 24.4)).toBeGreaterThan(0.05);
  });

  it("says when there is nothing", () => {
    const nothing = { z: new Float32Array(49 * 49).fill(-1), width: 49, height: 49 };
    expect(measureSpot(nothing, 1, 24, 24, 2, 0, []).good).toBe(false);
  });
});
