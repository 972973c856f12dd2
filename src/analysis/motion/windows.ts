import type { Track } from "./track.ts";

/** Velocities of a track, one for each window, and how uncertain each is. Pixels per second, y up. */
export interface Velocities {
  readonly t: readonly number[];
  readonly vx: readonly number[];
  readonly vy: readonly number[];
  /** Variance of each component: `position` times the variance of a position plus `diffusion` times the coefficient. */
  readonly noise: readonly { readonly position: number; readonly diffusion: number }[];
  /** Points of the track that each window took in: the first, and one past the last. */
  readonly spans: readonly (readonly [first: number, end: number])[];
}

/**
 * Velocity at every point of a track as the slope of a straight line fitted to the points within half a window on
 * either side, at their own times. For equal steps these are the first-derivative filters of Savitzky and Golay 1964,
 * Anal. Chem. 36, 1627. Where frames are far apart, as in dim light, a window takes in the next point on either side if
 * that is within a whole window. Points without a full window, or still with fewer than two others in it, have none.
 */
export function velocitiesOf(track: Track, window_s: number): Velocities {
  const { t, x, y } = track;
  const n = t.length;
  const half = window_s / 2 + 1e-9;
  const out = {
    t: [] as number[],
    vx: [] as number[],
    vy: [] as number[],
    noise: [] as Velocities["noise"][number][],
    spans: [] as Velocities["spans"][number][],
  };
  const within = (j: number, now: number) => j >= 0 && j < n && Math.abs((t[j] as number) - now) <= 2 * half;
  let from = 0;
  for (let i = 0; i < n; i++) {
    const now = t[i] as number;
    if (now - (t[0] as number) < half - 2e-9 || (t[n - 1] as number) - now < half - 2e-9) continue;
    while ((t[from] as number) < now - half) from++;
    const first = from === i && within(i - 1, now) ? i - 1 : from;
    let end = i + 1;
    while (end < n && (t[end] as number) <= now + half) end++;
    if (end === i + 1 && within(i + 1, now)) end++;
    if (end - first < 3) continue;
    let mean = 0;
    for (let j = first; j < end; j++) mean += t[j] as number;
    mean /= end - first;
    let spread = 0;
    let sx = 0;
    let sy = 0;
    for (let j = first; j < end; j++) {
      const h = (t[j] as number) - mean;
      spread += h * h;
      sx += h * (x[j] as number);
      sy += h * (y[j] as number);
    }
    out.t.push(now);
    out.vx.push(sx / spread);
    out.vy.push(sy / spread);
    out.noise.push({ position: 1 / spread, diffusion: brownianGain(t, first, end, mean, spread) });
    out.spans.push([first, end]);
  }
  return out;
}

/** Variance of the slope through a Brownian walk with unit diffusion coefficient: each step moves all points after it. */
function brownianGain(t: Float64Array, first: number, end: number, mean: number, spread: number): number {
  let after = 0;
  let gain = 0;
  for (let j = end - 1; j > first; j--) {
    after += ((t[j] as number) - mean) / spread;
    gain += 2 * ((t[j] as number) - (t[j - 1] as number)) * after * after;
  }
  return gain;
}

/** The straight line through a whole track: its slope, and the factors of its variance as in {@link Velocities}. */
export function overallVelocity(track: Track): { vx: number; vy: number; position: number; diffusion: number } {
  const { t, x, y } = track;
  const n = t.length;
  let mean = 0;
  for (const v of t) mean += v;
  mean /= n;
  let spread = 0;
  let sx = 0;
  let sy = 0;
  for (let j = 0; j < n; j++) {
    const h = (t[j] as number) - mean;
    spread += h * h;
    sx += h * (x[j] as number);
    sy += h * (y[j] as number);
  }
  return { vx: sx / spread, vy: sy / spread, position: 1 / spread, diffusion: brownianGain(t, 0, n, mean, spread) };
}
