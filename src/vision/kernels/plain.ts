import { type Kernels, mostPeaks, type Ranks, stackSize } from "./kernels.ts";

const f32 = Math.fround;

/** The kernels in plain TypeScript: where WebAssembly SIMD is missing, and as the reference that it is tested against. */
export function plainKernels(): Kernels {
  const found = new Int32Array(mostPeaks);
  return {
    kind: "plain",
    bytes: (n) => new Uint8Array(n),
    floats: (n) => new Float32Array(n),
    whiten,
    whitenLevels: whiten,
    halve,
    blur(src, between, out, width, height, taps) {
      blurRows(src, between, width, height, taps);
      blurColumns(between, out, width, height, taps);
    },
    peaks: (src, width, height, sign, threshold) => peaks(src, width, height, sign, f32(threshold), found),
    sortStack,
    shifted,
  };
}

function whiten(
  level: Uint8Array | Float32Array,
  background: Float32Array,
  inverse: Float32Array,
  out: Float32Array,
  gain: number,
  offset: number,
): void {
  const g = f32(gain);
  const o = f32(offset);
  for (let i = 0; i < out.length; i++) {
    const expected = f32(o + f32(g * background[i]!));
    out[i] = f32(level[i]! - expected) * inverse[i]!;
  }
}

function halve(luma: Uint8Array, out: Float32Array, width: number, height: number): void {
  const w = width >> 1;
  const h = height >> 1;
  for (let y = 0; y < h; y++) {
    for (let x = 0; x < w; x++) {
      const p = 2 * y * width + 2 * x;
      out[y * w + x] = (luma[p]! + luma[p + 1]! + luma[p + width]! + luma[p + width + 1]!) * 0.25;
    }
  }
}

function blurRows(src: Float32Array, out: Float32Array, width: number, height: number, taps: Float32Array): void {
  const radius = taps.length - 1;
  for (let y = 0; y < height; y++) {
    const row = y * width;
    out.fill(0, row, row + radius);
    out.fill(0, row + width - radius, row + width);
    for (let i = row + radius; i < row + width - radius; i++) {
      let sum = f32(src[i]! * taps[0]!);
      for (let k = 1; k <= radius; k++) sum = f32(sum + f32(f32(src[i - k]! + src[i + k]!) * taps[k]!));
      out[i] = sum;
    }
  }
}

function blurColumns(src: Float32Array, out: Float32Array, width: number, height: number, taps: Float32Array): void {
  const radius = taps.length - 1;
  out.fill(0, 0, radius * width);
  out.fill(0, (height - radius) * width, height * width);
  for (let i = radius * width; i < (height - radius) * width; i++) {
    let sum = f32(src[i]! * taps[0]!);
    for (let k = 1; k <= radius; k++) {
      sum = f32(sum + f32(f32(src[i - k * width]! + src[i + k * width]!) * taps[k]!));
    }
    out[i] = sum;
  }
}

function peaks(
  src: Float32Array,
  width: number,
  height: number,
  sign: 1 | -1,
  threshold: number,
  found: Int32Array,
): Int32Array {
  let count = 0;
  for (let y = 1; y < height - 1; y++) {
    for (let x = 1; x < width - 1; x++) {
      const i = y * width + x;
      const v = src[i]! * sign;
      if (!(v > threshold)) continue;
      const before = [i - 1, i - width - 1, i - width, i - width + 1];
      const after = [i + 1, i + width - 1, i + width, i + width + 1];
      if (before.some((j) => src[j]! * sign >= v) || after.some((j) => src[j]! * sign > v)) continue;
      if (count === mostPeaks) return found.subarray(0, count);
      found[count++] = i;
    }
  }
  return found.subarray(0, count);
}

function sortStack(planes: readonly Uint8Array[], ranks: Ranks, middle: Float32Array, spread: Float32Array): void {
  const column = new Uint8Array(stackSize);
  const share = f32(1 / (ranks.high - ranks.low));
  for (let i = 0; i < middle.length; i++) {
    for (let k = 0; k < stackSize; k++) column[k] = planes[k]![i]!;
    column.sort();
    let sum = 0;
    for (let k = ranks.low; k < ranks.high; k++) sum += column[k]!;
    middle[i] = sum * share;
    spread[i] = column[ranks.upper]! - column[ranks.lower]!;
  }
}

function shifted(src: Float32Array, out: Float32Array, width: number, height: number, dx: number, dy: number): void {
  const mx = f32(-f32(dx));
  const my = f32(-f32(dy));
  const fx = Math.floor(mx);
  const fy = Math.floor(my);
  const ax = f32(mx - fx);
  const ay = f32(my - fy);
  const w00 = f32(f32(1 - ax) * f32(1 - ay));
  const w10 = f32(ax * f32(1 - ay));
  const w01 = f32(f32(1 - ax) * ay);
  const w11 = f32(ax * ay);
  const inX = (x: number) => Math.min(Math.max(x, 0), width - 1);
  const inY = (y: number) => Math.min(Math.max(y, 0), height - 1);
  for (let y = 0; y < height; y++) {
    const r0 = inY(y + fy) * width;
    const r1 = inY(y + fy + 1) * width;
    for (let x = 0; x < width; x++) {
      const x0 = inX(x + fx);
      const x1 = inX(x + fx + 1);
      let sum = f32(src[r0 + x0]! * w00);
      sum = f32(sum + f32(src[r0 + x1]! * w10));
      sum = f32(sum + f32(src[r1 + x0]! * w01));
      out[y * width + x] = f32(sum + f32(src[r1 + x1]! * w11));
    }
  }
}
