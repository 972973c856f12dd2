import type { Track } from "../../src/analysis/motion/track.ts";
import type { Paths } from "../../src/quantities/index.ts";

/** One cell to simulate. Any unit of length; y up. */
export interface Walker {
  readonly speed: number;
  /** Heading at the start, radians counter-clockwise. */
  readonly heading_rad?: number;
  /** Steady turning, radians per second, and rotational diffusion in the plane, radians² per second. */
  readonly turning_rad_s?: number;
  readonly rotation_rad2_s?: number;
  /** Diffusion coefficient of the body. */
  readonly diffusion: number;
  /** Standard deviation of a measured position along one axis. */
  readonly sigma: number;
  readonly flow?: readonly [x: number, y: number];
  readonly start?: readonly [x: number, y: number];
}

/** Times of frames at an even rate, from 0 to `seconds` inclusive. */
export function evenTimes(seconds: number, fps: number): Float64Array {
  return Float64Array.from({ length: Math.round(seconds * fps) + 1 }, (_, i) => i / fps);
}

/**
 * An active Brownian walker seen at the given times: its heading turns steadily and at random, its body diffuses, the flow
 * carries it, and each position is measured with normal error.
 */
export function walk(walker: Walker, times_s: Float64Array, normal: () => number): Track {
  const { speed, turning_rad_s = 0, rotation_rad2_s = 0, diffusion, sigma, flow = [0, 0], start = [0, 0] } = walker;
  let heading = walker.heading_rad ?? 0;
  let [x, y] = start;
  const xs = new Float64Array(times_s.length);
  const ys = new Float64Array(times_s.length);
  times_s.forEach((t, i) => {
    if (i > 0) {
      const dt = t - (times_s[i - 1] as number);
      const turned = turning_rad_s * dt + Math.sqrt(2 * rotation_rad2_s * dt) * normal();
      const step = Math.sqrt(2 * diffusion * dt);
      x += (speed * Math.cos(heading + turned / 2) + flow[0]) * dt + step * normal();
      y += (speed * Math.sin(heading + turned / 2) + flow[1]) * dt + step * normal();
      heading += turned;
    }
    xs[i] = x + sigma * normal();
    ys[i] = y + sigma * normal();
  });
  const duration = (times_s.at(-1) as number) - (times_s[0] as number);
  return { t: times_s, x: xs, y: ys, statedVariance: sigma * sigma, duration };
}

/** The tracks as a table of paths: y down, frames counted along each track. */
export function pathsOf(tracks: readonly Track[]): Paths {
  const start = new Uint32Array(tracks.length + 1);
  tracks.forEach((track, p) => {
    start[p + 1] = (start[p] as number) + track.t.length;
  });
  const column = (of: (track: Track) => ArrayLike<number>) => tracks.flatMap((track) => Array.from(of(track)));
  const errors = Float32Array.from(column((track) => track.t.map(() => Math.sqrt(track.statedVariance))));
  return {
    count: tracks.length,
    start,
    frame: Uint32Array.from(column((track) => track.t.map((_, i) => i))),
    t_s: Float64Array.from(column((track) => track.t)),
    x_px: Float64Array.from(column((track) => track.x)),
    y_px: Float64Array.from(column((track) => track.y.map((v) => -v))),
    seX_px: errors,
    seY_px: errors,
    sighting: Uint32Array.from(errors, (_, i) => i),
    began: tracks.map(() => "first frame"),
    ended: tracks.map(() => "last frame"),
  };
}
