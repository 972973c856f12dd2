import { type Kernels, stackSize } from "./kernels/index.ts";
import type { Sample } from "./survey.ts";

/** The still layer of a scene and the noise of one frame over it, both in grey levels, row-major. */
export interface Background {
  readonly level: Float32Array;
  readonly noise: Float32Array;
  /** Spread of the pixel's own samples as a standard deviation: above `noise` where something lingers or trembles. */
  readonly own: Float32Array;
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
/** Side of the tiles over which noise is taken to be alike, pixels. */
const tile = 40;
/** What steadying leaves unsteadied, pixels: adds noise in proportion to the still layer's gradient. */
const unsteady_px = 0.08;
/**
 * Where there is something to draw, an encoder draws it a little differently every time: noise there is above that of the
 * tile, by what the pixels around show but by no more than this, grey levels. More is a cell that lingers.
 */
const mostRedrawn = 1.5;
/** Where the still layer changes by more than this from pixel to pixel, grey levels, noise isn't read off. */
const steepSlope = 4;
/** Below this level nothing is lit, and nothing is learnt about noise. */
const darkLevel = 6;

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
  return {
    level: out.level.slice(),
    noise: noiseMap(out.spread, out.level, width, height),
    own: out.spread.map((v) => v / spreadOfNormal),
  };
}

/** Picks `n` of the items evenly; repeats some when there are fewer. */
export function chooseEvenly<T>(items: readonly T[], n: number): T[] {
  return Array.from({ length: n }, (_, k) => items[Math.floor((k * items.length) / n)]!);
}

/**
 * Noise of one frame from the spread of 32 values a pixel: the median over tiles, interpolated, since a single pixel's
 * spread is a rough figure and is widened where cells linger. What imperfect steadying adds on steep edges of the still
 * layer (debris, scratches) is added in squares.
 */
function noiseMap(spread: Float32Array, level: Float32Array, width: number, height: number): Float32Array {
  const columns = Math.max(1, Math.round(width / tile));
  const rows = Math.max(1, Math.round(height / tile));
  const grid = new Float32Array(columns * rows);
  for (let r = 0; r < rows; r++) {
    for (let c = 0; c < columns; c++) {
      grid[r * columns + c] = tileMean(
        spread,
        level,
        width,
        height,
        c / columns,
        (c + 1) / columns,
        r / rows,
        (r + 1) / rows,
      );
    }
  }
  const out = new Float32Array(spread.length);
  const variance = spread.map((v) => (v / spreadOfNormal) ** 2);
  const around = boxMean(variance, width, height, 3);
  for (let y = 0; y < height; y++) {
    const gy = clampTo(((y + 0.5) * rows) / height - 0.5, rows);
    for (let x = 0; x < width; x++) {
      const gx = clampTo(((x + 0.5) * columns) / width - 0.5, columns);
      const at = gy.low * columns;
      const below = gy.high * columns;
      const top = grid[at + gx.low]! * (1 - gx.part) + grid[at + gx.high]! * gx.part;
      const bottom = grid[below + gx.low]! * (1 - gx.part) + grid[below + gx.high]! * gx.part;
      const base = top * (1 - gy.part) + bottom * gy.part;
      const i = y * width + x;
      const dx = x > 0 && x < width - 1 ? (level[i + 1]! - level[i - 1]!) / 2 : 0;
      const dy = y > 0 && y < height - 1 ? (level[i + width]! - level[i - width]!) / 2 : 0;
      const edge = Math.max(0, Math.sqrt(dx * dx + dy * dy) - base) * unsteady_px;
      const redrawn = Math.min(Math.max(0, around[i]! - base * base), mostRedrawn ** 2);
      out[i] = Math.sqrt(base * base + edge * edge + redrawn);
    }
  }
  return out;
}

/**
 * Mean spread of a tile without its most and least lively fifths, as a standard deviation. A mean, not a median: the
 * spreads are whole numbers, and a median would be one too. Pixels much darker than the tile's bright ones have less noise
 * and don't count, nor do steep ones, where whatever trembles adds to it: at the rim of an eyepiece's view there are many.
 */
function tileMean(
  spread: Float32Array,
  level: Float32Array,
  width: number,
  height: number,
  left: number,
  right: number,
  top: number,
  bottom: number,
): number {
  const lit: number[] = [];
  // Every other pixel of every other row, shifted by turns: four hundred of a tile tell its noise to a few per cent.
  for (let y = Math.floor(top * height); y < Math.floor(bottom * height); y += 2) {
    for (let x = Math.floor(left * width) + ((y >> 1) & 1); x < Math.floor(right * width); x += 2) {
      if (level[y * width + x]! > darkLevel) lit.push(y * width + x);
    }
  }
  if (lit.length < 20) return leastNoise;
  const levels = Float32Array.from(lit, (i) => level[i]!).sort();
  const dim = 0.7 * levels[Math.floor(0.9 * levels.length)]!;
  const even = lit.filter((i) => level[i]! > dim && slope(level, width, i) < steepSlope);
  const values = Float32Array.from(even.length < 20 ? lit : even, (i) => spread[i]!).sort();
  const kept = values.slice(Math.floor(values.length * 0.2), Math.ceil(values.length * 0.8));
  return Math.max(leastNoise, kept.reduce((s, v) => s + v, 0) / kept.length / spreadOfNormal);
}

/** Change of level from one pixel to the next, the greater of both directions. Edges of the picture count as flat. */
function slope(level: Float32Array, width: number, i: number): number {
  const x = i % width;
  const across = x > 0 && x < width - 1 ? Math.abs(level[i + 1]! - level[i - 1]!) / 2 : 0;
  const down = i >= width && i + width < level.length ? Math.abs(level[i + width]! - level[i - width]!) / 2 : 0;
  return Math.max(across, down);
}

function clampTo(g: number, n: number): { low: number; high: number; part: number } {
  const c = Math.min(Math.max(g, 0), n - 1);
  const low = Math.floor(c);
  return { low, high: Math.min(low + 1, n - 1), part: c - low };
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
