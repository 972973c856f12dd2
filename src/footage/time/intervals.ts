import type { Warning } from "../../quantities/index.ts";

/** Times in rising order, each once: pictures that are only there to decode others share the time of the next. */
export function risingTimes(times: readonly number[]): Float64Array {
  return Float64Array.from(times)
    .sort()
    .filter((time, i, sorted) => i === 0 || time !== sorted[i - 1]);
}

/** Middle value of the intervals between rising times, in their own unit; null with fewer than two times. */
export function medianInterval(times: ArrayLike<number>): number | null {
  if (times.length < 2) return null;
  const intervals = new Float64Array(times.length - 1);
  for (let i = 0; i < intervals.length; i++) intervals[i] = times[i + 1]! - times[i]!;
  intervals.sort();
  const middle = intervals.length >> 1;
  return intervals.length % 2 === 1 ? intervals[middle]! : (intervals[middle - 1]! + intervals[middle]!) / 2;
}

/** Frames in each window in which the local rate is looked at; a ramp of slow motion lasts longer. */
const window_frames = 30;

/** Ratio between local frame intervals from which on the rate is said to change. House rule, no source. */
const largestRatio = 1.5;

/**
 * Warns when the frame rate changes along the recording: the mark of slow motion with a ramp, in which container time
 * is no longer proportional to capture time. Single gaps (dropped frames) don't count, nor do jittery times.
 */
export function rateChanges(times: ArrayLike<number>): Warning[] {
  let least = Number.POSITIVE_INFINITY;
  let most = 0;
  for (let from = 0; from + window_frames < times.length; from += window_frames) {
    const local = medianInterval(Array.prototype.slice.call(times, from, from + window_frames + 1))!;
    least = Math.min(least, local);
    most = Math.max(most, local);
  }
  if (!(most > largestRatio * least)) return [];
  return [
    {
      code: "rate-changes",
      message: `The time between frames changes along the recording by a factor of ${(most / least).toFixed(1)}, as in slow motion that fades in and out. Speeds are only right if the stored times are the capture times; use the untouched original, or film at one rate.`,
    },
  ];
}
