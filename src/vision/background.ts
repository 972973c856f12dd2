import { type Kernels, stackSize } from "./kernels/index.ts";
import type { Sample } from "./survey.ts";

/** The still layer of a scene and the noise of one frame over it, both in grey levels, row-major. */
export interface Background {
  readonly level: Float32Array;
  readonly noise: Float32Array;
}

/**
 * Ranks used of 32: the mean of the middle eight is a median with less noise of its own, and still indifferent to cells
 * that cover a pixel up to a third of the time.
 */
const ranks = { low: 12, high: 20, lower: 8, upper: 23 };
/** Expected distance between those ranks for normal noise of standard deviation 1 (Blom's plotting positions). */
const spreadOfNormal = 1.241;
/** Least noise believed, grey levels: 8-bit rounding alone gives 0.29, and encoders hide more. */
const leastNoise = 0.6;

/**
 * Temporal background and noise map from samples of the clip.
 *
 * @param samples at least one; more than 32 are thinned evenly, fewer are repeated.
 * @param aligned planes of 32 samples in kernel memory to work in (filled here through `place`).
 * @param place writes a sample, moved by its camera shake, into a plane.
 */
export function learnBackground(
  kernels: Kernels,
  samples: readonly Sample[],
  planes: readonly Uint8Array[],
  place: (sample: Sample, plane: Uint8Array) => void,
  width: number,
  height: number,
  out: { readonly level: Float32Array; readonly spread: Float32Array },
): Background {
  const chosen = chooseEvenly(samples, stackSize);
  chosen.forEach((s, k) => {
    place(s, planes[k]!);
  });
  kernels.sortStack(planes, ranks, out.level, out.spread);
  return { level: out.level, noise: smoothNoise(out.spread, width, height) };
}

/** Picks `n` of the items evenly; repeats some when there are fewer. */
export function chooseEvenly<T>(items: readonly T[], n: number): T[] {
  return Array.from({ length: n }, (_, k) => items[Math.floor((k * items.length) / n)]!);
}

/**
 * The spread of 32 values of one pixel is a rough figure, so it is averaged over 11 x 11 pixels; where the pixel's own
 * spread stands far above its neighbourhood's (the edge of debris that trembles) its own is kept.
 */
function smoothNoise(spread: Float32Array, width: number, height: number): Float32Array {
  const mean = boxMean(spread, width, height, 5);
  for (let i = 0; i < mean.length; i++) {
    const m = mean[i]! / spreadOfNormal;
    const own = spread[i]! / spreadOfNormal;
    mean[i] = Math.max(leastNoise, own > 2 * m + 1 ? own : m);
  }
  return mean;
}

/** Mean over a square of (2 radius + 1)² pixels, cut off at the edges. */
export function boxMean(src: Float32Array, width: number, height: number, radius: number): Float32Array {
  const rows = new Float32Array(src.length);
  for (let y = 0; y < height; y++) slide(src, rows, y * width, 1, width, radius);
  const out = new Float32Array(src.length);
  for (let x = 0; x < width; x++) slide(rows, out, x, width, height, radius);
  return out;
}

function slide(src: Float32Array, out: Float32Array, start: number, step: number, n: number, radius: number): void {
  let sum = 0;
  for (let i = 0; i < Math.min(radius, n); i++) sum += src[start + i * step]!;
  for (let i = 0; i < n; i++) {
    if (i + radius < n) sum += src[start + (i + radius) * step]!;
    if (i - radius - 1 >= 0) sum -= src[start + (i - radius - 1) * step]!;
    const count = Math.min(i + radius, n - 1) - Math.max(i - radius, 0) + 1;
    out[start + i * step] = sum / count;
  }
}
