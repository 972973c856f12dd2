import type { AssaySettings } from "./options.ts";
import { normals, stream } from "./variates.ts";

/** When frames were captured, and what the container will say of it. */
export interface Capture {
  readonly frames: number;
  /** Capture time of each frame since the first: what a right reading of the recording gives. */
  readonly times_s: Float64Array;
  /** The frame whose picture frame i shows: itself, or an earlier one that was repeated. */
  readonly shows: Uint32Array;
  /** Times as the container tells them: those of capture, stretched in slow motion. Whole milliseconds when irregular. */
  readonly containerTimes_s: Float64Array;
  /** All intervals alike. */
  readonly constantRate: boolean;
}

/** Period of the slow swing of the frame interval. */
const wanderPeriod_s = 3;

/** Lays out the capture times. Irregular times are whole container milliseconds, since that is what phones write. */
export function captureTimes(seed: number, time: AssaySettings["time"]): Capture {
  const { fps, jitter, wander, dropped, repeated } = time;
  const constantRate = jitter === 0 && wander === 0 && dropped === 0;
  const stretch = time.container_fps === null ? 1 : fps / time.container_fps;
  const normal = normals(stream(seed, "jitter"));
  const chance = stream(seed, "dropped");
  const again = stream(seed, "repeated");
  const times: number[] = [];
  const shows: number[] = [];
  let t = 0;
  for (let tick = 0; ; tick++) {
    const now = constantRate ? tick / fps : Math.round(t * stretch * 1000) / 1000 / stretch;
    if (now >= time.seconds - 1e-9) break;
    const i = times.length;
    const isDropped = chance() < dropped && i > 0;
    const isRepeat = again() < repeated && i > 0;
    if (!isDropped) {
      times.push(now);
      shows.push(isRepeat ? (shows[i - 1] as number) : i);
    }
    const swing = 1 + wander * Math.sin((2 * Math.PI * t) / wanderPeriod_s);
    const shiver = 1 + jitter * Math.max(-2.5, Math.min(2.5, normal()));
    t += (swing * Math.max(0.2, shiver)) / fps;
  }
  const times_s = Float64Array.from(times);
  return {
    frames: times.length,
    times_s,
    shows: Uint32Array.from(shows),
    containerTimes_s: times_s.map((s) => s * stretch),
    constantRate,
  };
}
