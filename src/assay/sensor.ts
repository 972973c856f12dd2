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

/** Shot noise growing with the root of the level, and read noise that doesn't; grain shared between neighbours. */
export function sensor(settings: AssaySettings): Sensor {
  const { noise, readNoise, grain } = settings.sensor;
  const { width_px, height_px } = settings.picture;
  const read2 = Math.min(noise, readNoise) ** 2;
  const shot2 = (noise ** 2 - read2) / settings.light.level;
  const noiseAt = (level: number) => Math.sqrt(read2 + shot2 * Math.max(0, level));
  const spread = Float32Array.from({ length: 256 }, (_, level) => noiseAt(level));
  const table = normalTable();
  const normal = new Float32Array(width_px * height_px);
  return {
    noiseAt,
    expose(light, density, gain, key, out) {
      fillNormal(normal, table, settings.seed, key);
      if (grain > 0) shareGrain(normal, width_px, grain);
      for (let k = 0; k < out.length; k++) {
        const d = density[k] as number;
        let level = (light[k] as number) * gain;
        if (d !== 0) level *= Math.exp(-d);
        const whole = level < 255 ? level | 0 : 255;
        level += (spread[whole] as number) * (normal[k] as number) + 0.5;
        out[k] = Math.min(255, Math.max(0, level));
      }
    },
  };
}

/** Standard normal numbers: xorshift32 (Marsaglia, J. Stat. Softw. 8(14), 2003) draws indices into the table. */
function fillNormal(normal: Float32Array, table: Float32Array, seed: number, key: number): void {
  let state = (Math.imul(seed | 0, 0x9e3779b1) ^ Math.imul(key + 1, 0x85ebca6b)) | 1;
  const warmUp = 16;
  for (let k = -warmUp; k < normal.length; k++) {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    if (k >= 0) normal[k] = table[(state >>> 8) & (tableSize - 1)] as number;
  }
}

/** Averages each number with its neighbours to the right and below, keeping the variance at 1 (but for the edges). */
function shareGrain(normal: Float32Array, width: number, grain: number): void {
  const own = 1 - 2 * grain;
  const keep = 1 / Math.sqrt(own * own + 2 * grain * grain);
  for (const step of [1, width]) {
    // The window's centre lies one step on; noise has no place of its own, so the shift doesn't matter.
    for (let k = 0; k + 2 * step < normal.length; k++) {
      const three =
        own * (normal[k + step] as number) + grain * ((normal[k] as number) + (normal[k + 2 * step] as number));
      normal[k] = keep * three;
    }
  }
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
