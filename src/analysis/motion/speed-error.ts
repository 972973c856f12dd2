import type { Track } from "./track.ts";
import type { Velocities } from "./windows.ts";

/**
 * Variance of the mean length of a track's window velocities, from the noise of its positions and the diffusion of its
 * body, to first order: that mean is linear in every position, in the direction of the windows that hold it. Windows that
 * overlap share their errors, which cancel inside the path when frames are even and less so when they aren't.
 *
 * Propagation of errors; common practice, no source.
 *
 * @param noise variance of a position along one axis (pixels²) and diffusion coefficient (pixels² per second)
 */
export function meanSpeedVariance(
  track: Track,
  v: Velocities,
  noise: { readonly variance: number; readonly coefficient: number },
): number {
  const { t } = track;
  const cx = new Float64Array(t.length);
  const cy = new Float64Array(t.length);
  v.spans.forEach(([first, end], i) => {
    const vx = v.vx[i] as number;
    const vy = v.vy[i] as number;
    const length = Math.sqrt(vx * vx + vy * vy);
    if (length === 0) return;
    let mean = 0;
    for (let j = first; j < end; j++) mean += (t[j] as number) / (end - first);
    let spread = 0;
    for (let j = first; j < end; j++) spread += ((t[j] as number) - mean) ** 2;
    for (let j = first; j < end; j++) {
      const weight = ((t[j] as number) - mean) / (spread * length * v.spans.length);
      cx[j]! += weight * vx;
      cy[j]! += weight * vy;
    }
  });
  let position = 0;
  let diffusion = 0;
  let afterX = 0;
  let afterY = 0;
  for (let j = t.length - 1; j >= 0; j--) {
    const x = cx[j] as number;
    const y = cy[j] as number;
    position += x * x + y * y;
    afterX += x;
    afterY += y;
    // A Brownian step moves all points after it.
    if (j > 0) diffusion += 2 * ((t[j] as number) - (t[j - 1] as number)) * (afterX * afterX + afterY * afterY);
  }
  return position * noise.variance + diffusion * noise.coefficient;
}
