import { describe, expect, it } from "vitest";
import type { AssaySettings } from "./options.ts";
import { resolveOptions } from "./resolve.ts";
import { sensor } from "./sensor.ts";

const width = 256;
const height = 200;
const empty = new Float32Array(width * height);

function exposed(changed: Partial<AssaySettings["sensor"]>, level: number, key = 0, gain = 1): Uint8Array {
  const settings = resolveOptions({ picture: { width_px: width, height_px: height }, sensor: changed });
  const out = new Uint8Array(width * height);
  sensor(settings).expose(new Float32Array(width * height).fill(level), empty, gain, key, out);
  return out;
}

function moments(values: Uint8Array) {
  const mean = values.reduce((sum, v) => sum + v, 0) / values.length;
  const product = (step: number) => {
    let sum = 0;
    let n = 0;
    for (let k = 0; k + step < values.length; k++, n++) {
      sum += ((values[k] as number) - mean) * ((values[k + step] as number) - mean);
    }
    return sum / n;
  };
  // Rounding to whole levels adds 1/12 to the variance.
  const variance = product(0) - 1 / 12;
  return { mean, sd: Math.sqrt(variance), right: product(1) / variance, below: product(width) / variance };
}

describe("sensor noise", () => {
  // 51200 pixels: the relative standard error of a standard deviation is 0.3 %, more where grain makes them alike.
  it.each([0, 0.12, 0.3])("has the asked size at the light's own level with grain %d", (grain) => {
    const { mean, sd } = moments(exposed({ noise: 3, readNoise: 1, grain }, 165));
    expect(mean).toBeCloseTo(165, 0);
    expect(Math.abs(sd / 3 - 1)).toBeLessThan(0.03);
  });

  it("grows with the root of the level over the read noise", () => {
    const { sd } = moments(exposed({ noise: 3, readNoise: 1 }, 40));
    expect(sd).toBeCloseTo(Math.sqrt(1 + (8 * 40) / 165), 1);
  });

  it("is independent from pixel to pixel without grain, shared with neighbours with it", () => {
    const bare = moments(exposed({ noise: 4, grain: 0 }, 165));
    expect(Math.abs(bare.right)).toBeLessThan(0.02);
    expect(Math.abs(bare.below)).toBeLessThan(0.02);
    // Correlation of a [g, 1 - 2g, g] average at lag one: 2 g (1 - 2g) / ((1 - 2g)² + 2 g²).
    const grain = 0.2;
    const expected = (2 * grain * (1 - 2 * grain)) / ((1 - 2 * grain) ** 2 + 2 * grain ** 2);
    const shared = moments(exposed({ noise: 4, grain }, 165));
    expect(Math.abs(shared.right - expected)).toBeLessThan(0.02);
    expect(Math.abs(shared.below - expected)).toBeLessThan(0.02);
  });

  it("is the same for the same picture and new for another", () => {
    expect(exposed({}, 165, 7)).toEqual(exposed({}, 165, 7));
    const other = exposed({}, 165, 8);
    const alike = exposed({}, 165, 7).reduce((n, v, k) => n + (v === other[k] ? 1 : 0), 0);
    expect(alike).toBeLessThan(0.25 * other.length);
  });

  it("follows the gain, and is held between black and white", () => {
    expect(moments(exposed({ noise: 1 }, 100, 0, 1.1)).mean).toBeCloseTo(110, 0);
    expect(Math.max(...exposed({ noise: 20 }, 250))).toBe(255);
    expect(Math.min(...exposed({ noise: 20, readNoise: 20 }, 5))).toBe(0);
  });
});
