import type { Sightings } from "../quantities/index.ts";
import { assign, type Pairing } from "./assignment.ts";
import { type Belief, firstBelief, type MotionModel, predict, update } from "./motion-model.ts";
import type { TrackingSettings } from "./settings.ts";

/** Pieces this short don't tell where they are going. */
const fewest = 3;
/** A join must fit in position and velocity: chi-squared, 4 degrees of freedom, 1 in 2000. */
const fits = 20;

/**
 * Joins pieces of path that are one cell's: where a piece ends, its motion carried forward across the gap must meet the
 * beginning of another in place and velocity. All joins are chosen together at least total cost.
 *
 * @param pieces rows of the sightings table, in frame order, one array a piece
 * @returns the same rows in fewer, longer arrays
 */
export function joinPieces(
  pieces: readonly (readonly number[])[],
  sightings: Sightings,
  variances: Float64Array,
  times_s: Float64Array,
  model: MotionModel,
  settings: TrackingSettings,
): number[][] {
  const long = pieces.map((rows) => rows.length >= fewest);
  const ends = pieces.map((rows, p) => (long[p] ? readThrough(rows, sightings, variances, times_s, model) : null));
  const starts = pieces.map((rows, p) =>
    long[p] ? readThrough([...rows].reverse(), sightings, variances, times_s, model) : null,
  );
  const byStart = starts
    .flatMap((start, p) => (start ? [{ start, p }] : []))
    .sort((a, b) => a.start.t_s - b.start.t_s || a.p - b.p);
  const pairings: Pairing[] = [];
  ends.forEach((end, p) => {
    if (!end) return;
    for (let i = firstAfter(byStart, end.t_s); i < byStart.length; i++) {
      const next = byStart[i] as (typeof byStart)[number];
      if (next.start.t_s - end.t_s > settings.join_s) break;
      const cost = misfit(model, end, next.start);
      if (cost < fits) pairings.push({ row: p, column: next.p, cost });
    }
  });
  const follower = new Map(assign(pairings, fits).map(({ row, column }) => [row, column]));
  const taken = new Set(follower.values());
  return pieces.flatMap((_, p) => {
    if (taken.has(p)) return [];
    const rows: number[] = [];
    for (let at: number | undefined = p; at !== undefined; at = follower.get(at))
      rows.push(...(pieces[at] as number[]));
    return [rows];
  });
}

/** What is believed of a cell after all of a piece's sightings, read in the given order. */
function readThrough(
  rows: readonly number[],
  sightings: Sightings,
  variances: Float64Array,
  times_s: Float64Array,
  model: MotionModel,
): Belief {
  let belief: Belief | null = null;
  for (const row of rows) {
    const t_s = times_s[sightings.frame[row] as number] as number;
    const x = sightings.x_px[row] as number;
    const y = sightings.y_px[row] as number;
    const variance = variances[row] as number;
    belief = belief ? update(predict(model, belief, t_s), x, y, variance) : firstBelief(model, t_s, x, y, variance);
  }
  return belief as Belief;
}

/** Distance in place and velocity of what two pieces say about the middle of the gap, over its covariance. */
function misfit(model: MotionModel, end: Belief, start: Belief): number {
  const middle = (end.t_s + start.t_s) / 2;
  const a = predict(model, end, middle);
  const b = predict(model, start, middle);
  const pp = a.pp + b.pp;
  const pv = a.pv + b.pv;
  const vv = a.vv + b.vv;
  const determinant = pp * vv - pv * pv;
  const along = (r: number, v: number) => (vv * r * r - 2 * pv * r * v + pp * v * v) / determinant;
  return along(b.x - a.x, b.vx - a.vx) + along(b.y - a.y, b.vy - a.vy);
}

function firstAfter(byStart: readonly { start: Belief }[], t_s: number): number {
  let low = 0;
  let high = byStart.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((byStart[middle] as { start: Belief }).start.t_s <= t_s) low = middle + 1;
    else high = middle;
  }
  return low;
}
