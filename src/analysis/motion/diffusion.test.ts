import { describe, expect, it } from "vitest";
import { normalFrom } from "../../../tests/helpers/normal.ts";
import { evenTimes, walk } from "../../../tests/helpers/simulated-tracks.ts";
import { seededRandom } from "../../quantities/index.ts";
import { mean, standardDeviation } from "../../statistics/index.ts";
import { diffusionOf, diffusionOfSwimmers, pooledDiffusion } from "./diffusion.ts";
import type { Track } from "./track.ts";

/**
 * Predicted standard deviation of the covariance-based estimate over D, for one axis of N steps; two axes halve the
 * variance. ε = σ² / (D Δt) without motion blur. Vestergaard, Blainey and Flyvbjerg 2014, Phys. Rev. E 89, 022726.
 */
function predictedSd(epsilon: number, steps: number): number {
  const e = epsilon;
  return Math.sqrt(((6 + 4 * e + 2 * e * e) / steps + (4 * (1 + e) ** 2) / steps ** 2) / 2);
}

describe("covariance-based diffusion estimate", () => {
  // Ten positions 0.1 s apart. ⟨Δx²⟩ = 0.0433, ⟨Δx Δx₊⟩ = −0.0189375, D = 0.0433 / 0.2 − 0.0189375 / 0.1 = 0.027125,
  // σ² = 0.0189375 without blur: computed independently (NumPy) from the formulas of the paper above.
  const x = Float64Array.of(0, 0.21, 0.15, 0.42, 0.36, 0.71, 0.55, 0.8, 0.95, 0.77);
  const t = x.map((_, i) => i / 10);
  const worked: Track = { t, x, y: x.slice(), statedVariance: 0, duration: 0.9 };

  it("gives the worked values", () => {
    const found = diffusionOf(worked, "none");
    expect(found.coefficient).toBeCloseTo(0.027125, 10);
    expect(found.variance).toBeCloseTo(0.0189375, 10);
    expect(found.steps).toBe(9);
  });

  it("is the mean of both axes", () => {
    const still = diffusionOf({ ...worked, y: x.map(() => 3) }, "none");
    expect(still.coefficient).toBeCloseTo(0.027125 / 2, 10);
    expect(still.variance).toBeCloseTo(0.0189375 / 2, 10);
  });

  it("scatters as predicted about the truth, with drift known or taken off", () => {
    const tracks = 1500;
    const [D, sigma, fps] = [0.25, 0.1, 30];
    const normal = normalFrom(seededRandom(101));
    const times = evenTimes(100 / fps, fps);
    const predicted = D * predictedSd((sigma * sigma * fps) / D, 100);
    for (const drift of ["none", "own"] as const) {
      const flow: [number, number] = drift === "own" ? [3, -2] : [0, 0];
      const found = Array.from({ length: tracks }, () =>
        diffusionOf(walk({ speed: 0, diffusion: D, sigma, flow }, times, normal), drift),
      );
      const coefficients = found.map((f) => f.coefficient);
      // Mean within 3 standard errors. The scatter's own standard error is 1 / √(2 n) = 1.8 %; 8 % leaves room for the
      // prediction's neglected higher orders of 1/N.
      expect(Math.abs(mean(coefficients) - D)).toBeLessThan((3 * predicted) / Math.sqrt(tracks));
      expect(Math.abs(standardDeviation(coefficients) / predicted - 1)).toBeLessThan(0.08);
      const variances = found.map((f) => f.variance);
      const error = standardDeviation(variances) / Math.sqrt(tracks);
      expect(Math.abs(mean(variances) - sigma * sigma)).toBeLessThan(3 * error);
    }
  });

  it("is unbiased at uneven time steps", () => {
    const random = seededRandom(102);
    const normal = normalFrom(random);
    const found = Array.from({ length: 1500 }, () => {
      let now = 0;
      const times = Float64Array.from({ length: 80 }, () => {
        now += 1 / 60 + random() / 20;
        return now;
      });
      return diffusionOf(walk({ speed: 0, diffusion: 0.5, sigma: 0.08 }, times, normal), "none").coefficient;
    });
    const error = standardDeviation(found) / Math.sqrt(found.length);
    expect(Math.abs(mean(found) - 0.5)).toBeLessThan(3 * error);
  });
});

describe("diffusion of several tracks", () => {
  it("doesn't follow a stray swimmer", () => {
    const normal = normalFrom(seededRandom(103));
    const times = evenTimes(3, 30);
    const dead = Array.from({ length: 9 }, () => walk({ speed: 0, diffusion: 1, sigma: 0.1 }, times, normal));
    const swimmer = walk({ speed: 80, rotation_rad2_s: 1, diffusion: 1, sigma: 0.1 }, times, normal);
    const pooled = pooledDiffusion([...dead, swimmer].map((track) => diffusionOf(track, "none")));
    // A median of nine is about √(π/2) times as uncertain as their mean; 3 standard errors.
    const error = (Math.sqrt(Math.PI / 2) * predictedSd(0.3, 90)) / 3;
    expect(Math.abs(pooled.coefficient - 1)).toBeLessThan(3 * error);
    expect(pooled.steps).toBe(900);
  });

  it("of steady swimmers is that of their bodies", () => {
    const normal = normalFrom(seededRandom(104));
    const times = evenTimes(3, 60);
    const swimmers = Array.from({ length: 40 }, (_, i) =>
      walk({ speed: 60, heading_rad: i, turning_rad_s: (i % 5) - 2, diffusion: 1.5, sigma: 0.05 }, times, normal),
    );
    const found = diffusionOfSwimmers(swimmers);
    // Sums of 356 squared second differences, correlated over three: about 13 % a track, so 2.5 % for the median of 40.
    expect(found?.coefficient).toBeGreaterThan(1.5 * (1 - 3 * 0.025));
    expect(found?.coefficient).toBeLessThan(1.5 * (1 + 3 * 0.025));
  });

  it("can't be had from tracks of a few points", () => {
    const short = walk({ speed: 60, diffusion: 1, sigma: 0 }, evenTimes(0.1, 60), normalFrom(seededRandom(105)));
    expect(diffusionOfSwimmers([short])).toBeNull();
  });
});
