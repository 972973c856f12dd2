import { median, quantile } from "../../statistics/index.ts";
import type { Track } from "./track.ts";

/** Diffusion coefficient (pixels² per second) and variance of a position along one axis (pixels²), with steps used. */
export interface Diffusion {
  readonly coefficient: number;
  readonly variance: number;
  readonly steps: number;
}

/**
 * Diffusion coefficient and localisation variance of a track from the variance and the covariance of its successive
 * displacements. Unbiased for Brownian motion; a swimmer that turns gives more.
 *
 * The variance is what positions scatter beyond diffusion between frames, less what motion blur takes away: just what the
 * mean squared displacement needs. Source: Vestergaard, Blainey and Flyvbjerg 2014, Phys. Rev. E 89, 022726 (the
 * covariance-based estimator); time steps may be unequal.
 *
 * @param drift whether the track drifts at a velocity of its own, to be taken off (its mean), or stays about its place
 */
export function diffusionOf(track: Track, drift: "own" | "none"): Diffusion {
  const { t, x, y } = track;
  const n = t.length - 1;
  const mx = drift === "own" ? ((x[n] as number) - (x[0] as number)) / track.duration : 0;
  const my = drift === "own" ? ((y[n] as number) - (y[0] as number)) / track.duration : 0;
  let square = 0;
  let product = 0;
  let lastX = 0;
  let lastY = 0;
  for (let i = 0; i < n; i++) {
    const dt = (t[i + 1] as number) - (t[i] as number);
    const dx = (x[i + 1] as number) - (x[i] as number) - mx * dt;
    const dy = (y[i + 1] as number) - (y[i] as number) - my * dt;
    square += dx * dx + dy * dy;
    if (i > 0) product += dx * lastX + dy * lastY;
    lastX = dx;
    lastY = dy;
  }
  square /= 2 * n;
  product /= 2 * Math.max(1, n - 1);
  if (drift === "own" && n > 3) {
    // Taking off the mean takes its variance, a step's square and twice its product over n, from squares and products.
    const taken = (square + 2 * product) / (n - 3);
    square += taken;
    product += taken;
  }
  const dt = track.duration / n;
  return { coefficient: square / (2 * dt) + product / dt, variance: -product, steps: n };
}

/**
 * Standard error of a track's covariance-based estimate, both axes together, were its diffusion coefficient so much.
 * Source: Vestergaard, Blainey and Flyvbjerg 2014, Phys. Rev. E 89, 022726, leading order in the number of steps.
 */
export function diffusionError(track: Track, coefficient: number): number {
  const steps = track.t.length - 1;
  const noise = (track.statedVariance * steps) / track.duration;
  return Math.sqrt((6 * coefficient ** 2 + 4 * coefficient * noise + 2 * noise ** 2) / (2 * steps));
}

/** Diffusion of several tracks together: the median, each track counting by its steps, so that a stray swimmer is no matter. */
export function pooledDiffusion(all: readonly Diffusion[]): Diffusion {
  return {
    coefficient: weightedMedian(all, (d) => d.coefficient),
    variance: weightedMedian(all, (d) => d.variance),
    steps: all.reduce((sum, d) => sum + d.steps, 0),
  };
}

function weightedMedian(all: readonly Diffusion[], of: (d: Diffusion) => number): number {
  const sorted = [...all].sort((a, b) => of(a) - of(b));
  const half = all.reduce((sum, d) => sum + d.steps, 0) / 2;
  let below = 0;
  for (const d of sorted) {
    below += d.steps;
    if (below >= half) return of(d);
  }
  return of(sorted.at(-1) as Diffusion);
}

/**
 * Diffusion of the bodies of swimmers, where nothing only diffuses: from the second differences of their step velocities,
 * which steady swimming and steady turning leave at nothing. Turning at random adds to it, so it is an upper estimate. The
 * median over tracks; the variance of positions is what the sightings state. Null when no track is long enough.
 *
 * From the same moments as the covariance-based estimator; common practice, no source.
 */
export function diffusionOfSwimmers(tracks: readonly Track[]): Diffusion | null {
  const each = tracks.flatMap((track) => {
    const { t, x, y } = track;
    const n = t.length - 1;
    if (n < 8) return [];
    const step = (v: Float64Array, i: number) =>
      ((v[i + 1] as number) - (v[i] as number)) / ((t[i + 1] as number) - (t[i] as number));
    let squares = 0;
    for (let i = 2; i < n; i++) {
      for (const v of [x, y]) squares += (step(v, i) - 2 * step(v, i - 1) + step(v, i - 2)) ** 2;
    }
    const dt = track.duration / n;
    const square = (squares / (2 * (n - 2))) * dt * dt;
    return [
      { coefficient: (square - 20 * track.statedVariance) / (12 * dt), variance: track.statedVariance, steps: n },
    ];
  });
  if (each.length === 0) return null;
  return {
    coefficient: Math.max(1e-6, median(each.map((d) => d.coefficient))),
    variance: median(each.map((d) => d.variance)),
    steps: each.reduce((sum, d) => sum + d.steps, 0),
  };
}

/** A first idea of how much bodies diffuse, and the most it can turn out to be once swimmers are known. */
export interface BodyDiffusion {
  readonly likely: Diffusion;
  readonly most: number;
}

/**
 * How much bodies diffuse, before it is known which of them swim: from the finest motion of all tracks, kept between a
 * third and all of what the calmest tenth show, since the first is disturbed by noise and the second by swimming.
 *
 * @param tracks at least one
 */
export function bodyDiffusion(tracks: readonly Track[]): BodyDiffusion {
  const own = tracks.map((track) => diffusionOf(track, "own"));
  const fine = diffusionOfSwimmers(tracks);
  // Each with its error added: among many short tracks the calmest are only those that err the most.
  const allowing = own.map(
    ({ coefficient }, i) =>
      coefficient + diffusionError(tracks[i] as Track, Math.max(coefficient, fine?.coefficient ?? 0)),
  );
  const calm = Math.max(1e-6, quantile(allowing, 0.1));
  const coefficient = Math.min(calm, Math.max(fine?.coefficient ?? 0, calm / 3));
  const variance = median(tracks.map((track) => track.statedVariance));
  return {
    likely: { coefficient, variance, steps: own.reduce((sum, d) => sum + d.steps, 0) },
    most: Math.max(3 * coefficient, 1.5 * calm),
  };
}
