/**
 * Exposure of one frame against the still background: frame level = offset + gain * background level.
 */
export interface Exposure {
  readonly gain: number;
  readonly offset: number;
}

/** Pixels at which exposure is compared, spread over the view. */
export interface ExposurePoints {
  readonly at: Int32Array;
  readonly level: Float32Array;
  /** True when the background's own levels differ enough to tell an offset from a gain. */
  readonly wide: boolean;
}

const mostPoints = 2000;
/** Points whose spread sets what counts as an outlier. */
const spreadPoints = 300;

/** Chooses points spread evenly over the view. */
export function exposurePoints(background: Float32Array, inView: Uint8Array): ExposurePoints {
  let lit = 0;
  for (const v of inView) if (v) lit++;
  const every = Math.max(1, Math.floor(lit / mostPoints));
  const at: number[] = [];
  let k = 0;
  for (let i = 0; i < inView.length; i++) {
    if (inView[i] && k++ % every === 0) at.push(i);
  }
  const level = Float32Array.from(at, (i) => background[i]!);
  const sorted = level.slice().sort();
  const range = sorted.length
    ? sorted[Math.floor(sorted.length * 0.95)]! - sorted[Math.floor(sorted.length * 0.05)]!
    : 0;
  return { at: Int32Array.from(at), level, wide: range > 30 };
}

/**
 * Robust fit (iteratively reweighted least squares, Tukey weights) of a frame's exposure. `shift` is the camera shake
 * in whole pixels as an index step. Returns gain 1, offset 0 when there is nothing to compare.
 *
 * @param start where to begin: the exposure of the frame before, or null for the median ratio of levels
 */
export function fitExposure(
  points: ExposurePoints,
  luma: Uint8Array,
  shiftStep: number,
  start: Exposure | null = null,
): Exposure {
  const n = points.at.length;
  if (n < 50) return { gain: 1, offset: 0 };
  const f = new Float32Array(n);
  for (let i = 0; i < n; i++) {
    const p = points.at[i]! + shiftStep;
    f[i] = p >= 0 && p < luma.length ? luma[p]! : -1;
  }
  const begun = start ?? medianRatio(points.level, f);
  if (!begun) return { gain: 1, offset: 0 };
  let { gain, offset } = begun;
  const every = Math.max(1, Math.floor(n / spreadPoints));
  const some = new Float32Array(Math.ceil(n / every));
  for (let round = 0; round < (start ? 3 : 4); round++) {
    for (let i = 0, k = 0; i < n; i += every, k++) {
      some[k] = f[i]! >= 0 ? Math.abs(f[i]! - offset - gain * points.level[i]!) : 1e9;
    }
    const cut = 4.685 * Math.max(1, 1.4826 * some.sort()[some.length >> 1]!);
    let sw = 0;
    let sb = 0;
    let sf = 0;
    let sbb = 0;
    let sbf = 0;
    for (let i = 0; i < n; i++) {
      const b = points.level[i]!;
      const u = (f[i]! - offset - gain * b) / cut;
      if (f[i]! < 0 || u <= -1 || u >= 1) continue;
      const w = (1 - u * u) ** 2;
      sw += w;
      sb += w * b;
      sf += w * f[i]!;
      sbb += w * b * b;
      sbf += w * b * f[i]!;
    }
    // A frame far from the one before: begin anew.
    if (start && sw < 0.3 * n) return fitExposure(points, luma, shiftStep);
    if (points.wide) {
      const det = sw * sbb - sb * sb;
      if (!(det > 0)) break;
      gain = (sw * sbf - sb * sf) / det;
      offset = (sf - gain * sb) / sw;
    } else if (sbb > 0) {
      gain = sbf / sbb;
    }
  }
  return gain > 0.05 ? { gain, offset } : { gain: 1, offset: 0 };
}

function medianRatio(level: Float32Array, f: Float32Array): Exposure | null {
  const ratios = new Float32Array(f.length);
  let m = 0;
  for (let i = 0; i < f.length; i++) if (level[i]! > 8 && f[i]! >= 0) ratios[m++] = f[i]! / level[i]!;
  if (m < 50) return null;
  return { gain: ratios.subarray(0, m).sort()[m >> 1]!, offset: 0 };
}
