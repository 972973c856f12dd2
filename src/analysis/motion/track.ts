import { type Paths, rowsOf } from "../../quantities/index.ts";

/** One cell's path as the analysis of motion sees it: times, and positions in pixels with y up. */
export interface Track {
  readonly t: Float64Array;
  readonly x: Float64Array;
  readonly y: Float64Array;
  /** Mean variance of a position along one axis as the sightings' own standard errors have it, pixels². */
  readonly statedVariance: number;
  /** From the first point to the last, seconds. */
  readonly duration: number;
}

/** Path `p` of the table, as a {@link Track}. */
export function trackOf(paths: Paths, p: number): Track {
  const [a, b] = rowsOf(paths, p);
  let variance = 0;
  for (let i = a; i < b; i++) variance += ((paths.seX_px[i] as number) ** 2 + (paths.seY_px[i] as number) ** 2) / 2;
  const t = paths.t_s.slice(a, b);
  return {
    t,
    x: paths.x_px.slice(a, b),
    y: paths.y_px.slice(a, b).map((v) => -v),
    statedVariance: variance / (b - a),
    duration: (t.at(-1) as number) - (t[0] as number),
  };
}

/** The track as seen by somebody who drifts along with the velocity (vx, vy), pixels per second. */
export function relativeTo(track: Track, vx: number, vy: number): Track {
  const t0 = track.t[0] as number;
  return {
    ...track,
    x: track.x.map((v, i) => v - vx * ((track.t[i] as number) - t0)),
    y: track.y.map((v, i) => v - vy * ((track.t[i] as number) - t0)),
  };
}
