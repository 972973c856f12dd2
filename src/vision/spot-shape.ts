/**
 * Position, size and axis of one spot in a whitened picture (noise of standard deviation 1), by adaptive Gaussian-weighted
 * moments (G. M. Bernstein and M. Jarvis 2002, Astron. J. 123, 583; C. Hirata and U. Seljak 2003, MNRAS 343, 459): the
 * weight is a Gaussian of the spot's own shape and place, found by iteration. For a Gaussian spot in white noise that is
 * the maximum-likelihood position; unlike a thresholded centroid it isn't biased towards the window's middle.
 */
export interface SpotShape {
  readonly x: number;
  readonly y: number;
  /** Peak above the background in units of the pixel noise. */
  readonly peak: number;
  /** Covariance of the spot's Gaussian, pixels². */
  readonly xx: number;
  readonly xy: number;
  readonly yy: number;
  /** False when the iteration ran off or the spot vanished. */
  readonly good: boolean;
}

/** A whitened picture to read from. */
export interface Whitened {
  readonly z: Float32Array;
  readonly width: number;
  readonly height: number;
}

const mostRounds = 12;

/**
 * Measures a spot.
 *
 * @param sign +1 for bright, -1 for dark spots.
 * @param sigma typical standard deviation of a spot, pixels: where the shape starts, and what bounds it.
 * @param freedom 1: the shape is the spot's own; 0: it stays round with `sigma` (for faint spots, whose shape is noise).
 * @param others neighbouring spots, whose light is taken away first.
 */
export function measureSpot(
  picture: Whitened,
  sign: 1 | -1,
  startX: number,
  startY: number,
  sigma: number,
  freedom: number,
  others: readonly SpotShape[],
): SpotShape {
  const s2 = sigma * sigma;
  let x = startX;
  let y = startY;
  let xx = s2;
  let xy = 0;
  let yy = s2;
  let peak = 0;
  const reach = Math.ceil(3.6 * sigma * (freedom > 0 ? 1.4 : 1));
  const x0 = Math.max(0, Math.round(startX) - reach);
  const x1 = Math.min(picture.width - 1, Math.round(startX) + reach);
  const y0 = Math.max(0, Math.round(startY) - reach);
  const y1 = Math.min(picture.height - 1, Math.round(startY) + reach);
  const cut = cutOut(picture, sign, x0, x1, y0, y1, others);
  const w = x1 - x0 + 1;

  for (let round = 0; round < mostRounds; round++) {
    const det = xx * yy - xy * xy;
    const ia = yy / det;
    const ib = -xy / det;
    const ic = xx / det;
    let s = 0;
    let sx = 0;
    let sy = 0;
    let sxx = 0;
    let sxy = 0;
    let syy = 0;
    let ww = 0;
    for (let j = y0; j <= y1; j++) {
      const dy = j - y;
      for (let i = x0; i <= x1; i++) {
        const dx = i - x;
        const q = ia * dx * dx + 2 * ib * dx * dy + ic * dy * dy;
        if (q > 13) continue;
        const weight = Math.exp(-0.5 * q);
        const v = weight * cut[(j - y0) * w + i - x0]!;
        s += v;
        sx += v * dx;
        sy += v * dy;
        sxx += v * dx * dx;
        sxy += v * dx * dy;
        syy += v * dy * dy;
        ww += weight * weight;
      }
    }
    peak = s / ww;
    if (!(s > 0)) return { x: startX, y: startY, peak: 0, xx: s2, xy: 0, yy: s2, good: false };
    // The weight pulls the mean halfway back to where it stands: go twice as far.
    const stepX = clamp((2 * sx) / s, sigma);
    const stepY = clamp((2 * sy) / s, sigma);
    x += stepX;
    y += stepY;
    if (freedom > 0) {
      // Weighted covariance V = (C⁻¹ + M⁻¹)⁻¹; at the fixed point C = M = 2 V.
      const vx = sxx / s - (sx / s) ** 2;
      const vy = syy / s - (sy / s) ** 2;
      const vxy = sxy / s - (sx * sy) / (s * s);
      const next = bounded(
        blend(s2, 2 * vx, freedom),
        blend(0, 2 * vxy, freedom),
        blend(s2, 2 * vy, freedom),
        0.4 * s2,
        6 * s2,
      );
      ({ xx, xy, yy } = next);
    }
    if (stepX * stepX + stepY * stepY < 1e-5 && round > 2) break;
  }
  const off = (x - startX) ** 2 + (y - startY) ** 2;
  return { x, y, peak, xx, xy, yy, good: off < 9 * s2 };
}

/** What a spot adds at a pixel, in units of the noise. */
export function spotAt(s: SpotShape, px: number, py: number): number {
  const dx = px - s.x;
  const dy = py - s.y;
  const det = s.xx * s.yy - s.xy * s.xy;
  const q = (s.yy * dx * dx - 2 * s.xy * dx * dy + s.xx * dy * dy) / det;
  return q > 24 ? 0 : s.peak * Math.exp(-0.5 * q);
}

/** Standard deviations along and across the long axis, and the axis counter-clockwise from image right, in [0, π). */
export function axesOf(s: SpotShape): { major: number; minor: number; axis_rad: number } {
  const mean = (s.xx + s.yy) / 2;
  const half = Math.sqrt(((s.xx - s.yy) / 2) ** 2 + s.xy * s.xy);
  // Image rows run downwards: the sign of xy turns for an angle as seen on screen.
  const angle = 0.5 * Math.atan2(-2 * s.xy, s.xx - s.yy);
  return {
    major: Math.sqrt(mean + half),
    minor: Math.sqrt(Math.max(mean - half, 1e-6)),
    axis_rad: angle < 0 ? angle + Math.PI : angle,
  };
}

/**
 * Standard errors of a spot's position along x and y, pixels: sqrt(2/π) · (1/SNR per pixel) for a round spot, stretched
 * along its own axes (Cramér–Rao bound of a Gaussian spot in white noise), times `correlation`, by which the noise of
 * neighbouring pixels hangs together (1 for white noise).
 */
export function positionErrors(s: SpotShape, correlation: number): { seX: number; seY: number } {
  const area = Math.sqrt(s.xx * s.yy - s.xy * s.xy);
  const c = ((2 / Math.PI) * correlation * correlation) / (s.peak * s.peak);
  return { seX: Math.sqrt((c * s.xx) / area), seY: Math.sqrt((c * s.yy) / area) };
}

function cutOut(
  p: Whitened,
  sign: 1 | -1,
  x0: number,
  x1: number,
  y0: number,
  y1: number,
  others: readonly SpotShape[],
): Float64Array {
  const w = x1 - x0 + 1;
  const out = new Float64Array(w * (y1 - y0 + 1));
  for (let j = y0; j <= y1; j++) {
    for (let i = x0; i <= x1; i++) {
      let v = sign * p.z[j * p.width + i]!;
      for (const o of others) v -= spotAt(o, i, j);
      out[(j - y0) * w + i - x0] = v;
    }
  }
  return out;
}

function blend(a: number, b: number, share: number): number {
  return a + share * (b - a);
}

function clamp(v: number, most: number): number {
  return Math.min(most, Math.max(-most, v));
}

/** Keeps both eigenvalues of a symmetric 2 x 2 matrix within bounds. */
function bounded(xx: number, xy: number, yy: number, least: number, most: number) {
  const mean = (xx + yy) / 2;
  const d = (xx - yy) / 2;
  const half = Math.sqrt(d * d + xy * xy);
  const big = Math.min(Math.max(mean + half, least), most);
  const small = Math.min(Math.max(mean - half, least), most);
  if (!(half > 1e-12)) return { xx: big, xy: 0, yy: big };
  const m = (big + small) / 2;
  const h = (big - small) / 2 / half;
  return { xx: m + h * d, xy: h * xy, yy: m - h * d };
}
