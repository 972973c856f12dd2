import { type Background, boxMean } from "./background.ts";
import type { Placed, SpotKind } from "./spot-kind.ts";
import { measureSpot } from "./spot-shape.ts";

/** The still layer with cells that only linger taken out of it, and the spots that truly never move. */
export interface SeparatedLayer {
  readonly level: Float32Array;
  readonly still: readonly { readonly x_px: number; readonly y_px: number }[];
}

/** A spot that would be seen in a single frame at this signal over noise is looked at. */
const visible = 5;
/** Fainter still spots than this part of a cell's contrast are grain that the encoder has frozen. */
const leastOfCell = 0.15;
/** More wandering than this, beyond what its localisation error explains, is motion. Pixels. */
const leastWander_px = 0.3;
/** Wandering less than this is left to imperfect steadying. Pixels. */
const tremble_px = 0.08;
/** Variance over that of noise, averaged over a spot, below which nothing moves there. */
const calmRatio = 1.5;
/**
 * A spot that wanders less than this isn't told from one that lies still, pixels: steadying leaves a little, and an encoder
 * draws the same debris anew with every key frame, never quite the same.
 */
const leastDrift_px = 0.35;
/** Spread that an encoder's redrawing of the same thing makes, grey levels. */
const redrawn = 2;
/** Von Neumann ratio below which a sequence of positions is no white noise (expected 2, standard deviation about 0.25). */
const walkRatio = 1.15;

/**
 * A cell that only diffuses stays about its place and so becomes part of a temporal background, which would hide it.
 * Debris does too, and should. They are told apart by whether the spot wanders, or comes and goes, over the samples;
 * the background under one that does is filled from its surroundings, in a copy of `into`.
 */
export function separateStill(
  still: Background,
  into: Float32Array,
  inView: Uint8Array,
  width: number,
  height: number,
  kind: SpotKind,
  placed: readonly Placed[],
): SeparatedLayer {
  const sigma = kind.sigma_px;
  const level = into.slice();
  const wide = boxMean(still.level, width, height, Math.ceil(5 * sigma));
  const narrow = boxMean(still.level, width, height, Math.max(1, Math.round(1.2 * sigma)));
  const found: { x_px: number; y_px: number }[] = [];
  const side = 2 * Math.max(1, Math.round(1.2 * sigma)) + 1;
  for (const i of spotsOf(narrow, wide, still.noise, inView, width, height, kind, side)) {
    const x = i % width;
    const y = Math.floor(i / width);
    const base = ringMedian(still.level, width, height, x, y, 3.5 * sigma, 5.5 * sigma);
    if (
      !calm(still, width, height, x, y, 2 * sigma) &&
      lingers(placed, base, still.noise[i]!, width, height, kind, x, y)
    ) {
      fill(level, width, height, x, y, 3.2 * sigma, base);
    } else {
      found.push({ x_px: x, y_px: y });
    }
  }
  return { level, still: found };
}

/**
 * The still layer with pixels replaced by their calm surroundings where their own spread is far above the noise, and above
 * what trembling does on a steep edge: there a cell lingers and wanders, and the median is neither the cell nor the background.
 *
 * @param reach radius over which calm surroundings are averaged, pixels.
 */
export function fillLively(
  still: Background,
  inView: Uint8Array,
  width: number,
  height: number,
  reach: number,
): Float32Array {
  const { level, noise, own } = still;
  const excess = new Float32Array(level.length);
  for (let y = 1; y < height - 1; y++) {
    for (let x = 1; x < width - 1; x++) {
      const i = y * width + x;
      const dx = (level[i + 1]! - level[i - 1]!) / 2;
      const dy = (level[i + width]! - level[i - width]!) / 2;
      const bound = (2.2 * noise[i]!) ** 2 + 0.09 * (dx * dx + dy * dy) + redrawn ** 2;
      excess[i] = inView[i] === 0 ? -bound : own[i]! * own[i]! - bound;
    }
  }
  // A cell is wider than a pixel; a single lively pixel is the encoder's.
  const around = boxMean(excess, width, height, 1);
  const lively = new Uint8Array(level.length);
  for (let y = 1; y < height - 1; y++) {
    for (let x = 1; x < width - 1; x++) {
      const i = y * width + x;
      if (around[i]! > 0) for (const j of [i, i - 1, i + 1, i - width, i + width]) lively[j] = 1;
    }
  }
  const usable = lively.map((v, i) => (v === 0 && inView[i] === 1 ? 1 : 0));
  const calm = level.map((v, i) => (usable[i] ? v : 0));
  const share = Float32Array.from(usable);
  const sums = boxMean(boxMean(calm, width, height, reach), width, height, reach);
  const weights = boxMean(boxMean(share, width, height, reach), width, height, reach);
  return level.map((v, i) => (lively[i] && weights[i]! > 0.05 ? sums[i]! / weights[i]! : v));
}

/** Maxima of the still layer's own spots, as pixel indices, strongest first. */
function spotsOf(
  narrow: Float32Array,
  wide: Float32Array,
  noise: Float32Array,
  inView: Uint8Array,
  width: number,
  height: number,
  kind: SpotKind,
  side: number,
): number[] {
  const reach = Math.max(2, Math.round(1.5 * kind.sigma_px));
  // Strength of a matched filter on a Gaussian spot of unit noise: peak times √π σ.
  const cell = (kind.strength / (Math.sqrt(Math.PI) * kind.sigma_px)) * medianOf(noise);
  const contrast = leastOfCell * cell;
  const height2 = height - reach;
  const strength = (i: number) => (kind.sign * (narrow[i]! - wide[i]!) * side) / noise[i]!;
  const out: number[] = [];
  for (let y = reach; y < height2; y++) {
    for (let x = reach; x < width - reach; x++) {
      const i = y * width + x;
      if (inView[i] === 0) continue;
      const v = strength(i);
      if (v < visible || kind.sign * (narrow[i]! - wide[i]!) < contrast) continue;
      let top = true;
      for (let dy = -reach; dy <= reach && top; dy++) {
        for (let dx = -reach; dx <= reach && top; dx++) {
          const j = i + dy * width + dx;
          if (j !== i && (j < i ? strength(j) >= v : strength(j) > v)) top = false;
        }
      }
      if (top) out.push(i);
    }
  }
  return out.sort((a, b) => strength(b) - strength(a) || a - b);
}

/** Do the pixels about (x, y) spread no more over the samples than noise, and trembling on their slopes, explain? */
function calm(still: Background, width: number, height: number, x: number, y: number, radius: number): boolean {
  const { level, noise, own } = still;
  const r = Math.ceil(radius);
  let spread = 0;
  let explained = 0;
  for (let j = Math.max(1, y - r); j <= Math.min(height - 2, y + r); j++) {
    for (let i = Math.max(1, x - r); i <= Math.min(width - 2, x + r); i++) {
      if ((i - x) ** 2 + (j - y) ** 2 > radius * radius) continue;
      const k = j * width + i;
      const dx = (level[k + 1]! - level[k - 1]!) / 2;
      const dy = (level[k + width]! - level[k - width]!) / 2;
      spread += own[k]! * own[k]!;
      explained += calmRatio * noise[k]! * noise[k]! + leastDrift_px * leastDrift_px * (dx * dx + dy * dy);
    }
  }
  return spread < explained;
}

function medianOf(values: Float32Array): number {
  const some = values.filter((_, i) => i % 101 === 0).sort();
  return some.length > 0 ? some[some.length >> 1]! : 1;
}

/** Does the spot at (x, y) move, or come and go, over the samples? */
function lingers(
  placed: readonly Placed[],
  base: number,
  noise: number,
  width: number,
  height: number,
  kind: SpotKind,
  x: number,
  y: number,
): boolean {
  const reach = Math.ceil(6.5 * kind.sigma_px);
  const size = 2 * reach + 1;
  const z = new Float32Array(size * size);
  const xs: number[] = [];
  const ys: number[] = [];
  const peaks: number[] = [];
  for (const { sample, shift, exposure } of placed) {
    const ox = Math.round(x + shift.x);
    const oy = Math.round(y + shift.y);
    for (let j = 0; j < size; j++) {
      for (let i = 0; i < size; i++) {
        const px = ox + i - reach;
        const py = oy + j - reach;
        const inside = px >= 0 && py >= 0 && px < width && py < height;
        const f = inside ? sample.luma[py * width + px]! : base;
        z[j * size + i] = inside ? (f - exposure.offset - exposure.gain * base) / noise : 0;
      }
    }
    const spot = measureSpot({ z, width: size, height: size }, kind.sign, reach, reach, kind.sigma_px, 0, []);
    if (!spot.good) {
      peaks.push(0);
      continue;
    }
    peaks.push(spot.peak);
    xs.push(spot.x + ox - reach - shift.x);
    ys.push(spot.y + oy - reach - shift.y);
  }
  if (xs.length < 0.8 * placed.length) return true;
  const strongest = [...peaks].sort((a, b) => a - b)[peaks.length >> 1]!;
  const error = 0.8 / Math.max(0.5, strongest);
  const wander = Math.max(robustSd(xs), robustSd(ys));
  // Coming and going: a third of the time it has lost half its contrast.
  const weak = peaks.filter((p) => p < 0.5 * strongest).length;
  if (weak > peaks.length / 3) return true;
  if (xs.length >= 12) return wander > tremble_px && vonNeumannRatio(xs, ys) < walkRatio;
  return wander > Math.sqrt(leastWander_px ** 2 + (3 * error) ** 2);
}

/**
 * Mean squared step over variance (J. von Neumann 1941, Ann. Math. Stat. 12, 367), both axes together: about 2 for
 * independent errors about one place, near 0 for a random walk. It needs no knowledge of the size of the error.
 */
function vonNeumannRatio(xs: readonly number[], ys: readonly number[]): number {
  let steps = 0;
  let spread = 0;
  for (const v of [xs, ys]) {
    const mean = v.reduce((s, a) => s + a, 0) / v.length;
    for (let i = 0; i < v.length; i++) {
      spread += (v[i]! - mean) ** 2;
      if (i > 0) steps += (v[i]! - v[i - 1]!) ** 2;
    }
  }
  return spread > 0 ? steps / spread : 2;
}

/** 1.4826 times the median absolute deviation. */
function robustSd(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const m = sorted[sorted.length >> 1]!;
  const off = values.map((v) => Math.abs(v - m)).sort((a, b) => a - b);
  return 1.4826 * off[off.length >> 1]!;
}

function ringMedian(
  level: Float32Array,
  width: number,
  height: number,
  x: number,
  y: number,
  inner: number,
  outer: number,
): number {
  const values: number[] = [];
  const r = Math.ceil(outer);
  for (let j = Math.max(0, y - r); j <= Math.min(height - 1, y + r); j++) {
    for (let i = Math.max(0, x - r); i <= Math.min(width - 1, x + r); i++) {
      const d2 = (i - x) ** 2 + (j - y) ** 2;
      if (d2 >= inner * inner && d2 <= outer * outer) values.push(level[j * width + i]!);
    }
  }
  values.sort((a, b) => a - b);
  return values.length ? values[values.length >> 1]! : level[y * width + x]!;
}

function fill(
  level: Float32Array,
  width: number,
  height: number,
  x: number,
  y: number,
  radius: number,
  base: number,
): void {
  const r = Math.ceil(radius);
  for (let j = Math.max(0, y - r); j <= Math.min(height - 1, y + r); j++) {
    for (let i = Math.max(0, x - r); i <= Math.min(width - 1, x + r); i++) {
      if ((i - x) ** 2 + (j - y) ** 2 <= radius * radius) level[j * width + i] = base;
    }
  }
}
