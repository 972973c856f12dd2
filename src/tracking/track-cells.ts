import {
  type Beginning,
  type Context,
  duration_s,
  type Ending,
  type Paths,
  rowsOf,
  type Sightings,
  throwIfStopped,
} from "../quantities/index.ts";
import { Follower, positionVariances } from "./follow.ts";
import { FrameIndex } from "./frame-index.ts";
import { joinPieces } from "./join.ts";
import { firstGuess, learnMotion } from "./learn-motion.ts";
import type { MotionModel } from "./motion-model.ts";
import type { TrackingSettings } from "./settings.ts";
import { type TrackingView, toEdge } from "./view.ts";

/** Paths, and what was learnt about how sightings follow one another. */
export interface Tracked {
  readonly paths: Paths;
  readonly motion: MotionModel;
  /** Median distance from a sighting to its nearest neighbour in the same frame; null when no frame has two. */
  readonly neighbourDistance_px: number | null;
}

/**
 * Puts sightings together to paths, one a cell.
 *
 * @param times_s capture time of every frame, rising
 * @throws Stopped when the context's signal is raised
 */
export function trackCells(
  sightings: Sightings,
  times_s: Float64Array,
  view: TrackingView,
  settings: TrackingSettings,
  context: Context,
): Tracked {
  const frames = times_s.length;
  const index = new FrameIndex(sightings, frames);
  const interval_s = medianInterval_s(times_s);
  const variances = positionVariances(sightings);
  const guess = firstGuess(index, sightings.count / Math.max(1, frames), view.area_px2, interval_s);
  const motion = learnMotion(sightings, variances, index, times_s, guess, settings, interval_s, view);
  const follower = new Follower(sightings, variances, index, motion, settings, interval_s, view);
  for (let f = 0; f < frames; f++) {
    if (f % 100 === 0) {
      throwIfStopped(context.signal);
      context.progress?.({ stage: "following cells", done: f, total: frames });
    }
    follower.frame(f, times_s[f] as number);
  }
  const pieces = follower.pieces.map((p) => p.rows).filter((rows) => isSteady(rows, sightings));
  const joined = joinPieces(pieces, sightings, variances, times_s, motion, settings);
  const long = joined.filter((rows) => rows.length >= settings.fewestSightings);
  const paths = tableOf(long, sightings, times_s, view, motion);
  const real = withoutTraces(paths, sightings);
  return {
    paths:
      real.length < paths.count
        ? tableOf(
            real.map((p) => long[p] as number[]),
            sightings,
            times_s,
            view,
            motion,
          )
        : paths,
    motion,
    neighbourDistance_px: index.medianNeighbourDistance(),
  };
}

/**
 * A piece of path sighted in a smaller part of its frames than this is a chain of false alarms. Where every other frame
 * only repeats the one before, cells are sighted in half.
 */
const leastSighted = 0.4;

function isSteady(rows: readonly number[], s: Sightings): boolean {
  const frames = (s.frame[rows.at(-1) as number] as number) - (s.frame[rows[0] as number] as number) + 1;
  return rows.length >= leastSighted * frames;
}

/** A path fainter than this part of the usual sighting, and shorter than this, that came from nowhere is a trace. */
const traceStrength = 0.32;
const traceDuration_s = 1.2;

/**
 * Paths that aren't an encoder's traces of others: where a cell has passed, compressed footage keeps a shade of it for some
 * frames: faint, not there from the start, and gone again without leaving the view. Returns the indices of the others.
 */
function withoutTraces(paths: Paths, sightings: Sightings): number[] {
  if (sightings.count === 0) return [];
  const usual = medianOf(sightings.snr);
  return Array.from({ length: paths.count }, (_, p) => p).filter((p) => {
    const [a, b] = rowsOf(paths, p);
    const lasting = duration_s(paths, p) >= traceDuration_s;
    if (lasting || paths.began[p] === "first frame" || paths.ended[p] !== "lost") return true;
    return (
      medianOf(Float32Array.from(paths.sighting.subarray(a, b), (row) => sightings.snr[row] as number)) >=
      traceStrength * usual
    );
  });
}

function medianOf(values: Float32Array): number {
  return values.slice().sort()[values.length >> 1] as number;
}

function tableOf(
  pieces: readonly (readonly number[])[],
  s: Sightings,
  times_s: Float64Array,
  view: TrackingView,
  motion: MotionModel,
): Paths {
  const rows = Uint32Array.from(pieces.flat());
  const start = new Uint32Array(pieces.length + 1);
  pieces.forEach((p, i) => {
    start[i + 1] = (start[i] as number) + p.length;
  });
  const frame = Uint32Array.from(rows, (r) => s.frame[r] as number);
  const lastFrame = times_s.length - 1;
  const nearEdge = (row: number, from: number) => {
    const t = (r: number) => times_s[s.frame[r] as number] as number;
    const dt = Math.abs(t(row) - t(from));
    const dx = (s.x_px[row] as number) - (s.x_px[from] as number);
    const dy = (s.y_px[row] as number) - (s.y_px[from] as number);
    const speed = dt > 0 ? Math.sqrt(dx * dx + dy * dy) / dt : motion.speedSd_px_s;
    return toEdge(view, s.x_px[row] as number, s.y_px[row] as number) < 6 + 2 * speed * medianInterval_s(times_s);
  };
  const began = pieces.map((p): Beginning => {
    if (s.frame[p[0] as number] === 0) return "first frame";
    return nearEdge(p[0] as number, p[Math.min(3, p.length - 1)] as number) ? "entered view" : "appeared";
  });
  const ended = pieces.map((p): Ending => {
    const last = p.at(-1) as number;
    if (s.frame[last] === lastFrame) return "last frame";
    return nearEdge(last, p.at(-Math.min(4, p.length)) as number) ? "left view" : "lost";
  });
  return {
    count: pieces.length,
    start,
    frame,
    t_s: Float64Array.from(frame, (f) => times_s[f] as number),
    x_px: Float64Array.from(rows, (r) => s.x_px[r] as number),
    y_px: Float64Array.from(rows, (r) => s.y_px[r] as number),
    seX_px: Float32Array.from(rows, (r) => s.seX_px[r] as number),
    seY_px: Float32Array.from(rows, (r) => s.seY_px[r] as number),
    sighting: rows,
    began,
    ended,
  };
}

/** Median time between frames; 1 for a single frame. */
function medianInterval_s(times_s: Float64Array): number {
  if (times_s.length < 2) return 1;
  const gaps = Float64Array.from(
    { length: times_s.length - 1 },
    (_, i) => (times_s[i + 1] as number) - (times_s[i] as number),
  );
  gaps.sort();
  return gaps[gaps.length >> 1] as number;
}
