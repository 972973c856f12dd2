/** Where the luma of a decoded picture lies. Samples deeper than 8 bits are 16-bit words, little end first. */
export interface LumaPlane {
  readonly bytes: Uint8Array;
  readonly offset: number;
  /** Bytes from one row to the next. */
  readonly stride: number;
  readonly width: number;
  readonly height: number;
  readonly bitDepth: number;
}

/** Keeps luma planes tight and 8 bits deep, in one buffer of its own that is used again for every picture. */
export class LumaTightener {
  #buffer = new Uint8Array(0);

  /** @param foreign whether the planes lie in memory that isn't ours and may go away: then they are always copied */
  constructor(readonly foreign = false) {}

  /**
   * The plane without padding, one byte a sample: the given memory itself when it already is so, else the reused
   * buffer. Deeper samples are rounded to 8 bits, half up, and held at 255.
   */
  tighten({ bytes, offset, stride, width, height, bitDepth }: LumaPlane): Uint8Array {
    const size = width * height;
    if (!this.foreign && bitDepth === 8 && stride === width) return bytes.subarray(offset, offset + size);
    if (this.#buffer.length !== size) this.#buffer = new Uint8Array(size);
    const out = this.#buffer;
    if (bitDepth === 8) {
      for (let y = 0; y < height; y++)
        out.set(bytes.subarray(offset + y * stride, offset + y * stride + width), y * width);
      return out;
    }
    const shift = bitDepth - 8;
    const half = 1 << (shift - 1);
    for (let y = 0; y < height; y++) {
      let at = offset + y * stride;
      for (let i = y * width, end = i + width; i < end; i++, at += 2) {
        const value = ((bytes[at]! | (bytes[at + 1]! << 8)) + half) >> shift;
        out[i] = Math.min(value, 255);
      }
    }
    return out;
  }
}
