import { loadOpenCV } from "@opencvjs/node";
import { describe, expect, it } from "vitest";
import { seededRandom } from "../../quantities/index.ts";
import { gaussianTaps } from "../whitener.ts";
import { plainKernels, simdKernels } from "./index.ts";

const [width, height] = [97, 61];

describe("Gaussian blur against OpenCV", () => {
  it.each([0.8, 1.5, 2.6])(
    "is sepFilter2D with the same taps, and GaussianBlur but for scale (σ = %d)",
    async (sigma) => {
      const cv = await loadOpenCV();
      const random = seededRandom(61);
      const values = Float32Array.from({ length: width * height }, () => 100 * random() - 50);
      const taps = gaussianTaps(sigma);
      const radius = taps.length - 1;
      const row = Array.from({ length: 2 * radius + 1 }, (_, k) => taps[Math.abs(k - radius)] as number);
      const gain = row.reduce((a, b) => a + b, 0) ** 2;

      const src = cv.matFromArray(height, width, cv.CV_32F, Array.from(values));
      const kernel = cv.matFromArray(1, row.length, cv.CV_32F, row);
      const separable = new cv.Mat();
      const gaussian = new cv.Mat();
      cv.sepFilter2D(src, separable, -1, kernel, kernel, new cv.Point(-1, -1), 0, cv.BORDER_DEFAULT);
      cv.GaussianBlur(src, gaussian, new cv.Size(row.length, row.length), sigma, sigma, cv.BORDER_DEFAULT);

      const makers = [plainKernels(), simdKernels(4_000_000)];
      for (const kernels of makers) {
        if (!kernels) throw new Error("this engine has no WebAssembly SIMD");
        const plane = kernels.floats(values.length);
        plane.set(values);
        const ours = kernels.floats(values.length);
        const ownTaps = kernels.floats(taps.length);
        ownTaps.set(taps);
        kernels.blur(plane, kernels.floats(values.length), ours, width, height, ownTaps);
        let worst = 0;
        let worstGaussian = 0;
        for (let y = radius; y < height - radius; y++) {
          for (let x = radius; x < width - radius; x++) {
            const i = y * width + x;
            worst = Math.max(worst, Math.abs((ours[i] as number) - (separable.data32F[i] as number)));
            worstGaussian = Math.max(
              worstGaussian,
              Math.abs((ours[i] as number) / gain - (gaussian.data32F[i] as number)),
            );
          }
        }
        // Single precision: 2⁻²⁴ of a sum of some forty terms of up to 50 times the filter's gain.
        expect(worst).toBeLessThan(50 * gain * 40 * 2 ** -24);
        expect(worstGaussian).toBeLessThan(50 * 40 * 2 ** -24);
      }
      for (const mat of [src, kernel, separable, gaussian]) mat.delete();
    },
  );
});
