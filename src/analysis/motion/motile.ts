import type { Diffusion } from "./diffusion.ts";
import type { Track } from "./track.ts";

/** Stretches of a path that are tested are this long at least, seconds. */
const shortestStretch_s = 0.25;
/** Steps a cell's own diffusion must rest on to count as much as that of all diffusing cells. */
const ownCountsAfter = 60;
/** Bounds of a cell's diffusion coefficient over that of all diffusing cells: bodies don't differ by more. */
const leastShare = 0.7;
const greatestShare = 4;

/**
 * Chance that a body that only diffuses would go as far as this track did over the most telling of its stretches,
 * already allowing for their number. The track must be relative to the flow.
 *
 * Over a time T the squared displacement over 4 D T + 4 σ² is exponential for Brownian motion (field practice; the
 * law follows from Gaussian displacements); since D is itself estimated, from the track and from all diffusing cells,
 * the ratio follows Fisher's F with 2 and ν degrees of freedom, ν from the variance of the covariance-based estimate
 * (Vestergaard, Blainey and Flyvbjerg 2014). Stretches: the whole path, halves, quarters, …, overlapping by half.
 *
 * @param pooled diffusion of the clip's diffusing cells
 * @param flowVariance variance of the flow along one axis, (pixels per second)²
 */
export function chanceOfDiffusing(track: Track, own: Diffusion, pooled: Diffusion, flowVariance: number): number {
  const steps = own.steps + ownCountsAfter;
  const blend = (own.steps * own.coefficient + ownCountsAfter * pooled.coefficient) / steps;
  const coefficient = clamp(blend, leastShare * pooled.coefficient, greatestShare * pooled.coefficient);
  const variance = Math.max(0, track.statedVariance, pooled.variance);
  const dt = track.duration / own.steps;
  const e = variance / (Math.max(coefficient, 1e-12) * dt);
  // Twice the squared mean over the variance, which two axes halve.
  const freedom = Math.max(4, (4 * Math.min(steps, own.steps + pooled.steps)) / (6 + 4 * e + 2 * e * e));
  let least = 1;
  let tests = 0;
  for (let parts = 1; track.duration / parts >= shortestStretch_s; parts *= 2) {
    for (let k = 0; k <= 2 * (parts - 1); k++) {
      const from = (k * track.duration) / (2 * parts);
      const stretch = stretchOf(track, from, from + track.duration / parts);
      if (!stretch) continue;
      tests++;
      const expected = 2 * coefficient * stretch.time + 2 * variance + flowVariance * stretch.time ** 2;
      const f = stretch.distance2 / (2 * expected);
      least = Math.min(least, tailOfF(f, freedom));
    }
  }
  return Math.min(1, least * tests);
}

/** Chance of Fisher's F with 2 and ν degrees of freedom being above f: closed form. */
function tailOfF(f: number, freedom: number): number {
  return (1 + (2 * f) / freedom) ** (-freedom / 2);
}

function stretchOf(track: Track, from: number, to: number): { time: number; distance2: number } | null {
  const { t, x, y } = track;
  const t0 = t[0] as number;
  let a = 0;
  while (a < t.length && (t[a] as number) - t0 < from - 1e-9) a++;
  let b = t.length - 1;
  while (b > a && (t[b] as number) - t0 > to + 1e-9) b--;
  if (b - a < 3) return null;
  const dx = (x[b] as number) - (x[a] as number);
  const dy = (y[b] as number) - (y[a] as number);
  return { time: (t[b] as number) - (t[a] as number), distance2: dx * dx + dy * dy };
}

function clamp(value: number, low: number, high: number): number {
  return Math.min(high, Math.max(low, value));
}
