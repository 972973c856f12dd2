import { type Paths, rowsOf, type Sightings } from "../../quantities/index.ts";

/** First row of path `p` whose frame is not before `frame`, or one past its last. */
export function firstRowFrom(paths: Paths, p: number, frame: number): number {
  const [first, end] = rowsOf(paths, p);
  return lowerBound(paths.frame, frame, first, end);
}

/** True when the path has been seen by `frame` and not for the last time before it. */
export function isUnderWay(paths: Paths, p: number, frame: number): boolean {
  const [first, end] = rowsOf(paths, p);
  return first < end && paths.frame[first]! <= frame && paths.frame[end - 1]! >= frame;
}

/** Rows of the sightings of one frame as [first, one past last]. */
export function sightingsAt(sightings: Sightings, frame: number): [first: number, end: number] {
  const first = lowerBound(sightings.frame, frame, 0, sightings.count);
  return [first, lowerBound(sightings.frame, frame + 1, first, sightings.count)];
}

/** Sightings in each frame. */
export function sightingCounts(sightings: Sightings, frames: number): Uint32Array {
  const counts = new Uint32Array(frames);
  for (let row = 0; row < sightings.count; row++) {
    const frame = sightings.frame[row]!;
    if (frame < frames) counts[frame] = counts[frame]! + 1;
  }
  return counts;
}

/** Path whose point in `frame` is nearest to a scene position and nearer than `reach_px`; null when none is. */
export function pathNear(paths: Paths, frame: number, x_px: number, y_px: number, reach_px: number): number | null {
  let best: number | null = null;
  let least = reach_px;
  for (let p = 0; p < paths.count; p++) {
    if (!isUnderWay(paths, p, frame)) continue;
    const row = Math.min(firstRowFrom(paths, p, frame), rowsOf(paths, p)[1] - 1);
    const distance = Math.hypot(paths.x_px[row]! - x_px, paths.y_px[row]! - y_px);
    if (distance < least) {
      least = distance;
      best = p;
    }
  }
  return best;
}

/** First index in [low, high) whose value is not below `value`, or `high`. Values never fall. */
function lowerBound(values: ArrayLike<number>, value: number, low: number, high: number): number {
  while (low < high) {
    const middle = (low + high) >> 1;
    if (values[middle]! < value) low = middle + 1;
    else high = middle;
  }
  return low;
}
