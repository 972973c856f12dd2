import type { Sightings } from "../quantities/index.ts";
import { Follower, type Piece } from "./follow.ts";
import type { FrameIndex } from "./frame-index.ts";
import type { MotionModel } from "./motion-model.ts";
import type { TrackingSettings } from "./settings.ts";
import type { TrackingView } from "./view.ts";

/** Pieces of fewer sightings teach nothing about motion. */
const teachesFrom = 8;
/** A surprise counts for no more than this: wrong pairings don't teach. */
const greatestSurprise = 16;
/** Predictions are made to be as wide as this part of the cells needs: the rest is followed with room to spare. */
const partServed = 0.75;
const rounds = 3;
/** Speeds looked for before anything is known: this far in one frame (standard deviation), pixels. */
const widestFirstStep_px = 12;

/** What is assumed of motion before the clip has been looked at. */
export function firstGuess(
  index: FrameIndex,
  perFrame: number,
  area_px2: number,
  frameInterval_s: number,
): MotionModel {
  const apart = index.medianNeighbourDistance() ?? Number.POSITIVE_INFINITY;
  // A first step beyond half the distance to the neighbour is anybody's.
  const step = Math.max(1, Math.min(widestFirstStep_px, apart / 8));
  return {
    speedSd_px_s: step / frameInterval_s,
    turning_per_s: 2,
    diffusion_px2_s: 0.02 / frameInterval_s,
    arrivals_per_px2: Math.max(0.1, 0.05 * perFrame) / area_px2,
    sighted: 0.95,
  };
}

/**
 * Learns how the cells of a clip move by following them with a first guess and correcting it until predictions miss by as
 * much as the filter says they should (consistency of the normalised innovation squared: Bar-Shalom, Li and Kirubarajan
 * 2001, section 5.4). Cell by cell, so that the few that are hardest to predict, and
 * not the many that hardly move, set the width.
 */
export function learnMotion(
  sightings: Sightings,
  variances: Float64Array,
  index: FrameIndex,
  times_s: Float64Array,
  guess: MotionModel,
  settings: TrackingSettings,
  frameInterval_s: number,
  view: TrackingView,
): MotionModel {
  let model = guess;
  const frames = Math.min(times_s.length, framesThatTeach);
  for (let round = 0; round < rounds; round++) {
    const follower = new Follower(sightings, variances, index, model, settings, frameInterval_s, view);
    for (let f = 0; f < frames; f++) follower.frame(f, times_s[f] as number);
    model = improve(model, follower.pieces, sightings, times_s, frames, view.area_px2);
  }
  return model;
}

/** Motion is learnt from the first so many frames: more would cost time and teach nothing new. */
const framesThatTeach = 600;

function improve(
  model: MotionModel,
  pieces: readonly Piece[],
  sightings: Sightings,
  times_s: Float64Array,
  frames: number,
  area_px2: number,
): MotionModel {
  const long = pieces.filter((p) => p.rows.length >= teachesFrom);
  if (long.length < 3) return model;
  const speeds = long.map((p) => firstSpeed_px_s(p, sightings, times_s)).sort((a, b) => a - b);
  // The fastest cells must lie within the first gate; the slow ones do anyway.
  const fast = speeds[Math.floor(0.95 * (speeds.length - 1))] as number;
  // A few swimmers among many dead cells are in no percentile, so the very fastest counts too.
  const speedSd_px_s = Math.max(fast / 2, (speeds.at(-1) as number) / 3, 4 * Math.sqrt(model.diffusion_px2_s));
  const swims = (p: Piece) => firstSpeed_px_s(p, sightings, times_s) > 0.4 * fast;
  const turning = ratio(long.filter(swims));
  const wandering = ratio(long.filter((p) => !swims(p)));
  let expected = 0;
  let sighted = 0;
  for (const p of long) {
    expected += (sightings.frame[p.rows.at(-1) as number] as number) - (sightings.frame[p.rows[0] as number] as number);
    sighted += p.rows.length - 1;
  }
  return {
    speedSd_px_s,
    turning_per_s: clamp(model.turning_per_s * turning, 0.05, 40),
    diffusion_px2_s: model.diffusion_px2_s * wandering,
    arrivals_per_px2: Math.max(0.05, (pieces.length - firstFramePieces(pieces, sightings)) / frames) / area_px2,
    sighted: clamp(sighted / Math.max(1, expected), 0.5, 0.98),
  };
}

/**
 * By how much the predictions of these pieces miss, over what they should: 1 when nothing is known. The mean squared
 * distance over covariance is 2 for each cell when the covariance is right (chi-squared, 2 degrees of freedom).
 */
function ratio(pieces: readonly Piece[]): number {
  const means = pieces
    .filter((p) => p.surprises.length >= teachesFrom)
    .map((p) => p.surprises.reduce((sum, s) => sum + Math.min(s, greatestSurprise), 0) / p.surprises.length)
    .sort((a, b) => a - b);
  if (means.length < 3) return 1;
  return clamp((means[Math.floor(partServed * (means.length - 1))] as number) / 2, 0.1, 10);
}

/** Speed over the first sightings of a piece, net, pixels per second. */
function firstSpeed_px_s(piece: Piece, sightings: Sightings, times_s: Float64Array): number {
  const a = piece.rows[0] as number;
  const b = piece.rows[teachesFrom - 1] as number;
  const dx = (sightings.x_px[b] as number) - (sightings.x_px[a] as number);
  const dy = (sightings.y_px[b] as number) - (sightings.y_px[a] as number);
  const dt = (times_s[sightings.frame[b] as number] as number) - (times_s[sightings.frame[a] as number] as number);
  return Math.sqrt(dx * dx + dy * dy) / dt;
}

function firstFramePieces(pieces: readonly Piece[], sightings: Sightings): number {
  return pieces.filter((p) => sightings.frame[p.rows[0] as number] === 0).length;
}

function clamp(value: number, low: number, high: number): number {
  return Math.min(high, Math.max(low, value));
}
