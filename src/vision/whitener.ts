import type { Exposure } from "./exposure.ts";
import type { Kernels } from "./kernels/index.ts";
import type { Whitened } from "./spot-shape.ts";

/** Empty pixels round the picture, so that spots at its edge are filtered like any other. */
const pad = 24;

/**
 * Turns frames into pictures whose noise has standard deviation 1 everywhere and whose still layer is gone:
 * z = (frame - exposed background) / noise. Works at full size or, for large spots, on means of 2 x 2 pixels.
 *
 * The picture it returns is padded; `toFrame` and `toCanvas` turn coordinates.
 */
export class Whitener {
  readonly width: number;
  readonly height: number;
  /** Pixels a side that one pixel here stands for: 1 or 2. */
  readonly bin: 1 | 2;
  private readonly kernels: Kernels;
  private readonly frameWidth: number;
  private readonly frameHeight: number;
  private readonly luma: Uint8Array;
  private readonly level: Float32Array | null;
  private readonly background: Float32Array;
  private readonly inverse: Float32Array;
  private readonly movedBackground: Float32Array;
  private readonly movedInverse: Float32Array;
  private readonly z: Float32Array;
  private readonly between: Float32Array;
  private readonly filtered: Float32Array;

  constructor(
    kernels: Kernels,
    still: { readonly level: Float32Array; readonly noise: Float32Array },
    inView: Uint8Array,
    frameWidth: number,
    frameHeight: number,
    bin: 1 | 2,
  ) {
    this.kernels = kernels;
    this.frameWidth = frameWidth;
    this.frameHeight = frameHeight;
    this.bin = bin;
    this.width = Math.floor(frameWidth / bin) + 2 * pad;
    this.height = Math.floor(frameHeight / bin) + 2 * pad;
    const n = this.width * this.height;
    // At half size the 8-bit plane is padded by twice as much, so that halving it gives the canvas.
    this.luma = kernels.bytes(n * bin * bin);
    this.level = bin === 2 ? kernels.floats(n) : null;
    this.background = kernels.floats(n);
    this.inverse = kernels.floats(n);
    this.movedBackground = kernels.floats(n);
    this.movedInverse = kernels.floats(n);
    this.z = kernels.floats(n);
    this.between = kernels.floats(n);
    this.filtered = kernels.floats(n);
    this.setStill(still, inView);
  }

  /** Bytes of kernel memory that one of these needs. */
  static bytesFor(frameWidth: number, frameHeight: number, bin: 1 | 2): number {
    const n = (Math.floor(frameWidth / bin) + 2 * pad) * (Math.floor(frameHeight / bin) + 2 * pad);
    return n * bin * bin + n * 4 * (bin === 2 ? 8 : 7) + 1024;
  }

  /** Puts in another still layer. */
  setStill(still: { readonly level: Float32Array; readonly noise: Float32Array }, inView: Uint8Array): void {
    const { bin, frameWidth } = this;
    for (let cy = 0; cy < this.height; cy++) {
      for (let cx = 0; cx < this.width; cx++) {
        // The margin repeats the edge, so that moving the background draws nothing foreign in; it is never in view.
        const x = Math.min(Math.max(cx - pad, 0), this.width - 2 * pad - 1);
        const y = Math.min(Math.max(cy - pad, 0), this.height - 2 * pad - 1);
        const outside = x !== cx - pad || y !== cy - pad;
        const to = cy * this.width + cx;
        const from = y * bin * frameWidth + x * bin;
        if (bin === 1) {
          this.background[to] = still.level[from]!;
          this.inverse[to] = inView[from] && !outside ? 1 / still.noise[from]! : 0;
        } else {
          const four = [from, from + 1, from + frameWidth, from + frameWidth + 1];
          let level = 0;
          let noise = 0;
          let seen = 1;
          for (const i of four) {
            level += still.level[i]! / 4;
            noise += still.noise[i]! / 4;
            seen = Math.min(seen, inView[i]!);
          }
          this.background[to] = level;
          this.inverse[to] = seen && !outside ? 2 / noise : 0;
        }
      }
    }
  }

  /** Whitens one frame. The result is overwritten by the next call. `shift` in frame pixels. */
  whiten(luma: Uint8Array, shift: { readonly x: number; readonly y: number }, exposure: Exposure): Whitened {
    const { kernels, width, height, bin } = this;
    const stride = width * bin;
    const margin = pad * bin;
    for (let y = 0; y < this.frameHeight; y++) {
      const from = y * this.frameWidth;
      this.luma.set(luma.subarray(from, from + this.frameWidth), (y + margin) * stride + margin);
    }
    let background = this.background;
    let inverse = this.inverse;
    // Below a twentieth of a pixel a move changes nothing that can be seen, and interpolation would only blur.
    if (Math.abs(shift.x) > 0.05 || Math.abs(shift.y) > 0.05) {
      kernels.shifted(this.background, this.movedBackground, width, height, shift.x / bin, shift.y / bin);
      kernels.shifted(
        this.inverse,
        this.movedInverse,
        width,
        height,
        Math.round(shift.x / bin),
        Math.round(shift.y / bin),
      );
      background = this.movedBackground;
      inverse = this.movedInverse;
    }
    if (this.level) {
      kernels.halve(this.luma, this.level, stride, height * bin);
      kernels.whitenLevels(this.level, background, inverse, this.z, exposure.gain, exposure.offset);
    } else {
      kernels.whiten(this.luma, background, inverse, this.z, exposure.gain, exposure.offset);
    }
    return { z: this.z, width, height };
  }

  /** The whitened picture filtered with a Gaussian. The result is overwritten by the next call. */
  filter(taps: Float32Array): Float32Array {
    this.kernels.blur(this.z, this.between, this.filtered, this.width, this.height, taps);
    return this.filtered;
  }

  /** Maxima of the filtered picture, as indices into it. */
  peaks(sign: 1 | -1, threshold: number): Int32Array {
    return this.kernels.peaks(this.filtered, this.width, this.height, sign, threshold);
  }

  /** Canvas coordinate to frame pixel coordinate. */
  toFrame(c: number): number {
    return (c - pad) * this.bin + (this.bin - 1) / 2;
  }

  /** Frame pixel coordinate to canvas coordinate. */
  toCanvas(p: number): number {
    return (p - (this.bin - 1) / 2) / this.bin + pad;
  }

  /** Is the canvas pixel in the lit view? */
  sees(index: number): boolean {
    return this.inverse[index]! > 0;
  }

  /** Noise of one frame at a canvas pixel, grey levels of one canvas pixel. */
  noiseAt(index: number): number {
    const inverse = this.inverse[index]!;
    return inverse > 0 ? 1 / inverse : 0;
  }

  /** Robust standard deviation of the filtered picture (scaled MAD over a grid of pixels in view). */
  filteredSd(): number {
    const every = Math.max(1, Math.floor((this.width * this.height) / sampledForSd));
    const values = new Float32Array(Math.ceil(this.filtered.length / every));
    let n = 0;
    for (let i = 0; i < this.filtered.length; i += every) {
      if (this.inverse[i]! > 0) values[n++] = Math.abs(this.filtered[i]!);
    }
    const sorted = values.subarray(0, n).sort();
    return n > 0 ? 1.4826 * sorted[n >> 1]! : 1;
  }
}

/** Pixels that the noise of a filtered picture is read from: its standard deviation is then known to about 1 %. */
const sampledForSd = 12_000;

/** Half of a symmetric Gaussian filter (middle first) of standard deviation sigma, scaled to keep white noise at 1. */
export function gaussianTaps(sigma: number): Float32Array {
  const radius = Math.min(pad - 1, Math.max(1, Math.ceil(3 * sigma)));
  const taps = Array.from({ length: radius + 1 }, (_, k) => Math.exp((-k * k) / (2 * sigma * sigma)));
  const energy = taps.reduce((s, t, k) => s + (k === 0 ? 1 : 2) * t * t, 0);
  return Float32Array.from(taps, (t) => t / Math.sqrt(energy));
}
