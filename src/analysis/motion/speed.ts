import type { Diffusion } from "./diffusion.ts";
import { meanSpeedVariance } from "./speed-error.ts";
import type { Track } from "./track.ts";
import { type Velocities, velocitiesOf } from "./windows.ts";

/** What one path says of its cell's swimming. Pixels and seconds. */
export interface PathSpeed {
  readonly speed: number;
  readonly standardError: number;
  /** Net displacement over path length, 0 … 1. */
  readonly straightness: number;
}

/**
 * Mean swimming speed along a path, the track being relative to the flow.
 *
 * Speeds are taken over short windows. Noise of standard deviation s along each axis makes the length of a velocity too
 * great by about s² / 2v (S. O. Rice 1945, Bell Syst. Tech. J. 24, 46), which is taken off window by window as
 * √(v² − s²) where a window tells its speed well, and in the mean of squares where none does.
 *
 * The standard error holds what diffusion and localisation do to the mean along the whole path and the error of the flow.
 * Null when the path has no full window.
 *
 * @param noise variance of a position along one axis (pixels²) and diffusion coefficient (pixels² per second)
 * @param flowVariance variance of the flow along one axis, (pixels per second)²
 */
export function pathSpeed(
  track: Track,
  window_s: number,
  noise: { readonly variance: number; readonly coefficient: number },
  flowVariance: number,
): PathSpeed | null {
  const v = velocitiesOf(track, window_s);
  if (v.t.length === 0) return null;
  const speed = correctedMean(v, noise);
  const length = Math.max(track.duration, 1e-9);
  const variance = meanSpeedVariance(track, v, noise) + flowVariance;
  const n = track.t.length - 1;
  const dx = (track.x[n] as number) - (track.x[0] as number);
  const dy = (track.y[n] as number) - (track.y[0] as number);
  const net2 = dx * dx + dy * dy - 4 * noise.variance - 4 * noise.coefficient * length;
  const net = Math.sqrt(Math.max(0, net2));
  const path = speed * length;
  return { speed, standardError: Math.sqrt(variance), straightness: path > 0 ? Math.min(1, net / path) : 0 };
}

function correctedMean(v: Velocities, noise: { readonly variance: number; readonly coefficient: number }): number {
  let squares = 0;
  let noises = 0;
  let sum = 0;
  v.vx.forEach((vx, i) => {
    const gain = v.noise[i] as Velocities["noise"][number];
    const s2 = gain.position * noise.variance + gain.diffusion * noise.coefficient;
    const v2 = vx * vx + (v.vy[i] as number) ** 2;
    squares += v2;
    noises += s2;
    sum += Math.sqrt(Math.max(0, v2 - s2));
  });
  const n = v.vx.length;
  // Root of the mean square: unbiased in the square whatever the noise, but it weighs fast moments more.
  const root = Math.sqrt(Math.max(0, (squares - 2 * noises) / n));
  const telling = squares / n > tellingRatio * (noises / n);
  return telling ? sum / n : root;
}

/** Mean square of a velocity over its noise variance above which single windows can be corrected. */
const tellingRatio = 12;

/**
 * Length of the windows for a clip: long enough that noise is a small part of the usual speed, within the given bounds,
 * and never shorter than two frame intervals, since a slope needs three points.
 */
export function chooseWindow_s(
  typicalSpeed: number,
  noise: Diffusion,
  interval_s: number,
  shortest_s: number,
  longest_s: number,
): number {
  for (let half = 1; ; half++) {
    const window = 2 * half * interval_s;
    if (window < shortest_s - 1e-3) continue;
    const position = noise.variance / (interval_s ** 2 * ((half * (half + 1) * (2 * half + 1)) / 3));
    const variance = position + (1.2 * 2 * Math.max(0, noise.coefficient)) / window;
    const quiet = variance < (0.15 * typicalSpeed) ** 2;
    // A little wider than the points are apart, so that jitter doesn't cut them off; rounded, since it is written down.
    if (quiet || window + 2 * interval_s > longest_s) return Math.round(window * 1.02e6) / 1e6;
  }
}
