// Per-pixel kernels in WebAssembly SIMD. Plain-TypeScript twin: ../plain.ts, bit for bit the same.
// All pointers are byte offsets into the imported memory; the host lays the memory out (../engine.ts).

/** z = (f - (offset + gain * b)) * inv, over `n` pixels of 8-bit luma. */
export function whiten(luma: usize, background: usize, inverse: usize, out: usize, n: i32, gain: f32, offset: f32): void {
  const g = f32x4.splat(gain);
  const o = f32x4.splat(offset);
  let i = 0;
  for (; i + 16 <= n; i += 16) {
    const bytes = v128.load(luma + i);
    const low = i16x8.extend_low_i8x16_u(bytes);
    const high = i16x8.extend_high_i8x16_u(bytes);
    one(i32x4.extend_low_i16x8_u(low), background, inverse, out, i, g, o);
    one(i32x4.extend_high_i16x8_u(low), background, inverse, out, i + 4, g, o);
    one(i32x4.extend_low_i16x8_u(high), background, inverse, out, i + 8, g, o);
    one(i32x4.extend_high_i16x8_u(high), background, inverse, out, i + 12, g, o);
  }
  for (; i < n; i++) {
    const f = <f32>load<u8>(luma + i);
    const b = load<f32>(background + (<usize>i << 2));
    store<f32>(out + (<usize>i << 2), (f - (offset + gain * b)) * load<f32>(inverse + (<usize>i << 2)));
  }
}

// @ts-ignore: decorator
@inline
function one(level: v128, background: usize, inverse: usize, out: usize, i: i32, g: v128, o: v128): void {
  const at = <usize>i << 2;
  const expected = f32x4.add(o, f32x4.mul(g, v128.load(background + at)));
  const z = f32x4.mul(f32x4.sub(f32x4.convert_i32x4_u(level), expected), v128.load(inverse + at));
  v128.store(out + at, z);
}

/** Sum of each 2 x 2 block of 8-bit luma times 1/4, to a picture of half the width and height (odd edges dropped), as the f32 level. */
export function halve(luma: usize, out: usize, width: i32, height: i32): void {
  const w = width >> 1;
  const h = height >> 1;
  const quarter = f32x4.splat(0.25);
  for (let y = 0; y < h; y++) {
    const top = luma + 2 * y * width;
    const bottom = top + width;
    const to = out + ((<usize>(y * w)) << 2);
    let x = 0;
    for (; x + 8 <= w; x += 8) {
      const a = i16x8.extadd_pairwise_i8x16_u(v128.load(top + 2 * x));
      const b = i16x8.extadd_pairwise_i8x16_u(v128.load(bottom + 2 * x));
      const s = i16x8.add(a, b);
      v128.store(to + (<usize>x << 2), f32x4.mul(f32x4.convert_i32x4_u(i32x4.extend_low_i16x8_u(s)), quarter));
      v128.store(to + (<usize>(x + 4) << 2), f32x4.mul(f32x4.convert_i32x4_u(i32x4.extend_high_i16x8_u(s)), quarter));
    }
    for (; x < w; x++) {
      const s =
        <i32>load<u8>(top + 2 * x) +
        <i32>load<u8>(top + 2 * x + 1) +
        <i32>load<u8>(bottom + 2 * x) +
        <i32>load<u8>(bottom + 2 * x + 1);
      store<f32>(to + (<usize>x << 2), <f32>s * 0.25);
    }
  }
}

/** z = (f - (offset + gain * b)) * inv, over `n` pixels of f32 levels; `out` may be `level`. */
export function whitenLevels(level: usize, background: usize, inverse: usize, out: usize, n: i32, gain: f32, offset: f32): void {
  const g = f32x4.splat(gain);
  const o = f32x4.splat(offset);
  let i = 0;
  for (; i + 4 <= n; i += 4) {
    const at = <usize>i << 2;
    const expected = f32x4.add(o, f32x4.mul(g, v128.load(background + at)));
    v128.store(out + at, f32x4.mul(f32x4.sub(v128.load(level + at), expected), v128.load(inverse + at)));
  }
  for (; i < n; i++) {
    const at = <usize>i << 2;
    store<f32>(out + at, (load<f32>(level + at) - (offset + gain * load<f32>(background + at))) * load<f32>(inverse + at));
  }
}

/**
 * Symmetric filter along rows: out = t[0] src + sum over k of t[k] (src[-k] + src[+k]). Pixels nearer than `radius`
 * to the left or right edge are set to 0.
 */
export function blurRows(src: usize, out: usize, width: i32, height: i32, taps: usize, radius: i32): void {
  for (let y = 0; y < height; y++) {
    const row = src + ((<usize>(y * width)) << 2);
    const to = out + ((<usize>(y * width)) << 2);
    for (let x = 0; x < radius; x++) {
      store<f32>(to + (<usize>x << 2), 0);
      store<f32>(to + (<usize>(width - 1 - x) << 2), 0);
    }
    const end = width - radius;
    let x = radius;
    // Sixteen pixels at a time: each tap is then fetched once for four vectors.
    for (; x + 16 <= end; x += 16) {
      const at = row + (<usize>x << 2);
      const first = v128.load32_splat(taps);
      let s0 = f32x4.mul(v128.load(at), first);
      let s1 = f32x4.mul(v128.load(at, 16), first);
      let s2 = f32x4.mul(v128.load(at, 32), first);
      let s3 = f32x4.mul(v128.load(at, 48), first);
      for (let k = 1; k <= radius; k++) {
        const d = <usize>k << 2;
        const t = v128.load32_splat(taps + d);
        const a = at - d;
        const b = at + d;
        s0 = f32x4.add(s0, f32x4.mul(f32x4.add(v128.load(a), v128.load(b)), t));
        s1 = f32x4.add(s1, f32x4.mul(f32x4.add(v128.load(a, 16), v128.load(b, 16)), t));
        s2 = f32x4.add(s2, f32x4.mul(f32x4.add(v128.load(a, 32), v128.load(b, 32)), t));
        s3 = f32x4.add(s3, f32x4.mul(f32x4.add(v128.load(a, 48), v128.load(b, 48)), t));
      }
      const o = to + (<usize>x << 2);
      v128.store(o, s0);
      v128.store(o, s1, 16);
      v128.store(o, s2, 32);
      v128.store(o, s3, 48);
    }
    for (; x + 4 <= end; x += 4) {
      const at = row + (<usize>x << 2);
      let sum = f32x4.mul(v128.load(at), v128.load32_splat(taps));
      for (let k = 1; k <= radius; k++) {
        const d = <usize>k << 2;
        sum = f32x4.add(sum, f32x4.mul(f32x4.add(v128.load(at - d), v128.load(at + d)), v128.load32_splat(taps + d)));
      }
      v128.store(to + (<usize>x << 2), sum);
    }
    for (; x < end; x++) {
      const at = row + (<usize>x << 2);
      let sum: f32 = load<f32>(at) * load<f32>(taps);
      for (let k = 1; k <= radius; k++) {
        const d = <usize>k << 2;
        sum += (load<f32>(at - d) + load<f32>(at + d)) * load<f32>(taps + d);
      }
      store<f32>(to + (<usize>x << 2), sum);
    }
  }
}

/** The same along columns. Rows nearer than `radius` to the top or bottom edge are set to 0. */
export function blurColumns(src: usize, out: usize, width: i32, height: i32, taps: usize, radius: i32): void {
  const stride = <usize>width << 2;
  memory.fill(out, 0, stride * radius);
  memory.fill(out + stride * (height - radius), 0, stride * radius);
  for (let y = radius; y < height - radius; y++) {
    const row = src + stride * y;
    const to = out + stride * y;
    let x = 0;
    for (; x + 16 <= width; x += 16) {
      const at = row + (<usize>x << 2);
      const first = v128.load32_splat(taps);
      let s0 = f32x4.mul(v128.load(at), first);
      let s1 = f32x4.mul(v128.load(at, 16), first);
      let s2 = f32x4.mul(v128.load(at, 32), first);
      let s3 = f32x4.mul(v128.load(at, 48), first);
      for (let k = 1; k <= radius; k++) {
        const d = stride * k;
        const t = v128.load32_splat(taps + (<usize>k << 2));
        const a = at - d;
        const b = at + d;
        s0 = f32x4.add(s0, f32x4.mul(f32x4.add(v128.load(a), v128.load(b)), t));
        s1 = f32x4.add(s1, f32x4.mul(f32x4.add(v128.load(a, 16), v128.load(b, 16)), t));
        s2 = f32x4.add(s2, f32x4.mul(f32x4.add(v128.load(a, 32), v128.load(b, 32)), t));
        s3 = f32x4.add(s3, f32x4.mul(f32x4.add(v128.load(a, 48), v128.load(b, 48)), t));
      }
      const o = to + (<usize>x << 2);
      v128.store(o, s0);
      v128.store(o, s1, 16);
      v128.store(o, s2, 32);
      v128.store(o, s3, 48);
    }
    for (; x + 4 <= width; x += 4) {
      const at = row + (<usize>x << 2);
      let sum = f32x4.mul(v128.load(at), v128.load32_splat(taps));
      for (let k = 1; k <= radius; k++) {
        const d = stride * k;
        const t = v128.load32_splat(taps + (<usize>k << 2));
        sum = f32x4.add(sum, f32x4.mul(f32x4.add(v128.load(at - d), v128.load(at + d)), t));
      }
      v128.store(to + (<usize>x << 2), sum);
    }
    for (; x < width; x++) {
      const at = row + (<usize>x << 2);
      let sum: f32 = load<f32>(at) * load<f32>(taps);
      for (let k = 1; k <= radius; k++) {
        const d = stride * k;
        sum += (load<f32>(at - d) + load<f32>(at + d)) * load<f32>(taps + (<usize>k << 2));
      }
      store<f32>(to + (<usize>x << 2), sum);
    }
  }
}

/**
 * Lists pixels (row-major index, i32) whose value times `sign` exceeds `threshold` and is a local maximum of its
 * 8 neighbours (ties go to the first in row-major order). Returns how many were found, never more than `most`.
 */
export function peaks(src: usize, width: i32, height: i32, sign: f32, threshold: f32, out: usize, most: i32): i32 {
  const s = f32x4.splat(sign);
  const t = f32x4.splat(threshold);
  const stride = <usize>width << 2;
  let count = 0;
  for (let y = 1; y < height - 1; y++) {
    const row = src + stride * y;
    let x = 1;
    for (; x < width - 1; x += 4) {
      if (x + 4 <= width - 1 && !v128.any_true(f32x4.gt(f32x4.mul(v128.load(row + (<usize>x << 2)), s), t))) continue;
      const end = min(x + 4, width - 1);
      for (let i = x; i < end; i++) {
        const at = row + (<usize>i << 2);
        const v = load<f32>(at) * sign;
        if (!(v > threshold)) continue;
        if (load<f32>(at - 4) * sign >= v || load<f32>(at + 4) * sign > v) continue;
        const up = at - stride;
        if (load<f32>(up - 4) * sign >= v || load<f32>(up) * sign >= v || load<f32>(up + 4) * sign >= v) continue;
        const down = at + stride;
        if (load<f32>(down - 4) * sign > v || load<f32>(down) * sign > v || load<f32>(down + 4) * sign > v) continue;
        if (count == most) return count;
        store<i32>(out + (<usize>count << 2), y * width + i);
        count++;
      }
    }
  }
  return count;
}

/**
 * Sorts the stack of `32` luma planes pixel by pixel (Batcher's odd-even merge network, comparators listed as byte
 * pairs at `network`, `comparators` of them) for pixels [from, to) in blocks of 16, and writes the sorted planes'
 * levels: `middle` = mean of ranks lowRank ... highRank - 1 (f32), `spread` = level at rank `upper` minus level at
 * rank `lower` (f32). `planes` holds 32 pointers (u32); `scratch` 512 bytes.
 */
export function sortStack(
  planes: usize,
  network: usize,
  comparators: i32,
  scratch: usize,
  n: i32,
  lowRank: i32,
  highRank: i32,
  lower: i32,
  upper: i32,
  middle: usize,
  spread: usize,
): void {
  const share = f32x4.splat(<f32>1 / <f32>(highRank - lowRank));
  for (let i = 0; i < n; i += 16) {
    const at = min(i, n - 16);
    for (let k = 0; k < 32; k++) v128.store(scratch + (<usize>k << 4), v128.load(<usize>load<u32>(planes + (<usize>k << 2)) + at));
    for (let c = 0; c < comparators; c++) {
      const a = scratch + (<usize>load<u8>(network + 2 * c) << 4);
      const b = scratch + (<usize>load<u8>(network + 2 * c + 1) << 4);
      const va = v128.load(a);
      const vb = v128.load(b);
      v128.store(a, i8x16.min_u(va, vb));
      v128.store(b, i8x16.max_u(va, vb));
    }
    let low = i16x8.splat(0);
    let high = i16x8.splat(0);
    for (let k = lowRank; k < highRank; k++) {
      const v = v128.load(scratch + (<usize>k << 4));
      low = i16x8.add(low, i16x8.extend_low_i8x16_u(v));
      high = i16x8.add(high, i16x8.extend_high_i8x16_u(v));
    }
    quads(low, high, share, middle + (<usize>at << 2));
    const d = i8x16.sub(v128.load(scratch + (<usize>upper << 4)), v128.load(scratch + (<usize>lower << 4)));
    quads(i16x8.extend_low_i8x16_u(d), i16x8.extend_high_i8x16_u(d), f32x4.splat(1), spread + (<usize>at << 2));
  }
}

// @ts-ignore: decorator
@inline
function quads(low: v128, high: v128, factor: v128, to: usize): void {
  v128.store(to, f32x4.mul(f32x4.convert_i32x4_u(i32x4.extend_low_i16x8_u(low)), factor));
  v128.store(to + 16, f32x4.mul(f32x4.convert_i32x4_u(i32x4.extend_high_i16x8_u(low)), factor));
  v128.store(to + 32, f32x4.mul(f32x4.convert_i32x4_u(i32x4.extend_low_i16x8_u(high)), factor));
  v128.store(to + 48, f32x4.mul(f32x4.convert_i32x4_u(i32x4.extend_high_i16x8_u(high)), factor));
}

/** Picture moved by a sub-pixel shift, bilinear: out(x, y) = src(x - dx, y - dy), edge pixels repeated. */
export function shifted(src: usize, out: usize, width: i32, height: i32, dx: f32, dy: f32): void {
  const fx = <i32>Mathf.floor(-dx);
  const fy = <i32>Mathf.floor(-dy);
  const ax: f32 = -dx - <f32>fx;
  const ay: f32 = -dy - <f32>fy;
  const w00 = f32x4.splat((<f32>1 - ax) * (<f32>1 - ay));
  const w10 = f32x4.splat(ax * (<f32>1 - ay));
  const w01 = f32x4.splat((<f32>1 - ax) * ay);
  const w11 = f32x4.splat(ax * ay);
  for (let y = 0; y < height; y++) {
    const y0 = min(max(y + fy, 0), height - 1);
    const y1 = min(max(y + fy + 1, 0), height - 1);
    const r0 = src + ((<usize>(y0 * width)) << 2);
    const r1 = src + ((<usize>(y1 * width)) << 2);
    const to = out + ((<usize>(y * width)) << 2);
    const begin = min(max(-fx, 0), width);
    const end = max(min(width - 1 - fx, width), begin);
    for (let x = 0; x < begin; x++) edge(r0, r1, to, x, fx, width, ax, ay);
    let x = begin;
    for (; x + 4 <= end; x += 4) {
      const p = <usize>((x + fx) << 2);
      let sum = f32x4.mul(v128.load(r0 + p), w00);
      sum = f32x4.add(sum, f32x4.mul(v128.load(r0 + p + 4), w10));
      sum = f32x4.add(sum, f32x4.mul(v128.load(r1 + p), w01));
      sum = f32x4.add(sum, f32x4.mul(v128.load(r1 + p + 4), w11));
      v128.store(to + (<usize>x << 2), sum);
    }
    for (; x < width; x++) edge(r0, r1, to, x, fx, width, ax, ay);
  }
}

function edge(r0: usize, r1: usize, to: usize, x: i32, fx: i32, width: i32, ax: f32, ay: f32): void {
  const x0 = <usize>(min(max(x + fx, 0), width - 1)) << 2;
  const x1 = <usize>(min(max(x + fx + 1, 0), width - 1)) << 2;
  let sum: f32 = load<f32>(r0 + x0) * ((<f32>1 - ax) * (<f32>1 - ay));
  sum += load<f32>(r0 + x1) * (ax * (<f32>1 - ay));
  sum += load<f32>(r1 + x0) * ((<f32>1 - ax) * ay);
  sum += load<f32>(r1 + x1) * (ax * ay);
  store<f32>(to + (<usize>x << 2), sum);
}
