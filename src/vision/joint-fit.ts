import { type SpotShape, spotAt, type Whitened } from "./spot-shape.ts";

/** Most spots fitted together: more than this touching one another are measured one by one. */
export const mostTogether = 5;
const perSpot = 6;
const rounds = 14;
/** How much a spot's shape may differ from the usual one, as a part of the usual variance (standard deviation). */
const shapeFreedom = 0.45;
/** Pixels within this many usual standard deviations of a spot take part. */
const reachSigmas = 3;

/**
 * Measures spots that touch, all at once: least squares of the sum of their Gaussians to the whitened picture by the
 * method of Levenberg and Marquardt (D. Marquardt 1963, J. SIAM 11, 431), with the shapes held loosely to the usual
 * one. One by one each would take its neighbour's light for its own and be drawn towards it.
 *
 * @param start where each spot is thought to be, with peak
 * @param sigma usual standard deviation of a spot, pixels
 * @param others spots that reach into the picture but are not fitted
 * @returns the spots in the order given; `good` false for one that ran off or vanished
 */
export function fitTogether(
  picture: Whitened,
  sign: 1 | -1,
  start: readonly { readonly x: number; readonly y: number; readonly peak: number }[],
  sigma: number,
  others: readonly SpotShape[],
): SpotShape[] {
  const s2 = sigma * sigma;
  const pixels = pixelsAbout(picture, sign, start, sigma, others);
  const n = start.length * perSpot;
  let p: Float64Array = Float64Array.from(start.flatMap((s) => [s.x, s.y, s.peak, s2, 0, s2]));
  let damping = 1e-2;
  let { cost, gradient, curvature } = expand(p, pixels, s2);
  for (let round = 0; round < rounds; round++) {
    const step = solveDamped(curvature, gradient, n, damping);
    if (!step) break;
    const next = within(p, step, start, s2);
    const tried = expand(next, pixels, s2);
    if (tried.cost < cost) {
      const gained = cost - tried.cost;
      p = next;
      ({ cost, gradient, curvature } = tried);
      damping = Math.max(1e-6, damping / 4);
      if (gained < 1e-4 * cost && round > 3) break;
    } else {
      damping *= 6;
      if (damping > 1e6) break;
    }
  }
  return start.map((from, k) => {
    const spot = spotOf(p, k);
    const off = (spot.x - from.x) ** 2 + (spot.y - from.y) ** 2;
    return { ...spot, good: spot.peak > 0 && off < 6 * s2 };
  });
}

interface Pixels {
  readonly x: Float64Array;
  readonly y: Float64Array;
  readonly value: Float64Array;
}

function pixelsAbout(
  picture: Whitened,
  sign: 1 | -1,
  start: readonly { readonly x: number; readonly y: number }[],
  sigma: number,
  others: readonly SpotShape[],
): Pixels {
  const reach = reachSigmas * sigma;
  const x0 = Math.max(0, Math.floor(Math.min(...start.map((s) => s.x)) - reach));
  const x1 = Math.min(picture.width - 1, Math.ceil(Math.max(...start.map((s) => s.x)) + reach));
  const y0 = Math.max(0, Math.floor(Math.min(...start.map((s) => s.y)) - reach));
  const y1 = Math.min(picture.height - 1, Math.ceil(Math.max(...start.map((s) => s.y)) + reach));
  const xs: number[] = [];
  const ys: number[] = [];
  const values: number[] = [];
  for (let y = y0; y <= y1; y++) {
    for (let x = x0; x <= x1; x++) {
      if (!start.some((s) => (s.x - x) ** 2 + (s.y - y) ** 2 <= reach * reach)) continue;
      let v = sign * (picture.z[y * picture.width + x] as number);
      for (const o of others) v -= spotAt(o, x, y);
      xs.push(x);
      ys.push(y);
      values.push(v);
    }
  }
  return { x: Float64Array.from(xs), y: Float64Array.from(ys), value: Float64Array.from(values) };
}

function spotOf(p: Float64Array, k: number): SpotShape {
  const [x, y, peak, xx, xy, yy] = p.subarray(k * perSpot, (k + 1) * perSpot) as unknown as number[];
  return { x: x!, y: y!, peak: peak!, xx: xx!, xy: xy!, yy: yy!, good: true };
}

/** Sum of squares, and its first and (Gauss–Newton) second derivatives, halved. */
function expand(p: Float64Array, pixels: Pixels, s2: number) {
  const spots = p.length / perSpot;
  const n = p.length;
  const gradient = new Float64Array(n);
  const curvature = new Float64Array(n * n);
  const d = new Float64Array(n);
  let cost = 0;
  const inverse = Array.from({ length: spots }, (_, k) => {
    const { xx, xy, yy } = spotOf(p, k);
    const det = xx * yy - xy * xy;
    return { a: yy / det, b: -xy / det, c: xx / det };
  });
  for (let i = 0; i < pixels.value.length; i++) {
    let model = 0;
    for (let k = 0; k < spots; k++) {
      const at = k * perSpot;
      const { a, b, c } = inverse[k] as { a: number; b: number; c: number };
      const dx = (pixels.x[i] as number) - (p[at] as number);
      const dy = (pixels.y[i] as number) - (p[at + 1] as number);
      const u = a * dx + b * dy;
      const v = b * dx + c * dy;
      const q = u * dx + v * dy;
      if (q > 30) {
        d.fill(0, at, at + perSpot);
        continue;
      }
      const g = Math.exp(-0.5 * q);
      const value = (p[at + 2] as number) * g;
      model += value;
      d[at] = value * u;
      d[at + 1] = value * v;
      d[at + 2] = g;
      d[at + 3] = 0.5 * value * u * u;
      d[at + 4] = value * u * v;
      d[at + 5] = 0.5 * value * v * v;
    }
    const r = (pixels.value[i] as number) - model;
    cost += r * r;
    for (let j = 0; j < n; j++) {
      const dj = d[j] as number;
      if (dj === 0) continue;
      gradient[j]! += dj * r;
      for (let k = 0; k <= j; k++) curvature[j * n + k]! += dj * (d[k] as number);
    }
  }
  // The shapes' bond to the usual one, weighted by the spot's strength so that bright spots are held as well as faint.
  for (let k = 0; k < spots; k++) {
    const strength = Math.max(4, p[k * perSpot + 2] as number);
    for (const [j, usual] of [
      [3, s2],
      [4, 0],
      [5, s2],
    ] as const) {
      const at = k * perSpot + j;
      const w = (bond * strength ** 2) / (shapeFreedom * s2) ** 2;
      const r = usual - (p[at] as number);
      cost += w * r * r;
      gradient[at]! += w * r;
      curvature[at * n + at]! += w;
    }
  }
  return { cost, gradient, curvature };
}

/** Weight of the bond of shapes against that of the pixels. */
const bond = 0.25;

/** Solves (curvature + damping · diagonal) step = gradient by Cholesky's method; null when that isn't definite. */
function solveDamped(curvature: Float64Array, gradient: Float64Array, n: number, damping: number): Float64Array | null {
  const l = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = curvature[i * n + j] as number;
      if (i === j) sum = sum * (1 + damping) + 1e-9;
      for (let k = 0; k < j; k++) sum -= (l[i * n + k] as number) * (l[j * n + k] as number);
      if (i === j) {
        if (!(sum > 0)) return null;
        l[i * n + i] = Math.sqrt(sum);
      } else {
        l[i * n + j] = sum / (l[j * n + j] as number);
      }
    }
  }
  const x = Float64Array.from(gradient);
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < i; k++) x[i]! -= (l[i * n + k] as number) * (x[k] as number);
    x[i]! /= l[i * n + i] as number;
  }
  for (let i = n - 1; i >= 0; i--) {
    for (let k = i + 1; k < n; k++) x[i]! -= (l[k * n + i] as number) * (x[k] as number);
    x[i]! /= l[i * n + i] as number;
  }
  return x;
}

/** The parameters a step on, kept where they mean something: near where they began, shapes neither tiny nor huge. */
function within(
  p: Float64Array,
  step: Float64Array,
  start: readonly { readonly x: number; readonly y: number }[],
  s2: number,
): Float64Array {
  const next = p.map((v, i) => v + (step[i] as number));
  start.forEach(({ x, y }, k) => {
    const at = k * perSpot;
    const far = 3 * Math.sqrt(s2);
    next[at] = clamp(next[at] as number, x - far, x + far);
    next[at + 1] = clamp(next[at + 1] as number, y - far, y + far);
    next[at + 2] = Math.max(0.5, next[at + 2] as number);
    next[at + 3] = clamp(next[at + 3] as number, 0.3 * s2, 4 * s2);
    next[at + 5] = clamp(next[at + 5] as number, 0.3 * s2, 4 * s2);
    const most = 0.85 * Math.sqrt((next[at + 3] as number) * (next[at + 5] as number));
    next[at + 4] = clamp(next[at + 4] as number, -most, most);
  });
  return next;
}

function clamp(v: number, low: number, high: number): number {
  return Math.min(high, Math.max(low, v));
}
