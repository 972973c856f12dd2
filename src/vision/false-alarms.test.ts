import { describe, expect, it } from "vitest";
import { normalFrom } from "../../tests/helpers/normal.ts";
import { seededRandom } from "../quantities/index.ts";
import { expectedFalseAlarms, thresholdFor } from "./false-alarms.ts";
import { plainKernels } from "./kernels/index.ts";
import { gaussianTaps } from "./whitener.ts";

describe("threshold", () => {
  it("solves for the rate asked, and is never below 3", () => {
    for (const rate of [0.01, 0.1, 1]) {
      expect(expectedFalseAlarms(thresholdFor(rate, 1280 * 720, 1.5), 1280 * 720, 1.5)).toBeCloseTo(rate, 6);
    }
    expect(thresholdFor(1e9, 1280 * 720, 1.5)).toBeCloseTo(3, 9);
  });

  it.each([
    [1.4, 4, 3.6],
    [2, 8, 3.4],
  ])("lets through as many maxima of smooth noise as expected (smoothing %d px)", (sigma, pictures, threshold) => {
    const [width, height] = [512, 384];
    const normal = normalFrom(seededRandom(31));
    const kernels = plainKernels();
    const taps = gaussianTaps(sigma);
    const [src, between, out] = [0, 1, 2].map(() => kernels.floats(width * height)) as [
      Float32Array,
      Float32Array,
      Float32Array,
    ];
    let found = 0;
    const border = taps.length - 1;
    for (let k = 0; k < 3 * pictures; k++) {
      for (let i = 0; i < src.length; i++) src[i] = normal();
      kernels.blur(src, between, out, width, height, taps);
      found += kernels.peaks(out, width, height, 1, threshold).length;
    }
    const area = (width - 2 * border) * (height - 2 * border);
    const expected = 3 * pictures * expectedFalseAlarms(threshold, area, sigma);
    // The formula is for high thresholds and a continuous field; 1.5 either way is what the program may be off by.
    expect(expected).toBeGreaterThan(100);
    expect(found / expected).toBeGreaterThan(1 / 1.5);
    expect(found / expected).toBeLessThan(1.5);
  });
});
