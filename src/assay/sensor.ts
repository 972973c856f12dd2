import type { AssaySettings } from "./options.ts";

const tableSize = 65536;

/** Noise of the sensor, and the step to whole grey levels. */
export interface Sensor {
  /** Standard deviation of the noise at a light level, grey levels. */
  noiseAt(level: number): number;
  /**
   * Writes the exposed picture: light × gain × exp(-density) + noise, rounded and held to 0 … 255. `key` names the
   * picture: the same key gives the same noise.
   */
  expose(light: Float32Array, density: Float32Array, gain: number, key: number, out: Uint8Array): void;
}

/** Shot noise growing with the root of the level, and read noise that doesn't; independent from pixel to pixel. */
export function sensor(settings: AssaySettings): Sensor {
  const { noise, readNoise } = settings.sensor;
  const read2 = Math.min(noise, readNoise) ** 2;
  const shot2 = (noise ** 2 - read2) / settings.light.level;
  const noiseAt = (level: number) => Math.sqrt(read2 + shot2 * Math.max(0, level));
  const spread = Float32Array.from({ length: 256 }, (_, level) => noiseAt(level));
  const normal = normalTable();
  return {
    noiseAt,
    expose(light, density, gain, key, out) {
      // xorshift32 (Marsaglia, J. Stat. Softw. 8(14), 2003) gives two indices into the table a draw.
      let state = (Math.imul(settings.seed | 0, 0x9e3779b1) ^ Math.imul(key + 1, 0x85ebca6b)) | 1;
      const draw = () => {
        state ^= state << 13;
        state ^= state >>> 17;
        state ^= state << 5;
      };
      for (let i = 0; i < 16; i++) draw();
      for (let k = 0; k < out.length; k++) {
        const d = density[k] as number;
        let level = (light[k] as number) * gain;
        if (d !== 0) level *= Math.exp(-d);
        draw();
        const whole = level < 255 ? level | 0 : 255;
        level += (spread[whole] as number) * (normal[(state >>> 8) & (tableSize - 1)] as number) + 0.5;
        out[k] = Math.min(255, Math.max(0, level));
      }
    },
  };
}

/** Standard normal quantiles at (i + 1/2) / size: an even draw of an index is a normal draw. */
function normalTable(): Float32Array {
  const table = new Float32Array(tableSize);
  for (let i = 0; i < tableSize / 2; i++) {
    const z = upperQuantile((i + 0.5) / tableSize);
    table[i] = -z;
    table[tableSize - 1 - i] = z;
  }
  return table;
}

/**
 * Normal quantile for an upper tail p ≤ 1/2. Rational approximation 26.2.23 of Abramowitz and Stegun, Handbook of
 * Mathematical Functions (1964), absolute error below 4.5e-4 (coefficients from memory).
 */
function upperQuantile(p: number): number {
  const t = Math.sqrt(-2 * Math.log(p));
  const up = 2.515517 + t * (0.802853 + t * 0.010328);
  const down = 1 + t * (1.432788 + t * (0.189269 + t * 0.001308));
  return t - up / down;
}
