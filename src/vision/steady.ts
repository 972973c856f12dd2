/**
 * Camera shake: how far the picture of the still scene has moved between frames, from the scene's own fine texture
 * (debris, scratches, the rim of the view), by robust Gauss-Newton registration of a translation with sub-pixel steps
 * (B. D. Lucas and T. Kanade 1981, "An iterative image registration technique"; inverse form of S. Baker and
 * I. Matthews 2004) with Tukey weights, so that cells swimming across don't count.
 */

/** Pixels of the still picture that tell a shift: those where it changes fast. */
export interface Texture {
  readonly width: number;
  readonly height: number;
  /** Row-major pixel indices, levels, and gradients (levels a pixel). */
  readonly at: Int32Array;
  readonly level: Float32Array;
  readonly gx: Float32Array;
  readonly gy: Float32Array;
  /** Standard deviation expected of a shift measured in one frame, pixels (the worse direction); Infinity if none can be. */
  readonly sd_px: number;
}

/** A measured shift, pixels: picture position = scene position + (x, y). */
export interface ShiftEstimate {
  readonly x: number;
  readonly y: number;
  /** Share of the texture that agrees with it. */
  readonly agreement: number;
}

const mostPoints = 4000;
const edge = 4;

/**
 * Picks the texture of a still picture.
 *
 * @param picture levels, row-major; `inView` non-zero where pixels may be used; `noise` is the frame noise in levels.
 */
export function findTexture(
  picture: Float32Array,
  width: number,
  height: number,
  inView: Uint8Array,
  noise: number,
): Texture {
  const least = Math.max(1, 1.2 * noise);
  const candidates: { at: number; strength: number; gx: number; gy: number }[] = [];
  for (let y = edge; y < height - edge; y++) {
    for (let x = edge; x < width - edge; x++) {
      const i = y * width + x;
      if (inView[i] === 0) continue;
      // Derivative over ±2 pixels, averaged over three rows: the picture is quantised and noisy.
      const gx = slope(picture, i, 1, width);
      const gy = slope(picture, i, width, 1);
      const strength = gx * gx + gy * gy;
      if (strength > least * least) candidates.push({ at: i, strength, gx, gy });
    }
  }
  candidates.sort((a, b) => b.strength - a.strength || a.at - b.at);
  const chosen = candidates.slice(0, mostPoints);
  let xx = 0;
  let yy = 0;
  let xy = 0;
  for (const c of chosen) {
    xx += c.gx * c.gx;
    yy += c.gy * c.gy;
    xy += c.gx * c.gy;
  }
  const weakest = (xx + yy) / 2 - Math.sqrt(((xx - yy) / 2) ** 2 + xy * xy);
  // The noise of neighbouring points in compressed video isn't independent: count each as a third.
  const sd_px =
    chosen.length >= 40 && weakest > 0 ? (noise * Math.sqrt(3)) / Math.sqrt(weakest) : Number.POSITIVE_INFINITY;
  return {
    width,
    height,
    at: Int32Array.from(chosen, (c) => c.at),
    level: Float32Array.from(chosen, (c) => picture[c.at]!),
    gx: Float32Array.from(chosen, (c) => c.gx),
    gy: Float32Array.from(chosen, (c) => c.gy),
    sd_px,
  };
}

function slope(p: Float32Array, i: number, step: number, across: number): number {
  let sum = 0;
  for (const j of [i - across, i, i + across])
    sum += p[j + 2 * step]! * 2 + p[j + step]! - p[j - step]! - 2 * p[j - 2 * step]!;
  return sum / 30;
}

/**
 * Shift of a frame against the texture, starting from a guess. `gain` and `offset` turn still levels into this frame's.
 * When the guess leads nowhere, whole-pixel shifts up to ±40 pixels are tried.
 */
export function measureShift(
  texture: Texture,
  luma: Uint8Array,
  guess: { readonly x: number; readonly y: number },
  gain: number,
  offset: number,
): ShiftEstimate {
  const near = refine(texture, luma, guess, gain, offset);
  if (near.agreement > 0.5) return near;
  const far = refine(texture, luma, search(texture, luma, gain, offset), gain, offset);
  return far.agreement > near.agreement ? far : near;
}

function refine(
  t: Texture,
  luma: Uint8Array,
  guess: { readonly x: number; readonly y: number },
  gain: number,
  offset: number,
): ShiftEstimate {
  const n = t.at.length;
  const r = new Float32Array(n);
  let { x, y } = guess;
  let agreement = 0;
  for (let step = 0; step < 12; step++) {
    for (let i = 0; i < n; i++) r[i] = (levelAt(t, luma, t.at[i]!, x, y) - offset) / gain - t.level[i]!;
    const scale = Math.max(1.5, 1.4826 * medianAbsolute(r));
    const cut = 4.685 * scale;
    let xx = 0;
    let xy = 0;
    let yy = 0;
    let bx = 0;
    let by = 0;
    let within = 0;
    let strength = 0;
    for (let i = 0; i < n; i++) {
      const gx = t.gx[i]!;
      const gy = t.gy[i]!;
      const g2 = gx * gx + gy * gy;
      strength += g2;
      const u = r[i]! / cut;
      if (u <= -1 || u >= 1) continue;
      const w = (1 - u * u) ** 2;
      xx += w * gx * gx;
      xy += w * gx * gy;
      yy += w * gy * gy;
      bx -= w * gx * r[i]!;
      by -= w * gy * r[i]!;
      // Agreeing means within noise of the texture's own contrast, not of a scale inflated by a wrong shift.
      if (r[i]! * r[i]! < 9 + g2) within += g2;
    }
    agreement = strength > 0 ? within / strength : 0;
    const det = xx * yy - xy * xy;
    if (!(det > 1e-9 * (xx + yy) ** 2)) break;
    let dx = (yy * bx - xy * by) / det;
    let dy = (xx * by - xy * bx) / det;
    const length = Math.sqrt(dx * dx + dy * dy);
    if (length > 2) {
      dx *= 2 / length;
      dy *= 2 / length;
    }
    x += dx;
    y += dy;
    if (length < 0.003) break;
  }
  return { x, y, agreement };
}

function search(t: Texture, luma: Uint8Array, gain: number, offset: number): { x: number; y: number } {
  const every = Math.max(1, Math.floor(t.at.length / 500));
  let best = { x: 0, y: 0 };
  let least = Number.POSITIVE_INFINITY;
  const cost = (dx: number, dy: number): number => {
    let sum = 0;
    for (let i = 0; i < t.at.length; i += every) {
      const d = Math.abs((levelAt(t, luma, t.at[i]!, dx, dy) - offset) / gain - t.level[i]!);
      sum += Math.min(d, 30);
    }
    return sum;
  };
  const consider = (dx: number, dy: number) => {
    const c = cost(dx, dy);
    if (c < least) {
      least = c;
      best = { x: dx, y: dy };
    }
  };
  for (let dy = -40; dy <= 40; dy += 2) for (let dx = -40; dx <= 40; dx += 2) consider(dx, dy);
  const { x, y } = best;
  for (let dy = -1; dy <= 1; dy++) for (let dx = -1; dx <= 1; dx++) consider(x + dx, y + dy);
  return best;
}

/** Bilinear level at pixel `at` moved by (dx, dy); beyond the edge the nearest pixel. */
function levelAt(t: Texture, luma: Uint8Array, at: number, dx: number, dy: number): number {
  const py = Math.floor(at / t.width);
  const px = at - py * t.width;
  const x = Math.min(Math.max(px + dx, 0), t.width - 1.001);
  const y = Math.min(Math.max(py + dy, 0), t.height - 1.001);
  const ix = Math.floor(x);
  const iy = Math.floor(y);
  const ax = x - ix;
  const ay = y - iy;
  const i = iy * t.width + ix;
  const top = luma[i]! + ax * (luma[i + 1]! - luma[i]!);
  const bottom = luma[i + t.width]! + ax * (luma[i + t.width + 1]! - luma[i + t.width]!);
  return top + ay * (bottom - top);
}

/** Points that the spread of residuals is read from. */
const spreadPoints = 400;

/** Median size of the residuals, from some of them. */
function medianAbsolute(r: Float32Array): number {
  const every = Math.max(1, Math.floor(r.length / spreadPoints));
  const some = new Float32Array(Math.ceil(r.length / every));
  for (let i = 0, k = 0; i < r.length; i += every, k++) some[k] = Math.abs(r[i]!);
  some.sort();
  return some.length > 0 ? some[some.length >> 1]! : 0;
}
